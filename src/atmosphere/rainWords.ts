import { requireNotNegative } from "../numeric/check.ts";

export interface RainWord {
  readonly authority: string;
  readonly word: string;
  readonly source: string;
}

/** Words from light to violent with the rate [mm/h] at which each ends; `includes` says who owns that rate. */
interface Scale {
  readonly authority: string;
  readonly source: string;
  readonly words: readonly { readonly word: string; readonly end: number; readonly includes?: true }[];
}

const scales: readonly Scale[] = [
  {
    authority: "AMS",
    source: "Glossary of Meteorology, American Meteorological Society",
    words: [
      { word: "light", end: 2.5, includes: true },
      { word: "moderate", end: 7.6, includes: true },
      { word: "heavy", end: Infinity },
    ],
  },
  {
    authority: "UK, rain",
    source: "Met Office wording as printed in a newspaper of 1998",
    words: [
      { word: "slight", end: 0.5 },
      { word: "moderate", end: 4, includes: true },
      { word: "heavy", end: Infinity },
    ],
  },
  {
    authority: "UK, showers",
    source: "Met Office wording as printed in a newspaper of 1998",
    words: [
      { word: "slight", end: 2 },
      { word: "moderate", end: 10 },
      { word: "heavy", end: 50, includes: true },
      { word: "violent", end: Infinity },
    ],
  },
  {
    authority: "WMO",
    source: "WMO-No. 8 (from memory)",
    words: [
      { word: "light", end: 2.5 },
      { word: "moderate", end: 10 },
      { word: "heavy", end: 50, includes: true },
      { word: "violent", end: Infinity },
    ],
  },
];

/**
 * What different authorities call rain of a rate: "heavy" begins at 4, 7.6 or 10 mm/h, so a word never stands
 * for a rate, and is shown beside its authority only.
 *
 * Drizzle is left out: it is told by the size of the drops, not by the rate.
 *
 * Source: as named in each entry
 *
 * @param rainRateMmPerH  [mm/h], at least 0
 * @returns a word from each authority, always in the same order; none at all where no rain falls
 * @throws RangeError on a non-finite or negative rate
 */
export function rainWords({ rainRateMmPerH }: { readonly rainRateMmPerH: number }): RainWord[] {
  requireNotNegative("rainRateMmPerH", rainRateMmPerH);
  if (rainRateMmPerH === 0) return [];
  return scales.map(({ authority, source, words }) => {
    const { word } = words.find(
      ({ end, includes }) => rainRateMmPerH < end || (includes && rainRateMmPerH === end),
    )!;
    return { authority, word, source };
  });
}
