import { NEPERS_PER_DB } from "../numeric/decibels.ts";
import { levelBeamDefault, MEDIUM_K } from "../receiver/antennaTemperature.ts";
import {
  type Cause,
  column,
  logSpread,
  normalsOf,
  type Sketch,
  STILL,
  uniformsOf,
  valuesOf,
} from "./causes.ts";
import type { EndsInUse } from "./drawnLevels.ts";
import { isStated } from "./drawnLevels.ts";
import { type DrawnRain, drawnRain, rainLossOf } from "./drawnRain.ts";
import { wayLevel } from "./drawnWays.ts";
import type { Link } from "./types.ts";

/** One weather in a block of draws. */
export interface DrawnWeather {
  readonly name: string;
  /** What is drawn differs from what a budget takes, as it adds to the level [dB]. */
  readonly level: Float64Array;
  /** What the antenna sees [K]. */
  readonly antennaK: Float64Array;
  readonly ambientK: number;
  /** Place of the drawn rain rate in the grid; undefined where no rain is drawn. */
  readonly rain: DrawnRain | undefined;
}

/** A weather's draws: rain by rate and length, fog, gas, and the way that carries the path best. */
export function drawnWeather(sketch: Sketch, link: Link, ends: EndsInUse, name: string): DrawnWeather {
  const prepared = link.weathers[name]!;
  const { doubts } = link;
  const rain = drawnRain(sketch, link, name);
  const entryDb = (id: string) => -(prepared.entries.find((entry) => entry.id === id)?.db ?? 0);
  const [gasDb, fogDb] = [entryDb("path.gas"), entryDb("path.fog")];
  const rainDb = prepared.rainLossDb;
  const rainLoss = rainDb > 0 ? rainLossOf(sketch, link, name, rain) : constant(sketch, 0);
  const fogTimes =
    fogDb > 0
      ? valuesOf(sketch, 1, fogCause(link).scatter, uniformsOf(sketch, fogCause(link)))
      : constant(sketch, 1);
  const gas = gasDb > 0 && doubts.gasShare > 0 ? normalsOf(sketch, gasCause(link)) : constant(sketch, 0);
  const way = wayLevel(sketch, link, ends, name, rain) ?? constant(sketch, 0);
  const clear = clearSky(sketch, link);
  const gasSigmaDb = gasDb * doubts.gasShare;

  const level = column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      out[i] = way[i]! - gasSigmaDb * gas[i]! - (rainLoss[i]! - rainDb) - fogDb * (fogTimes[i]! - 1);
    }
  });
  const antennaK = column(sketch, (out) => {
    if (rainDb + fogDb === 0) out.set(clear);
    else {
      for (let i = 0; i < out.length; i++) {
        const passed = Math.exp(-NEPERS_PER_DB * (rainLoss[i]! + fogDb * fogTimes[i]!));
        out[i] = MEDIUM_K + (clear[i]! - MEDIUM_K) * passed;
      }
    }
  });
  return {
    name,
    level,
    antennaK,
    ambientK: prepared.ambientK,
    rain,
  };
}

function constant({ block }: Sketch, value: number): Float64Array {
  return new Float64Array(block).fill(value);
}

function fogCause({ doubts, scenario }: Link): Cause {
  const scatter = { kind: "lognormal", factor: Math.exp(logSpread(doubts.fogShare)) } as const;
  return {
    id: "path.fog",
    matter: "air",
    end: undefined,
    label: "fog",
    scatter,
    unit: "share",
    stated: scenario.spread?.fogShare !== undefined,
    still: 0.5,
  };
}

function gasCause({ doubts, scenario }: Link): Cause {
  const scatter = { kind: "normal", sigma: doubts.gasShare } as const;
  return {
    id: "path.gas",
    matter: "air",
    end: undefined,
    label: "gas",
    scatter,
    unit: "share",
    stated: scenario.spread?.gasShare !== undefined,
    still: 0.5,
  };
}

/** What the antenna sees in clear air [K]. */
function clearSky(sketch: Sketch, { scenario }: Link): Float64Array {
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
    still: STILL,
  });
  const values = valuesOf(sketch, input.value, scatter, uniforms);
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) out[i] = Math.max(COLDEST_K, values[i]!);
  });
}

/** Nothing is colder than the sky behind all others [K]. */
const COLDEST_K = 2.7;
