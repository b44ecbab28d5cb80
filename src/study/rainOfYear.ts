import { specificRainAttenuation } from "../atmosphere/rainAttenuation.ts";
import { monthlyRainRate } from "../atmosphere/rainRate.ts";
import { zoneRainRate } from "../atmosphere/rainZones.ts";
import type { PathGeometry } from "../budget/types.ts";
import { rainFade, rainFadePercent, rainFadeValidity } from "../path/rainFade.ts";
import { wetSnowFade, wetSnowPercent } from "../path/wetSnow.ts";
import type { Climate, RainOfTheYear, Scenario } from "../scenario/types.ts";

/** Rain on a path over an average year: how deep it fades, how often, and how hard it then falls. */
export interface RainOfYear {
  readonly rainRate001MmPerH: number;
  readonly source: string;
  /** Fades at the ends of the model [dB]: of its commonest and of its rarest percentage. */
  readonly shallowDb: number;
  readonly deepDb: number;
  /** Share of the year beyond which it does not rain at all [%]; 100 where the climate does not tell. */
  readonly mostPercent: number;
  /** Share of the year in which a fade above 0 dB is exceeded [%]. */
  readonly percentOf: (fadeDb: number) => number;
  /** Rain rate exceeded for a share of the year, 0.001 to 1 % [mm/h]. */
  readonly rateAt: (percent: number) => number;
}

/** Tilt of the electric field from the horizontal, as P.838 takes it [deg]. */
const tiltDeg = { horizontal: 0, vertical: 90, circular: 45 } as const;

/** The steps of the distribution of rain heights add up to 2e-5 short of 1, so that 1 % itself is never reached. */
const COMMONEST_WITH_SNOW_PERCENT = 0.999;

/**
 * Rain of a climate on a path: P.530 from the rate of 0.01 %, with wet snow where the rain height is known.
 *
 * The rate at another percentage, which wets the covers, is that of the zone or of the monthly figures; where only
 * that of 0.01 % is known it is the rate whose attenuation stands to that of 0.01 % as the fades do (own choice).
 *
 * @throws RangeError on a climate whose map has not been read
 */
export function rainOfYear(scenario: Scenario, climate: Climate, { distanceKm }: PathGeometry): RainOfYear {
  const { frequencyGHz, polarization } = scenario;
  const { rain } = climate;
  const { rainRate001MmPerH, source, mostPercent = 100 } = rateOf001(rain);
  const path = { frequencyGHz, distanceKm, polarization, rainRate001MmPerH };
  const [rarest, commonest] = rainFadeValidity.percent;
  const fadeAt = (percent: number) => rainFade({ ...path, percent }).lossDb;
  const { alpha } = specificRainAttenuation({
    frequencyGHz,
    rainRateMmPerH: rainRate001MmPerH,
    tiltDeg: tiltDeg[polarization],
    elevationDeg: 0,
  });
  const rateAt = (percent: number): number => {
    if (rain.kind === "zone") return zoneRainRate({ zone: rain.zone, percent }).rainRateMmPerH;
    if (rain.kind === "monthly") return monthlyRainRate({ ...rain, percent }).rainRateMmPerH;
    if (rainRate001MmPerH === 0) return 0;
    return rainRate001MmPerH * (fadeAt(percent) / fadeAt(0.01)) ** (1 / alpha);
  };
  const percentOf = (fadeDb: number) => rainFadePercent({ ...path, fadeDb }).percent;
  const law = { rainRate001MmPerH, source, mostPercent: Math.max(mostPercent, commonest), rateAt };
  if (climate.meanRainHeightM === undefined) {
    return { ...law, percentOf, shallowDb: fadeAt(commonest), deepDb: fadeAt(rarest) };
  }
  const heights = [scenario.path.from, scenario.path.to].map(({ groundM, heightM }) => groundM + heightM);
  const under = {
    lowerAntennaM: Math.min(...heights),
    upperAntennaM: Math.max(...heights),
    meanRainHeightM: climate.meanRainHeightM,
    rainPercent: percentOf,
  };
  return {
    ...law,
    percentOf: (fadeDb) => wetSnowPercent({ ...under, fadeDb }).percent,
    shallowDb: wetSnowFade({ ...under, percent: COMMONEST_WITH_SNOW_PERCENT }).lossDb,
    deepDb: wetSnowFade({ ...under, percent: rarest }).lossDb,
  };
}

function rateOf001(
  rain: RainOfTheYear,
): Pick<RainOfYear, "rainRate001MmPerH" | "source"> & { readonly mostPercent?: number } {
  switch (rain.kind) {
    case "rate":
      return { rainRate001MmPerH: rain.rainRate001MmPerH, source: "scenario" };
    case "zone": {
      const { rainRateMmPerH, source } = zoneRainRate({ zone: rain.zone, percent: 0.01 });
      return { rainRate001MmPerH: rainRateMmPerH, source: `zone ${rain.zone} of ${source}` };
    }
    case "monthly": {
      const { rainRate001MmPerH, rainPercent } = monthlyRainRate({ ...rain, percent: 0.01 });
      const source = "twelve monthly figures by P.837-7";
      return { rainRate001MmPerH, source, mostPercent: rainPercent };
    }
    case "map": {
      if (rain.rainRate001MmPerH === undefined)
        throw new RangeError("the map of the climate has not been read");
      return { rainRate001MmPerH: rain.rainRate001MmPerH, source: "map of P.837, half-way along the path" };
    }
  }
}
