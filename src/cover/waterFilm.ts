import { waterPermittivity } from "../atmosphere/waterPermittivity.ts";
import { requireFinite, requireNotNegative, requirePositive, requireWithin } from "../numeric/check.ts";
import { RADIANS_PER_DEGREE, STANDARD_GRAVITY_M_PER_S2, ZERO_CELSIUS_K } from "../numeric/constants.ts";
import { interpolateLinear } from "../numeric/interpolate.ts";
import { type Layer, layerOf } from "./layeredSheet.ts";

export interface WaterFilmInput {
  readonly shape: "dome" | "plate";
  readonly sizeM: number;
  readonly tiltDeg?: number | undefined;
  readonly windRatio?: number | undefined;
  readonly rainRateMmPerH: number;
  readonly temperatureC: number;
}

export interface WaterFilm {
  /** Thickness at the lower edge. */
  readonly edgeMm: number;
  /** Thickness averaged over the surface. */
  readonly meanMm: number;
  /** True where the plate is too level to drain: the thickness is then that of standing water. */
  readonly standing: boolean;
}

/** Kinematic viscosity of water [1e-6 m^2/s] over temperature [degC]; handbook values from memory. */
const viscosityTemperaturesC = [0, 5, 10, 15, 20, 25, 30];
const viscosities = [1.787, 1.519, 1.307, 1.139, 1.004, 0.893, 0.801];

/** Tilt below which a plate is taken to hold standing water [deg]; own choice, the film law has no such limit. */
const STANDING_BELOW_DEG = 5;

/** Middle of the 1 to 2.5 mm to which water stands by capillarity [mm]; from memory. */
const STANDING_DEPTH_MM = 1.75;

/**
 * Thickness of the water film that steady rain keeps on a surface that wets.
 *
 * Laminar film draining by gravity, flow per width g sin(beta) h^3/(3 nu). On a dome catch and slope grow
 * together, so the film is even: h = (3 nu R r/(2 g))^(1/3). On a plate h(x) = (3 nu R_n x/(g sin beta))^(1/3)
 * with R_n = R (cos beta + w sin beta), and the mean is 3/4 of the thickness at the lower edge.
 *
 * Source: Gibble 1964 (IEEE Int. Conv. Rec. 12 part 6) and Blevis 1965 (IEEE Trans. AP-13, 175) for the dome;
 *         the plate by the same balance, own derivation. Viscosity from memory.
 * Valid:  covers up to about 1 m (laminar flow), no wind shear, no run-off from above; in calm rain a plate that
 *         is vertical or faces down stays dry. Below 5 deg of tilt the law fails: standing water is returned
 *         and flagged. Viscosity is held below 0 and above 30 degC.
 *
 * @param shape           "dome": hemisphere, sizeM its radius; "plate": sizeM its length along the slope
 * @param sizeM           [m], above 0
 * @param tiltDeg         plate only: angle from the horizontal [deg], 0 to 180, above 90 facing down; default 90
 * @param windRatio       plate only: wind speed towards the plate over the fall speed of the drops (about
 *                        6.5 m/s; common practice, no source), default 0, negative from behind
 * @param rainRateMmPerH  [mm/h], at least 0
 * @param temperatureC    water temperature [degC]
 * @throws RangeError on an argument outside these ranges
 */
export function waterFilm({
  shape,
  sizeM,
  tiltDeg = 90,
  windRatio = 0,
  rainRateMmPerH,
  temperatureC,
}: WaterFilmInput): WaterFilm {
  requirePositive("sizeM", sizeM);
  requireNotNegative("rainRateMmPerH", rainRateMmPerH);
  requireFinite("temperatureC", temperatureC);
  requireWithin("tiltDeg", tiltDeg, 0, 180);
  requireFinite("windRatio", windRatio);

  const viscosityM2PerS = 1e-6 * interpolateLinear(viscosityTemperaturesC, viscosities, temperatureC);
  const drained = (3 * viscosityM2PerS * sizeM) / STANDARD_GRAVITY_M_PER_S2;
  const rainMPerS = rainRateMmPerH / 3.6e6;
  if (shape === "dome") {
    const thicknessMm = 1e3 * Math.cbrt((drained * rainMPerS) / 2);
    return { edgeMm: thicknessMm, meanMm: thicknessMm, standing: false };
  }

  const catchMPerS = rainMPerS * (cosDeg(tiltDeg) + windRatio * sinDeg(tiltDeg));
  if (catchMPerS <= 0) return { edgeMm: 0, meanMm: 0, standing: false };
  if (tiltDeg < STANDING_BELOW_DEG) {
    return { edgeMm: STANDING_DEPTH_MM, meanMm: STANDING_DEPTH_MM, standing: true };
  }
  const edgeMm = 1e3 * Math.cbrt((drained * catchMPerS) / sinDeg(tiltDeg));
  return { edgeMm, meanMm: 0.75 * edgeMm, standing: false };
}

/**
 * Liquid water as a layer of a stack, permittivity by `waterPermittivity`.
 *
 * @param thicknessMm   [mm], at least 0
 * @param frequencyGHz  [GHz]
 * @param temperatureC  [degC]
 */
export function waterLayer({
  thicknessMm,
  frequencyGHz,
  temperatureC,
}: {
  readonly thicknessMm: number;
  readonly frequencyGHz: number;
  readonly temperatureC: number;
}): Layer {
  const temperatureK = temperatureC + ZERO_CELSIUS_K;
  return layerOf(waterPermittivity({ frequencyGHz, temperatureK }), thicknessMm);
}

/** Exactly 0 at 90 deg, where rounding would leave a trace of rain on a vertical plate. */
function cosDeg(angleDeg: number): number {
  return angleDeg === 90 ? 0 : Math.cos(angleDeg * RADIANS_PER_DEGREE);
}

function sinDeg(angleDeg: number): number {
  return Math.sin(angleDeg * RADIANS_PER_DEGREE);
}
