import type { Weather } from "../scenario/types.ts";

/** No rain, no fog, and nothing on the covers. */
export function isClear({
  rainMmPerH,
  fogGPerM3,
  dewMm,
  coversWetAsAtMmPerH = 0,
  iceMm,
  snow,
}: Weather): boolean {
  return rainMmPerH.value + fogGPerM3 + dewMm.value + coversWetAsAtMmPerH + iceMm === 0 && snow === undefined;
}
