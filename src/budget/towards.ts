import type { Profile } from "../path/profile.ts";
import type { TerrainGap } from "../scenario/terrain/types.ts";
import type { Dish, EndName, Scenario, ScenarioPath, Site, Uncertain, Weather } from "../scenario/types.ts";
import { prepareWeather } from "./air.ts";
import { endHeading } from "./antennaEntries.ts";
import { geometryOf, geometryWarnings } from "./geometry.ts";
import { countedGround } from "./groundPath.ts";
import { mapValues } from "./mapValues.ts";
import { foliageEntries, foliageWarnings } from "./mechanisms.ts";
import { aimWarnings, powerEntry, prepare, prepareEnd, wetnessAt } from "./prepare.ts";
import { startsFromPathRain } from "./publishedWater.ts";
import type { Link, PathGeometry, PreparedEnd, PreparedWeather } from "./types.ts";

/** A path both ways: `out` as the scenario has it, `back` with the ends' parts changed over. */
export interface BothWays {
  readonly out: Link;
  readonly back: Link;
}

/** Another station at the far end; what it does not state is as at the scenario's far end. */
export interface FarEnd {
  readonly site: Site;
  /** Ground from the near end to this one, where it is known. */
  readonly profile?: Profile | undefined;
  readonly gaps?: readonly TerrainGap[] | undefined;
  /** What it transmits with; the near end's power where not stated. */
  readonly powerDbm?: Uncertain | undefined;
  readonly noiseFigureDb?: Uncertain | undefined;
}

/** Name under which a far end's own dish stands in the scenario. */
const OWN_DISH = "dish of the far end";

/**
 * Everything of a scenario that does not depend on the case, for both ways over its path.
 *
 * On the way back the far end transmits with the near end's power, and the near end hears with the receiver that the
 * scenario gives the far one.
 *
 * @throws RangeError as `prepare`
 */
export function bothWays(scenario: Scenario): BothWays {
  return { out: prepare(scenario), back: prepare(turned(scenario)) };
}

/** The same scenario from the other end: who transmitted receives, with the same dish, feed, covers, ground and trees. */
export function turned(scenario: Scenario): Scenario {
  const { transmitter, receiver, path, weather } = scenario;
  const { powerDbm, ...near } = transmitter;
  const { noiseFigureDb, antennaTemperatureK, modes, ...far } = receiver;
  return {
    ...scenario,
    transmitter: { ...far, powerDbm },
    receiver: { ...near, noiseFigureDb, antennaTemperatureK, modes },
    path: turnedPath(path),
    weather: Object.fromEntries(Object.entries(weather).map(([name, one]) => [name, turnedWeather(one)])),
  };
}

function turnedWeather(weather: Weather): Weather {
  const other = { transmitter: "receiver", receiver: "transmitter" } as const;
  return { ...weather, wets: weather.wets.map((end) => other[end]) };
}

function turnedPath(path: ScenarioPath): ScenarioPath {
  const { from, to, profile, gaps, foliageM, coastKm } = path;
  const lengthKm = profile?.distancesKm[profile.distancesKm.length - 1] ?? 0;
  return {
    ...path,
    from: to,
    to: from,
    profile: profile && {
      ...profile,
      distancesKm: Array.from(profile.distancesKm, (km) => lengthKm - km).reverse(),
      heightsM: Array.from(profile.heightsM).reverse(),
      ...(profile.coverM && { coverM: Array.from(profile.coverM).reverse() }),
      ...(profile.zones && { zones: profile.zones.toReversed() }),
    },
    gaps: gaps
      ?.map((gap) => ({ ...gap, fromKm: lengthKm - gap.toKm, toKm: lengthKm - gap.fromKm }))
      .toReversed(),
    foliageM: foliageM && { from: foliageM.to, to: foliageM.from },
    coastKm: coastKm && { from: coastKm.to, to: coastKm.from },
  };
}

/** The same ways from another site of the near end, with all of its parts; `towards` is to follow, for geometry is not worked out. */
export function fromSite({ out, back }: BothWays, site: Site): BothWays {
  const at = (link: Link, end: "from" | "to"): Link => ({
    ...link,
    scenario: { ...link.scenario, path: { ...link.scenario.path, [end]: site } },
  });
  return { out: at(out, "from"), back: at(back, "to") };
}

/**
 * The same ways towards another station: only what depends on where it stands is worked out anew (geometry, air,
 * ground, aim), the antennas and the mouths under their covers are kept. Equal to `bothWays` of a scenario rewritten
 * with that station; on the way back to rounding, for the path's losses are taken from the way out.
 *
 * @throws RangeError on a station at the near end's own place
 */
export function towards({ out, back }: BothWays, far: FarEnd): BothWays {
  const outScenario = withFarEnd(out.scenario, far);
  const path = geometryOf(outScenario);
  const weathers = mapValues(outScenario.weather, (weather, name) =>
    prepareWeather(outScenario, path, weather, `weather.${name}`),
  );
  const ground = countedGround(outScenario, path);
  const shared = {
    ground,
    foliage: foliageEntries(outScenario),
    warnings: [...geometryWarnings(path, outScenario.path), ...foliageWarnings(outScenario)],
  };
  const backScenario = {
    ...back.scenario,
    transmitter: {
      ...back.scenario.transmitter,
      powerDbm: far.powerDbm ?? back.scenario.transmitter.powerDbm,
    },
    path: { ...back.scenario.path, from: far.site },
  };
  const backPath = seenFromFarEnd(path);
  const backWeathers = mapValues(weathers, (air, name) => ({
    ...air,
    weather: back.scenario.weather[name]!,
  }));
  const backEnds = endsTowards(back, backPath, backWeathers);
  const power = far.powerDbm && powerEntry(endHeading("transmitter"), backScenario);
  return {
    out: { ...out, ...shared, scenario: outScenario, path, weathers, ends: endsTowards(out, path, weathers) },
    back: {
      ...back,
      ...shared,
      scenario: backScenario,
      path: backPath,
      weathers: backWeathers,
      ends: {
        ...backEnds,
        transmitter: power
          ? mapValues(backEnds.transmitter, (end) => ({ ...end, power }))
          : backEnds.transmitter,
      },
    },
  };
}

/**
 * The same ways with another dish at the far end, which then has its own feed alone.
 *
 * @throws RangeError on a dish of known shape whose feed has no known pattern
 */
export function withFarDish({ out, back }: BothWays, dish: Dish): BothWays {
  const named = (scenario: Scenario, end: EndName): Scenario => ({
    ...scenario,
    dish: { ...scenario.dish, [OWN_DISH]: dish },
    [end]: { ...scenario[end], dish: OWN_DISH },
  });
  const fitted = (link: Link, end: EndName): Link => {
    const scenario = named(link.scenario, end);
    const { feed } = scenario[end];
    const ready = prepareEnd(scenario, end, feed, link.path, link.weathers);
    return { ...link, scenario, ends: { ...link.ends, [end]: { [feed]: ready } } };
  };
  return { out: fitted(out, "receiver"), back: fitted(back, "transmitter") };
}

function withFarEnd(scenario: Scenario, { site, profile, gaps, noiseFigureDb }: FarEnd): Scenario {
  return {
    ...scenario,
    path: { ...scenario.path, to: site, profile, gaps },
    receiver: noiseFigureDb ? { ...scenario.receiver, noiseFigureDb } : scenario.receiver,
  };
}

function seenFromFarEnd(path: PathGeometry): PathGeometry {
  return {
    ...path,
    headingDeg: path.backHeadingDeg,
    backHeadingDeg: path.headingDeg,
    elevationDeg: path.backElevationDeg,
    backElevationDeg: path.elevationDeg,
    from: path.to,
    to: path.from,
  };
}

function endsTowards(link: Link, path: PathGeometry, weathers: Link["weathers"]): Link["ends"] {
  const { covers } = link.scenario;
  const byPathRain = Object.keys(covers).filter((name) => startsFromPathRain(covers[name]!));
  const at = (end: EndName) => {
    const { dishCover } = link.scenario[end];
    const dishCoverByPathRain = dishCover !== undefined && byPathRain.includes(dishCover);
    return mapValues(link.ends[end], (ready) => {
      const aimed = { ...ready, warnings: aimWarnings(end, ready, path) };
      if (byPathRain.length === 0) return aimed;
      return {
        ...aimed,
        ...(!ready.isSheltered && { mouth: mouthsInRain(ready, end, byPathRain, weathers) }),
        ...(dishCoverByPathRain && {
          dishCover: mapValues(weathers, (weather) => ready.dishCoverOver(wetnessAt(end, weather))),
        }),
      };
    });
  };
  return { transmitter: at("transmitter"), receiver: at("receiver") };
}

/** The mouths of an end, with those under some of the covers worked out anew. */
function mouthsInRain(
  { mouth, mouthUnder }: PreparedEnd,
  end: EndName,
  covers: readonly string[],
  weathers: Readonly<Record<string, PreparedWeather>>,
): PreparedEnd["mouth"] {
  const anew = covers.map((name) => [
    name,
    mapValues(weathers, (weather) => mouthUnder[name]!(wetnessAt(end, weather))),
  ]);
  return { ...mouth, ...Object.fromEntries(anew) };
}
