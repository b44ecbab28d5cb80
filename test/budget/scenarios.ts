/** Scenarios built by hand, without a file: a plain one with named changes, and random ones for invariants. */
import fc from "fast-check";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import type { Budget, Case } from "../../src/budget/types.ts";
import { exactly } from "../../src/cover/bounded.ts";
import { wetModels } from "../../src/cover/wetModels.ts";
import { modes } from "../../src/receiver/modes.ts";
import type {
  Cover,
  CoverLayer,
  Dish,
  EndName,
  Feed,
  Receiver,
  Scenario,
  Site,
  Transmitter,
  Weather,
} from "../../src/scenario/types.ts";

export const BOTH: readonly EndName[] = ["transmitter", "receiver"];

export function layerOf(thicknessMm: number, permittivity: number, lossTangent = 0): CoverLayer {
  return {
    material: "invented",
    thicknessMm,
    permittivity: exactly(permittivity),
    lossTangent: exactly(lossTangent),
  };
}

export function coverOf(change: Partial<Cover> = {}): Cover {
  return { layers: [], surface: "wetting", state: "new", gapMm: 0, ...change };
}

export function weatherOf(change: Partial<Weather> = {}): Weather {
  const dry = { rainMmPerH: { value: 0 }, fogGPerM3: 0, driedForMin: 0, dewMm: { value: 0 }, iceMm: 0 };
  return { ...dry, windMPerS: 4, wets: BOTH, ...change };
}

export function feedOf(change: Partial<Feed> = {}): Feed {
  // Two wavelengths wide at 10 GHz, so that a plane wave may be taken.
  return { returnLossDb: 14, edgeTaperDb: 10, apertureMm: 60, facingDeg: 0, ...change };
}

export function dishOf(change: Partial<Dish> = {}): Dish {
  return {
    diameterM: 0.6,
    focalRatio: 0.4,
    surfaceRmsMm: 0.4,
    otherLossesDb: { value: 0 },
    blockageM: 0.06,
    pointingOffsetDeg: 0,
    pointingErrorDeg: 0.5,
    ...change,
  };
}

export function siteOf(change: Partial<Site> = {}): Site {
  return { latitude: 0, longitude: 0, positionErrorKm: 0, groundM: 500, heightM: 2, ...change };
}

/** Equatorial radius of WGS84 [km]: along the equator the geodesic is an arc of this circle. */
const EQUATOR_RADIUS_KM = 6378.137;

export function eastOnEquator(distanceKm: number, change: Partial<Site> = {}): Site {
  return siteOf({ longitude: ((distanceKm / EQUATOR_RADIUS_KM) * 180) / Math.PI, ...change });
}

/** Two small dishes on hills 60 km apart on the equator; the ends' own fields are changed apart. */
export function scenarioOf({
  transmitter = {},
  receiver = {},
  ...change
}: Omit<Partial<Scenario>, EndName> & {
  transmitter?: Partial<Transmitter>;
  receiver?: Partial<Receiver>;
} = {}): Scenario {
  const end = { feed: "stub", cover: "film", dish: "tripod", lineLossDb: { value: 0.5 } };
  return {
    title: "invented path",
    frequencyGHz: 10.368,
    polarization: "horizontal",
    transmitter: { ...end, powerDbm: { value: 34.8 }, ...transmitter },
    receiver: { ...end, noiseFigureDb: { value: 1.1 }, modes: ["cw"], ...receiver },
    feeds: { stub: feedOf() },
    covers: { bare: coverOf(), film: coverOf({ layers: [layerOf(0.127, 2.05, 0.0007)] }) },
    dish: { tripod: dishOf() },
    modes,
    path: { from: siteOf(), to: eastOnEquator(60) },
    weather: { dry: weatherOf() },
    decision: { reserveDb: 3, confidence: 0.9 },
    ...change,
  };
}

/** The case that the scenario's ends state, in a weather. */
export function caseOf(
  { transmitter, receiver }: Scenario,
  weather: string,
  mode = receiver.modes[0]!,
): Case {
  return {
    weather,
    mode,
    transmitter: { feed: transmitter.feed, cover: transmitter.cover },
    receiver: { feed: receiver.feed, cover: receiver.cover },
  };
}

export function budgetOf(scenario: Scenario, weather = Object.keys(scenario.weather)[0]!): Budget {
  return evaluate(prepare(scenario), caseOf(scenario, weather));
}

export function entryOf({ entries, noiseEntries }: Budget, id: string) {
  const found = [...entries, ...noiseEntries].find((entry) => entry.id === id);
  if (found === undefined) throw new Error(`no entry ${id}`);
  return found;
}

export function codesOf({ warnings }: Budget): string[] {
  return warnings.map(({ code }) => code);
}

/** Evenly spread over its range, where `fc.double` would crowd about 0. */
const real = (min: number, max: number) =>
  fc.integer({ min: 0, max: 1_000_000 }).map((part) => min + ((max - min) * part) / 1_000_000);
const maybe = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: undefined });

const anyLayer: fc.Arbitrary<CoverLayer> = fc
  .tuple(real(0, 6), real(1.05, 6), real(0, 0.05), real(0, 0.04), real(0, 1))
  .map(([thicknessMm, permittivity, loss, spread, lossSpread]) => ({
    material: "invented",
    thicknessMm,
    permittivity: {
      nominal: permittivity,
      low: permittivity * (1 - spread),
      high: permittivity * (1 + spread),
    },
    lossTangent: { nominal: loss, low: loss * (1 - lossSpread), high: loss * (1 + lossSpread) },
  }));

export const anySurface = {
  surface: fc.constantFrom("beading", "mixed", "wetting"),
  state: fc.constantFrom("new", "weathered", "treated"),
  wetModel: fc.constantFrom(undefined, ...wetModels),
} as const;

export const anyLayeredCover: fc.Arbitrary<Cover> = fc.record({
  ...anySurface,
  layers: fc.array(anyLayer, { minLength: 1, maxLength: 3 }),
  gapMm: real(0, 20),
  slopeMm: maybe(real(10, 300)),
  domeRadiusMm: maybe(real(10, 300)),
});

/** Layers, readings, both or neither. */
export const anyCover: fc.Arbitrary<Cover> = fc
  .tuple(
    anyLayeredCover,
    fc.boolean(),
    maybe(
      fc.record({
        insertionLossDb: real(-0.5, 3).map((value) => ({ value })),
        returnLossChangeDb: maybe(real(-6, 5).map((value) => ({ value }))),
      }),
    ),
  )
  .map(([cover, layered, measured]) => ({ ...cover, measured, layers: layered ? cover.layers : [] }));

export const anyFeed: fc.Arbitrary<Feed> = fc.record({
  returnLossDb: real(6, 40),
  phaseDeg: maybe(real(-180, 180)),
  edgeTaperDb: real(3, 20),
  apertureMm: maybe(real(10, 200)),
  facingDeg: real(-60, 88),
});

export const anyWeather: fc.Arbitrary<Weather> = fc.record({
  rainMmPerH: fc.oneof(fc.constant(0), real(0.1, 150)).map((value) => ({ value })),
  extentKm: maybe(real(0.1, 80)),
  fogGPerM3: fc.oneof(fc.constant(0), real(0, 1)),
  temperatureC: maybe(real(-20, 40)),
  pressureHPa: maybe(real(800, 1040)),
  humidityPercent: maybe(real(0, 100)),
  windMPerS: real(0, 15),
  wets: fc.subarray([...BOTH]),
  coversWetAsAtMmPerH: maybe(real(0, 150)),
  driedForMin: fc.oneof(fc.constant(0), real(0, 60)),
  dewMm: fc.oneof(fc.constant(0), real(0, 0.3)).map((value) => ({ value, sigma: value / 3 })),
  iceMm: fc.oneof(fc.constant(0), real(0, 10)),
  snow: maybe(
    fc.record({ depthMm: real(1, 50), dryDensityGcm3: real(0.05, 0.6), wetnessPercent: real(0, 12) }),
  ),
});

/** Two ends of different feeds, covers and dishes on a path of some 1 to 200 km, in the weather "now". */
export const anyScenario: fc.Arbitrary<Scenario> = fc
  .record({
    frequencyGHz: real(3, 47),
    polarization: fc.constantFrom("horizontal", "vertical", "circular"),
    powerDbm: real(0, 45),
    lineLossDb: real(0, 5),
    noiseFigureDb: real(0.3, 10),
    antennaTemperatureK: maybe(real(20, 1000).map((value) => ({ value }))),
    mode: fc.constantFrom("cw", "ssb", "fm", "wfm"),
    feeds: fc.record({ near: anyFeed, far: anyFeed }),
    covers: fc.record({ near: anyCover, far: anyCover }),
    diameterM: real(0.3, 3),
    longitude: real(0.01, 2),
    groundM: real(0, 2500),
    now: anyWeather,
  })
  .map(({ powerDbm, lineLossDb, noiseFigureDb, antennaTemperatureK, mode, diameterM, ...any }) =>
    scenarioOf({
      frequencyGHz: any.frequencyGHz,
      polarization: any.polarization,
      transmitter: {
        feed: "near",
        cover: "near",
        powerDbm: { value: powerDbm },
        lineLossDb: { value: lineLossDb },
      },
      receiver: {
        feed: "far",
        cover: "far",
        lineLossDb: { value: lineLossDb },
        noiseFigureDb: { value: noiseFigureDb },
        antennaTemperatureK,
        modes: [mode],
      },
      feeds: any.feeds,
      covers: any.covers,
      dish: { tripod: dishOf({ diameterM, blockageM: 0.05 }) },
      path: { from: siteOf({ groundM: any.groundM }), to: siteOf({ longitude: any.longitude }) },
      weather: { now: any.now },
    }),
  );
