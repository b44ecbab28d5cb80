import { requireWithin, type Validity } from "../numeric/check.ts";
import { vapourDensity, vapourPressureFromDensity } from "./humidity.ts";

export interface Atmosphere {
  readonly temperatureK: number;
  readonly pressureHPa: number;
  readonly dryPressureHPa: number;
  readonly vapourPressureHPa: number;
  readonly vapourDensityGm3: number;
}

export const atmosphereValidity = { heightKm: [0, 100] } as const satisfies Validity;

/** P.835-6 Annex 1: layers below 86 km by geopotential height [km'], a boundary belonging to the lower one. */
const layers: readonly {
  readonly z0: number;
  readonly top: number;
  readonly t0: number;
  readonly lapse: number;
  readonly p0: number;
}[] = [
  { z0: 0, top: 11, t0: 288.15, lapse: -6.5, p0: 1013.25 },
  { z0: 11, top: 20, t0: 216.65, lapse: 0, p0: 226.3226 },
  { z0: 20, top: 32, t0: 216.65, lapse: 1, p0: 54.7498 },
  { z0: 32, top: 47, t0: 228.65, lapse: 2.8, p0: 8.680422 },
  { z0: 47, top: 51, t0: 270.65, lapse: 0, p0: 1.109106 },
  { z0: 51, top: 71, t0: 270.65, lapse: -2.8, p0: 0.6694167 },
  { z0: 71, top: 84.852, t0: 214.65, lapse: -2, p0: 0.03956649 },
];

/** Weight of the air over its gas constant [K/km']. */
const HYDROSTATIC_K_PER_KM = 34.1632;

const SEA_LEVEL_VAPOUR_G_M3 = 7.5;
const VAPOUR_SCALE_HEIGHT_KM = 2;
/** High up the vapour thins out no faster than the air: the least mixing ratio e/P. */
const LEAST_MIXING_RATIO = 2e-6;

/**
 * The mean annual global reference atmosphere at a height.
 *
 * Source: ITU-R P.835-6 (12/2017) Annex 1 section 1
 * Valid:  0 to 100 km; for land below sea level the lowest layer is carried on. The standard itself steps by
 *         0.08 K at 86 km.
 *
 * @param heightKm  geometric height above sea level [km], -1 to 100
 * @returns temperature [K]; total, dry and vapour pressure [hPa]; vapour density [g/m3]
 * @throws RangeError outside -1 to 100 km
 */
export function referenceAtmosphere({ heightKm: h }: { readonly heightKm: number }): Atmosphere {
  requireWithin("heightKm", h, -1, 100);
  const { temperatureK, pressureHPa } = h < 86 ? belowMesopause(h) : aboveMesopause(h);
  const thinning = SEA_LEVEL_VAPOUR_G_M3 * Math.exp(-h / VAPOUR_SCALE_HEIGHT_KM);
  const { vapourPressureHPa: thinned } = vapourPressureFromDensity({
    vapourDensityGm3: thinning,
    temperatureK,
  });
  const vapourPressureHPa = Math.max(thinned, LEAST_MIXING_RATIO * pressureHPa);
  return {
    temperatureK,
    pressureHPa,
    dryPressureHPa: pressureHPa - vapourPressureHPa,
    vapourPressureHPa,
    ...vapourDensity({ vapourPressureHPa, temperatureK }),
  };
}

type Air = Pick<Atmosphere, "temperatureK" | "pressureHPa">;

function belowMesopause(h: number): Air {
  const z = (6356.766 * h) / (6356.766 + h);
  const { z0, t0, lapse, p0 } = layers.find(({ top }) => z <= top) ?? layers.at(-1)!;
  const temperatureK = t0 + lapse * (z - z0);
  const pressureHPa =
    lapse === 0
      ? p0 * Math.exp((-HYDROSTATIC_K_PER_KM * (z - z0)) / t0)
      : p0 * (t0 / temperatureK) ** (HYDROSTATIC_K_PER_KM / lapse);
  return { temperatureK, pressureHPa };
}

function aboveMesopause(h: number): Air {
  return {
    temperatureK: h <= 91 ? 186.8673 : 263.1905 - 76.3232 * Math.sqrt(1 - ((h - 91) / 19.9429) ** 2),
    pressureHPa: Math.exp(
      95.571899 - 4.011801 * h + 6.424731e-2 * h ** 2 - 4.78966e-4 * h ** 3 + 1.340543e-6 * h ** 4,
    ),
  };
}
