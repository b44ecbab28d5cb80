import { dbToPower } from "../numeric/decibels.ts";
import { scatterQuantile } from "../numeric/scatterQuantile.ts";
import { levelBeamDefault, MEDIUM_K } from "../receiver/antennaTemperature.ts";
import { type Cause, column, logSpread, normalsOf, type Sketch, stillOf, uniformsOf } from "./causes.ts";
import type { EndsInUse } from "./drawnLevels.ts";
import { isStated } from "./drawnLevels.ts";
import { wayLevel } from "./drawnWays.ts";
import { RAIN_NODES, type RainGrid, rainGrid } from "./rainGrid.ts";
import type { Link } from "./types.ts";

/** Nepers of power in a dB. */
export const NEPERS = Math.LN10 / 10;

/** One weather in a block of draws. */
export interface DrawnWeather {
  readonly name: string;
  /** What is drawn differs from what a budget takes, as it adds to the level [dB]. */
  readonly level: Float64Array;
  /** What the antenna sees [K]. */
  readonly antennaK: Float64Array;
  readonly antennaNominalK: number;
  readonly ambientK: number;
  /** Place of the drawn rain rate in the grid; undefined where no rain is drawn. */
  readonly rain: DrawnRain | undefined;
}

/** Rain rates of the grid's nodes, and where between them each draw lies. */
export interface DrawnRain {
  readonly grid: RainGrid;
  readonly node: Int32Array;
  readonly share: Float64Array;
}

/** A weather's draws: rain by rate and length, fog, gas, and the way that carries the path best. */
export function drawnWeather(sketch: Sketch, link: Link, ends: EndsInUse, name: string): DrawnWeather {
  const prepared = link.weathers[name]!;
  const { doubts } = link;
  const rain = drawnRain(sketch, link, name);
  const entryDb = (id: string) => -(prepared.entries.find((entry) => entry.id === id)?.db ?? 0);
  const [gasDb, fogDb] = [entryDb("path.gas"), entryDb("path.fog")];
  const rainDb = prepared.rainLossDb;
  const rainLoss = rainDb > 0 ? rainLossOf(sketch, link, name, rain) : undefined;
  const fog =
    fogDb > 0 ? normalsOf(sketch, shareCause("path.fog", "air", "fog", doubts.fogShare)) : undefined;
  const gas = gasDb > 0 && doubts.gasShare > 0 ? normalsOf(sketch, gasCause(doubts.gasShare)) : undefined;
  const way = wayLevel(sketch, link, ends, name, rain);
  const clear = clearSky(sketch, link);
  const fogSpread = logSpread(doubts.fogShare);

  const level = new Float64Array(sketch.block);
  const antennaK = new Float64Array(sketch.block);
  sketch.steps.push(() => {
    for (let i = 0; i < level.length; i++) {
      const rained = rainLoss === undefined ? rainDb : rainLoss[i]!;
      const fogged = fog === undefined ? fogDb : fogDb * Math.exp(fogSpread * fog[i]!);
      const gassed = gas === undefined ? 0 : gasDb * doubts.gasShare * gas[i]!;
      const carried = way === undefined ? 0 : way[i]!;
      level[i] = carried - gassed - (rained - rainDb) - (fogged - fogDb);
      const dims = rained + fogged;
      if (dims === 0) antennaK[i] = clear.column[i]!;
      else antennaK[i] = MEDIUM_K + (clear.column[i]! - MEDIUM_K) * Math.exp(-NEPERS * dims);
    }
  });
  return {
    name,
    level,
    antennaK,
    antennaNominalK: MEDIUM_K + (clear.nominalK - MEDIUM_K) * dbToPower(-rainDb - fogDb),
    ambientK: prepared.ambientK,
    rain,
  };
}

function shareCause(id: string, matter: "air" | "rain", label: string, share: number): Cause {
  const scatter = { kind: "lognormal", factor: Math.exp(logSpread(share)) } as const;
  return { id, matter, end: undefined, label, scatter, unit: "share", stated: false, still: 0.5 };
}

function gasCause(share: number): Cause {
  const scatter = { kind: "normal", sigma: share } as const;
  return {
    id: "path.gas",
    matter: "air",
    end: undefined,
    label: "gas",
    scatter,
    unit: "share",
    stated: false,
    still: 0.5,
  };
}

/** Where the drawn rain rates lie among the grid's nodes; one random number makes it rain alike in all weathers. */
function drawnRain(sketch: Sketch, link: Link, name: string): DrawnRain | undefined {
  const grid = rainGrid(link, name);
  if (grid === undefined) return undefined;
  const { rainMmPerH } = link.scenario.weather[name]!;
  const uniforms = uniformsOf(sketch, {
    id: "rain.rate",
    matter: "rain",
    end: undefined,
    label: "rain rate",
    scatter: grid.scatter,
    unit: "rate",
    stated: isStated(rainMmPerH) || link.scenario.spread?.rainRateFactor !== undefined,
    still: stillOf(grid.scatter),
  });
  const quantile = scatterQuantile(grid.rateMmPerH, grid.scatter);
  const { stepLog } = grid;
  const last = 2 * RAIN_NODES;
  const node = new Int32Array(sketch.block);
  const share = new Float64Array(sketch.block);
  sketch.steps.push(() => {
    for (let i = 0; i < node.length; i++) {
      const ratio = Math.max(1e-6, quantile(uniforms[i]!) / grid.rateMmPerH);
      const place = Math.min(last, Math.max(0, RAIN_NODES + Math.log(ratio) / stepLog));
      const lower = Math.min(last - 1, Math.floor(place));
      node[i] = lower;
      share[i] = place - lower;
    }
  });
  return { grid, node, share };
}

/** Rain on the path [dB]: by its rate, whose loss is nearly a power of it, and by the length of path in it. */
function rainLossOf(sketch: Sketch, link: Link, name: string, rain: DrawnRain | undefined): Float64Array {
  const { rainLengthShare } = link.doubts;
  const atNodes = rain?.grid.links ?? [link];
  const logs = Float64Array.from(atNodes, ({ weathers }) =>
    Math.log(Math.max(1e-12, weathers[name]!.rainLossDb)),
  );
  const lengths = normalsOf(sketch, {
    id: "rain.length",
    matter: "rain",
    end: undefined,
    label: "length of path in the rain",
    scatter: { kind: "normal", sigma: rainLengthShare },
    unit: "share",
    stated: link.scenario.spread?.rainLengthShare !== undefined,
    still: 0.5,
  });
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      let log = logs[0]!;
      if (rain !== undefined) {
        log = logs[rain.node[i]!]!;
        log += rain.share[i]! * (logs[rain.node[i]! + 1]! - log);
      }
      out[i] = Math.exp(log) * Math.max(0, 1 + rainLengthShare * lengths[i]!);
    }
  });
}

/** What the antenna sees in clear air [K]. */
function clearSky(sketch: Sketch, { scenario }: Link): { column: Float64Array; nominalK: number } {
  const { receiver, frequencyGHz } = scenario;
  const usual = levelBeamDefault(frequencyGHz);
  const input = receiver.antennaTemperatureK ?? { value: usual.temperatureK };
  const scatter = input.scatter ?? ({ kind: "normal", sigma: input.sigma ?? usual.sigmaK } as const);
  const uniforms = uniformsOf(sketch, {
    id: "noise.antenna",
    matter: "sky",
    end: undefined,
    label: "what the antenna sees",
    scatter,
    unit: "K",
    stated: isStated(receiver.antennaTemperatureK),
    still: stillOf(scatter),
  });
  const quantile = scatterQuantile(input.value, scatter);
  return {
    nominalK: input.value,
    column: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) out[i] = Math.max(COLDEST_K, quantile(uniforms[i]!));
    }),
  };
}

/** Nothing is colder than the sky behind all others [K]. */
const COLDEST_K = 2.7;
