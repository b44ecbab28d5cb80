import { requireFinite, requirePositive } from "../numeric/check.ts";

/**
 * Half-power width of a rain cell as a scatterer, from the rate at its centre.
 *
 * The rate falls as exp(-rho / rho0) with rho0 = (10 - 1.5 log R) / ln(R / 0.4), reflectivity as R^1.6.
 *
 * Source: ITU-R P.452-18, hydrometeor scatter, rain cell
 *
 * @param rainRateMmPerH  at the centre [mm/h], above 0.4
 * @throws RangeError on a rate of 0.4 mm/h or less, or one so large that no cell is left
 */
export function rainCellWidth({ rainRateMmPerH }: { readonly rainRateMmPerH: number }): {
  readonly widthKm: number;
} {
  if (!(rainRateMmPerH > 0.4)) {
    throw new RangeError(`rainRateMmPerH must be above 0.4, got ${rainRateMmPerH}`);
  }
  const radiusKm = (10 - 1.5 * Math.log10(rainRateMmPerH)) / Math.log(rainRateMmPerH / 0.4);
  requirePositive("radiusKm", radiusKm);
  return { widthKm: (2 * Math.LN2 * radiusKm) / 1.6 };
}

/**
 * Lowest height that a station sees at a distance over its horizon.
 *
 * Source: geometry over an Earth of effective radius; ITU-R P.452-18, equation 152, turned round
 *
 * @param stationAmslM       antenna above mean sea level [m]
 * @param horizonMrad        elevation of its horizon in that direction [mrad]
 * @param distanceKm         [km], above 0
 * @param effectiveRadiusKm  [km], above 0
 * @returns height above mean sea level [m]
 */
export function visibleHeight({
  stationAmslM,
  horizonMrad,
  distanceKm,
  effectiveRadiusKm,
}: {
  readonly stationAmslM: number;
  readonly horizonMrad: number;
  readonly distanceKm: number;
  readonly effectiveRadiusKm: number;
}): { readonly heightAmslM: number } {
  requireFinite("stationAmslM", stationAmslM);
  requireFinite("horizonMrad", horizonMrad);
  requirePositive("distanceKm", distanceKm);
  requirePositive("effectiveRadiusKm", effectiveRadiusKm);
  return {
    heightAmslM: stationAmslM + distanceKm * horizonMrad + (500 * distanceKm ** 2) / effectiveRadiusKm,
  };
}

/**
 * Height at which two stations should aim into a cell: half-way from what both see up to the rain height.
 *
 * Above the rain height the lowest height that both see is the best there is. Source: common practice, no source.
 *
 * @param visible1AmslM     lowest height that one station sees over the cell [m]
 * @param visible2AmslM     the same for the other station [m]
 * @param rainHeightAmslM   top of the rain above mean sea level [m]
 * @returns height [m], its excess over the rain height [m, at least 0], and whether the path closes on ice only:
 *   more than 2 km over the rain height
 */
export function scatterHeight({
  visible1AmslM,
  visible2AmslM,
  rainHeightAmslM,
}: {
  readonly visible1AmslM: number;
  readonly visible2AmslM: number;
  readonly rainHeightAmslM: number;
}): { readonly heightAmslM: number; readonly overRainM: number; readonly iceOnly: boolean } {
  requireFinite("visible1AmslM", visible1AmslM);
  requireFinite("visible2AmslM", visible2AmslM);
  requireFinite("rainHeightAmslM", rainHeightAmslM);
  const visible = Math.max(visible1AmslM, visible2AmslM);
  const heightAmslM = Math.max(visible, (visible + rainHeightAmslM) / 2);
  return {
    heightAmslM,
    overRainM: Math.max(0, heightAmslM - rainHeightAmslM),
    iceOnly: visible > rainHeightAmslM + 2000,
  };
}

/**
 * Scatter angle from the headings under which the cell sees the two stations.
 *
 * @returns 0 deg where the cell lies between them, 180 deg where they stand in the same direction
 */
export function scatterAngle({
  headingTo1Deg,
  headingTo2Deg,
}: {
  readonly headingTo1Deg: number;
  readonly headingTo2Deg: number;
}): { readonly scatterDeg: number } {
  requireFinite("headingTo1Deg", headingTo1Deg);
  requireFinite("headingTo2Deg", headingTo2Deg);
  const turn = Math.abs(headingTo1Deg - headingTo2Deg) % 360;
  return { scatterDeg: Math.abs(180 - turn) };
}
