import { type ThicknessPoint, thicknessPoint, type VariedCover } from "./thicknessCost.ts";

/** A thickness that can be bought, under the name that the trade gives it. */
export interface StockSize {
  readonly label: string;
  readonly thicknessMm: number;
}

export interface RankedSize extends StockSize {
  readonly point: ThicknessPoint;
}

const MM_PER_INCH = 25.4;
const metricMm = [0.05, 0.1, 0.125, 0.175, 0.25, 0.5, 0.75, 1, 1.5, 2, 3, 4, 5, 6, 8, 10, 12];
const mils = [1, 2, 3, 5, 7, 10, 20, 30];
const inchFractions = [
  [1, 32],
  [1, 16],
  [3, 32],
  [1, 8],
  [3, 16],
  [1, 4],
  [3, 8],
  [1, 2],
] as const;

/**
 * Films and sheets that dealers keep.
 *
 * Source: common practice, no source
 */
export const usualStock: readonly StockSize[] = [
  ...metricMm.map((mm) => ({ label: `${mm} mm`, thicknessMm: mm })),
  ...mils.map((mil) => ({ label: `${mil} mil`, thicknessMm: (mil * MM_PER_INCH) / 1000 })),
  ...inchFractions.map(([above, below]) => ({
    label: `${above}/${below} in`,
    thicknessMm: (above * MM_PER_INCH) / below,
  })),
];

/** Sizes by their worst cost, the cheapest first; of equals the thinner. */
export function rankStock(varied: VariedCover, sizes: readonly StockSize[]): RankedSize[] {
  return sizes
    .map((size) => ({ ...size, point: thicknessPoint(varied, size.thicknessMm) }))
    .sort((a, b) => a.point.worstCostDb - b.point.worstCostDb || a.thicknessMm - b.thicknessMm);
}
