import { gammaOfReturnLoss } from "../cover/reflectionFigures.ts";
import type { EndName, Scenario, Weather } from "../scenario/types.ts";
import { prepareWeather } from "./air.ts";
import { antennaEntries, type EndHeading, endHeading } from "./antennaEntries.ts";
import { dishCoverOver, NO_DISH_COVER } from "./dishCover.ts";
import { doubtsOf } from "./doubts.ts";
import { type Entry, gainEntry, lossEntry } from "./entry.ts";
import { geometryOf, geometryWarnings } from "./geometry.ts";
import { countedGround } from "./groundPath.ts";
import { mapValues } from "./mapValues.ts";
import { foliageEntries, foliageWarnings } from "./mechanisms.ts";
import { isNothing, mouthUnder } from "./mouth.ts";
import type { Link, PathGeometry, PreparedEnd, PreparedWeather, Warning, Wetness } from "./types.ts";

/** 1-sigma of a power read with coupler and diode, and of a line's loss out of a table [dB]: common practice, no source. */
const POWER_SIGMA_DB = 0.7;
const LINE_SIGMA_DB = 0.3;

/** Water on a cover where the weather names no temperature [degC]: common practice, no source. */
const USUAL_WATER_C = 10;
/** Dish whose size the scenario does not state, for the water that runs down its cover [m]. */
const USUAL_DISH_M = 0.6;

/**
 * Everything of a scenario that does not depend on the case, computed once: geometry, antennas, air by weather,
 * and each feed's mouth under each cover in each weather.
 *
 * @throws RangeError on a scenario that `loadScenario` would have refused (the same place twice, a name that
 *         leads nowhere)
 */
export function prepare(scenario: Scenario): Link {
  const path = geometryOf(scenario);
  const weathers = mapValues(scenario.weather, (weather, name) =>
    prepareWeather(scenario, path, weather, `weather.${name}`),
  );
  const ends = {
    transmitter: prepareEnds(scenario, "transmitter", path, weathers),
    receiver: prepareEnds(scenario, "receiver", path, weathers),
  };
  const ground = countedGround(scenario, path);
  const warnings = [...geometryWarnings(path, scenario.path), ...foliageWarnings(scenario)];
  const foliage = foliageEntries(scenario);
  const doubts = doubtsOf(scenario);
  return { scenario, path, ground, foliage, ends, weathers, modes: scenario.modes, doubts, warnings };
}

/** The same link with one weather more, or another one under the same name: what a sweep of the rain rate needs. */
export function withWeather(link: Link, name: string, weather: Weather): Link {
  const scenario = { ...link.scenario, weather: { ...link.scenario.weather, [name]: weather } };
  const prepared = prepareWeather(scenario, link.path, weather, `weather.${name}`);
  const onEnd = (end: EndName) => mapValues(link.ends[end], (ready) => inWeather(ready, end, name, prepared));
  return {
    ...link,
    scenario,
    ends: { transmitter: onEnd("transmitter"), receiver: onEnd("receiver") },
    weathers: { ...link.weathers, [name]: prepared },
  };
}

/** An end made ready for one weather more. A cover over the dish keeps the weather off the feed behind it. */
function inWeather(ready: PreparedEnd, end: EndName, name: string, weather: PreparedWeather): PreparedEnd {
  const wetness = wetnessAt(end, weather);
  const onMouth = ready.isSheltered ? undefined : wetness;
  return {
    ...ready,
    mouth: mapValues(ready.mouth, (byWeather, cover) => ({
      ...byWeather,
      [name]: ready.mouthUnder[cover]!(onMouth),
    })),
    dishCover: { ...ready.dishCover, [name]: ready.dishCoverOver(wetness) },
  };
}

/** Both ends may try any feed that suits their dish. */
function prepareEnds(
  scenario: Scenario,
  end: EndName,
  path: PathGeometry,
  weathers: Link["weathers"],
): Record<string, PreparedEnd> {
  const { dish: dishName, feed: own } = scenario[end];
  const dish = dishName === undefined ? undefined : scenario.dish[dishName]!;
  const suits = (name: string) => {
    const feed = scenario.feeds[name]!;
    if (dish === undefined) return (feed.gainDbi ?? feed.pyramidalHorn ?? feed.conicalHorn) !== undefined;
    return dish.focalRatio === undefined || (feed.edgeTaperDb ?? feed.tenDbWidthDeg) !== undefined;
  };
  const names = Object.keys(scenario.feeds).filter((name) => name === own || suits(name));
  return Object.fromEntries(names.map((name) => [name, prepareEnd(scenario, end, name, path, weathers)]));
}

/** One end with one of its feeds, under every cover in every weather. */
export function prepareEnd(
  scenario: Scenario,
  end: EndName,
  feedName: string,
  path: PathGeometry,
  weathers: Link["weathers"],
): PreparedEnd {
  const { frequencyGHz, covers } = scenario;
  const doubts = doubtsOf(scenario);
  const feed = scenario.feeds[feedName]!;
  const { lineLossDb, dish: dishName, dishCover } = scenario[end];
  const dish = dishName === undefined ? undefined : scenario.dish[dishName]!;
  const diameterM = dish?.diameterM ?? USUAL_DISH_M;
  const overDish = dishCover === undefined || isNothing(covers[dishCover]!) ? undefined : covers[dishCover];
  const heading = endHeading(end);
  const antenna = antennaEntries(heading, frequencyGHz, feed, dish);
  const lineSigma = lineLossDb.sigma ?? Math.min(LINE_SIGMA_DB, lineLossDb.value / 2);
  const mouths = mapValues(covers, (cover, name) =>
    mouthUnder(heading, { frequencyGHz, feed, cover, beam: antenna.beam }, doubts, name),
  );
  const gamma = gammaOfReturnLoss("returnLossDb", feed.returnLossDb);
  const ready: PreparedEnd = {
    ...(end === "transmitter" && { power: powerEntry(heading, scenario) }),
    line: lossEntry(heading("line", "line and joints", "scenario"), lineLossDb.value, lineSigma),
    antenna: antenna.entries,
    beamwidthDeg: antenna.beamwidthDeg,
    farFieldM: antenna.farFieldM,
    mouthUnder: mouths,
    isSheltered: overDish !== undefined,
    dishCoverOver:
      overDish === undefined
        ? () => NO_DISH_COVER
        : dishCoverOver(heading, frequencyGHz, overDish, `covers.${dishCover}`, diameterM, gamma, doubts),
    mouth: mapValues(mouths, () => ({})),
    dishCover: {},
    warnings: aimWarnings(end, antenna, path),
  };
  return Object.entries(weathers).reduce((done, [name, one]) => inWeather(done, end, name, one), ready);
}

export function powerEntry(heading: EndHeading, { transmitter: { powerDbm } }: Scenario): Entry {
  const { value, sigma = POWER_SIGMA_DB } = powerDbm;
  return gainEntry(heading("power", "transmitter power", "scenario"), value, sigma);
}

/** Rain on the covers of one end; a cover may be wet without rain on the path, and dry while it rains. */
export function wetnessAt(end: EndName, { weather, rainLossDb }: PreparedWeather): Wetness | undefined {
  if (!weather.wets.includes(end)) return undefined;
  return {
    rainRateMmPerH: weather.coversWetAsAtMmPerH ?? weather.rainMmPerH.value,
    pathRainDb: rainLossDb,
    windMPerS: weather.windMPerS,
    driedForMin: weather.driedForMin,
    dewMm: {
      low: Math.max(0, weather.dewMm.value - (weather.dewMm.sigma ?? 0)),
      nominal: weather.dewMm.value,
      high: weather.dewMm.value + (weather.dewMm.sigma ?? 0),
    },
    iceMm: weather.iceMm,
    snow: weather.snow,
    temperatureC: weather.temperatureC ?? (weather.iceMm > 0 || weather.snow ? 0 : USUAL_WATER_C),
  };
}

/** Doubts about where an end points and how far off the other stands. */
export function aimWarnings(
  end: EndName,
  { beamwidthDeg, farFieldM }: Pick<PreparedEnd, "beamwidthDeg" | "farFieldM">,
  path: PathGeometry,
): Warning[] {
  const warnings: Warning[] = [];
  const { headingErrorDeg, distanceKm } = path;
  if (beamwidthDeg !== undefined && headingErrorDeg > beamwidthDeg / 4) {
    warnings.push({
      code: "locator_too_short",
      message:
        `the locators leave the heading uncertain by ${headingErrorDeg.toFixed(1)} deg, more than a quarter of ` +
        `the beamwidth of ${beamwidthDeg.toFixed(1)} deg; use more characters or coordinates`,
      where: `path, ${end}`,
    });
  }
  if (farFieldM !== undefined && farFieldM > 1000 * distanceKm) {
    warnings.push({
      code: "near_field",
      message: `the far field of the dish begins at ${Math.round(farFieldM)} m, beyond the other end; gains come out lower`,
      where: end,
    });
  }
  return warnings;
}
