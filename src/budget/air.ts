import { cloudLiquidCoefficient, cloudValidity } from "../atmosphere/cloudLiquid.ts";
import { gasValidity, specificGasAttenuation } from "../atmosphere/gasAttenuation.ts";
import {
  saturationPressure,
  vapourPressureFromDensity,
  vapourPressureFromDewPoint,
  vapourPressureFromHumidity,
} from "../atmosphere/humidity.ts";
import { rainValidity, specificRainAttenuation } from "../atmosphere/rainAttenuation.ts";
import { referenceAtmosphere } from "../atmosphere/referenceAtmosphere.ts";
import { outside } from "../numeric/check.ts";
import { ZERO_CELSIUS_K } from "../numeric/constants.ts";
import { freeSpaceLoss } from "../path/freeSpaceLoss.ts";
import { effectiveRainLength, rainFadeValidity } from "../path/rainFade.ts";
import type { Scenario, Weather } from "../scenario/types.ts";
import { type Doubts, doubtsOf } from "./doubts.ts";
import { type Entry, lossEntry, sumOf } from "./entry.ts";
import { idleInputs } from "./idleInputs.ts";
import { overreachWarning } from "./overreach.ts";
import type { PathGeometry, PreparedWeather, Warning } from "./types.ts";

/** Ends further apart in height than this are averaged over three heights [m]: common practice, no source. */
const LEVEL_PATH_M = 500;

interface Air {
  readonly temperatureK: number;
  readonly dryPressureHPa: number;
  readonly vapourPressureHPa: number;
}

/** Tilt of the electric field from the horizontal, as P.838 takes it [deg]. */
const tiltDeg = { horizontal: 0, vertical: 90, circular: 45 } as const;

/** Entries of the path in one weather: free space, gases, rain, fog. */
export function prepareWeather(
  scenario: Scenario,
  path: PathGeometry,
  weather: Weather,
  where: string,
): PreparedWeather {
  const warnings: Warning[] = idleInputs(weather, where);
  const { frequencyGHz } = scenario;
  const heightsKm = [path.from, path.to].map(({ groundM, heightM }) => (groundM + heightM) / 1000);
  const meanKm = (heightsKm[0]! + heightsKm[1]!) / 2;
  const slantKm = Math.hypot(path.distanceKm, heightsKm[0]! - heightsKm[1]!);
  const ambient = airAt(meanKm, weather);
  if (saturated(ambient, weather)) {
    warnings.push({
      code: "supersaturated",
      message: "more water vapour than the air can hold at its temperature",
      where,
    });
  }

  const doubts = doubtsOf(scenario);
  const gas = gasLossPerKm(frequencyGHz, weather, heightsKm) * slantKm;
  warnings.push(...outside(gasValidity, { frequencyGHz }).map(overreachWarning("gases by P.676", where)));
  const rain = rainLoss(scenario, doubts, path, weather, where, warnings);
  const fog = fogLoss(scenario, doubts, path, weather, ambient.temperatureK, where, warnings);

  return {
    weather,
    entries: [freeSpaceEntry(frequencyGHz, slantKm, path), gasEntry(gas, doubts.gasShare), ...rain, ...fog],
    rainLossDb: 0 - sumOf(rain, "db"),
    hydrometeorLossDb: 0 - sumOf([...rain, ...fog], "db"),
    ambientK: ambient.temperatureK,
    warnings,
  };
}

function freeSpaceEntry(frequencyGHz: number, distanceKm: number, { from, to }: PathGeometry): Entry {
  const { lossDb } = freeSpaceLoss({ frequencyGHz, distanceKm });
  // The formula is exact; what is uncertain is where a short locator leaves the stations (flat over the cell).
  const doubtKm = Math.min(from.positionErrorKm + to.positionErrorKm, 0.9 * distanceKm) / Math.sqrt(3);
  const sigma = freeSpaceLoss({ frequencyGHz, distanceKm: distanceKm + doubtKm }).lossDb - lossDb;
  const heading = { id: "path.free_space", stage: "path", label: "free space", source: "P.525-4" } as const;
  return lossEntry(heading, lossDb, sigma);
}

function gasEntry(loss: number, share: number): Entry {
  const source = "P.676-13 Annex 1, P.835-6";
  const heading = { id: "path.gas", stage: "path", label: "oxygen and water vapour", source } as const;
  return lossEntry(heading, loss, share * loss);
}

/** Air at a height: the reference atmosphere, with what the scenario states in its place. */
function airAt(heightKm: number, weather: Weather): Air {
  const reference = referenceAtmosphere({ heightKm });
  const temperatureK =
    weather.temperatureC === undefined ? reference.temperatureK : weather.temperatureC + ZERO_CELSIUS_K;
  const temperatureC = temperatureK - ZERO_CELSIUS_K;
  const pressureHPa = weather.pressureHPa ?? reference.pressureHPa;
  const vapourPressureHPa = vapourPressure(weather, { temperatureC, temperatureK, pressureHPa }, reference);
  return { temperatureK, vapourPressureHPa, dryPressureHPa: pressureHPa - vapourPressureHPa };
}

function vapourPressure(
  weather: Weather,
  air: { temperatureC: number; temperatureK: number; pressureHPa: number },
  reference: { vapourDensityGm3: number },
): number {
  const { humidityPercent, dewPointC, vapourDensityGPerM3 } = weather;
  if (humidityPercent !== undefined) {
    return vapourPressureFromHumidity({ relativeHumidityPercent: humidityPercent, ...air }).vapourPressureHPa;
  }
  if (dewPointC !== undefined) return vapourPressureFromDewPoint({ dewPointC, ...air }).vapourPressureHPa;
  const vapourDensityGm3 = vapourDensityGPerM3 ?? reference.vapourDensityGm3;
  const fromDensity = vapourPressureFromDensity({ vapourDensityGm3, ...air }).vapourPressureHPa;
  // The reference air's vapour, brought to a colder temperature, would be more than that air can hold.
  if (vapourDensityGPerM3 !== undefined) return fromDensity;
  return Math.min(fromDensity, saturationPressure(air).saturationPressureHPa);
}

function saturated({ temperatureK, vapourPressureHPa, dryPressureHPa }: Air, weather: Weather): boolean {
  if (weather.dewPointC === undefined && weather.vapourDensityGPerM3 === undefined) return false;
  const pressureHPa = dryPressureHPa + vapourPressureHPa;
  const temperatureC = temperatureK - ZERO_CELSIUS_K;
  return vapourPressureHPa > 1.001 * saturationPressure({ temperatureC, pressureHPa }).saturationPressureHPa;
}

/** Mean specific attenuation over the path [dB/km]: at its mean height, or by Simpson where it climbs. */
function gasLossPerKm(frequencyGHz: number, weather: Weather, [from, to]: readonly number[]): number {
  const at = (heightKm: number) =>
    specificGasAttenuation({ frequencyGHz, ...airAt(heightKm, weather) }).totalDbPerKm;
  const middle = at((from! + to!) / 2);
  if (1000 * Math.abs(from! - to!) <= LEVEL_PATH_M) return middle;
  return (at(from!) + 4 * middle + at(to!)) / 6;
}

function rainLoss(
  { frequencyGHz, polarization }: Scenario,
  { rainLengthShare }: Doubts,
  { distanceKm, elevationDeg, backElevationDeg }: PathGeometry,
  { rainMmPerH, rainFadeDb, extentKm }: Weather,
  where: string,
  warnings: Warning[],
): Entry[] {
  if (rainFadeDb !== undefined) {
    const heading = { id: "path.rain", stage: "path", label: "rain of a year", source: "P.530-18" } as const;
    return [lossEntry(heading, rainFadeDb, rainLengthShare * rainFadeDb)];
  }
  const { value: rainRateMmPerH, sigma: rateSigma = 0 } = rainMmPerH;
  if (rainRateMmPerH === 0) return [];
  const { alpha, dbPerKm } = specificRainAttenuation({
    frequencyGHz,
    rainRateMmPerH,
    tiltDeg: tiltDeg[polarization],
    elevationDeg: (elevationDeg - backElevationDeg) / 2, // of the chord: the same from either end
  });
  const effective = effectiveRainLength({ frequencyGHz, rainRateMmPerH, alpha, distanceKm });
  const lengthKm = Math.min(distanceKm, extentKm ?? effective.lengthKm);
  warnings.push(...outside(rainValidity, { frequencyGHz }).map(overreachWarning("rain by P.838", where)));
  if (extentKm === undefined) {
    const values = { frequencyGHz, distanceKm };
    warnings.push(...outside(rainFadeValidity, values).map(overreachWarning("rain length by P.530", where)));
  } else if (extentKm > distanceKm) {
    warnings.push({
      code: "extent_beyond_path",
      message: `rain over ${extentKm} km is longer than the path; all ${distanceKm.toFixed(1)} km are taken`,
      where: `${where}.extent`,
    });
  }
  const loss = dbPerKm * lengthKm;
  const source =
    extentKm === undefined ? "P.838-3 over P.530's effective length" : "P.838-3 over the stated extent";
  const label = `rain, ${lengthKm.toFixed(1)} km of it`;
  const sigma = Math.hypot(rainLengthShare * loss, ((alpha * rateSigma) / rainRateMmPerH) * loss);
  return [lossEntry({ id: "path.rain", stage: "path", label, source }, loss, sigma)];
}

function fogLoss(
  { frequencyGHz }: Scenario,
  { fogShare }: Doubts,
  { distanceKm }: PathGeometry,
  { fogGPerM3, fogExtentKm = distanceKm }: Weather,
  temperatureK: number,
  where: string,
  warnings: Warning[],
): Entry[] {
  if (fogGPerM3 === 0) return [];
  warnings.push(...outside(cloudValidity, { frequencyGHz }).map(overreachWarning("fog by P.840", where)));
  const { dbPerKmPerGm3 } = cloudLiquidCoefficient({ frequencyGHz, temperatureK });
  const loss = dbPerKmPerGm3 * fogGPerM3 * Math.min(distanceKm, fogExtentKm);
  const heading = { id: "path.fog", stage: "path", label: "fog", source: "P.840-9" } as const;
  return [lossEntry(heading, loss, fogShare * loss)];
}
