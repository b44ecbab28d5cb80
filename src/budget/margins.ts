import { powerToDb } from "../numeric/decibels.ts";
import { requiredSnrInBandwidth } from "../receiver/modes.ts";
import { thermalNoiseDbm } from "../receiver/noise.ts";
import type { Entry } from "./entry.ts";
import { mechanismsOf } from "./mechanisms.ts";
import { type NoiseTemperatures, noiseTemperatures } from "./noiseSide.ts";
import type { Case, Link, Mechanism, Verdict } from "./types.ts";
import { probabilityAboveZero, verdictOf } from "./verdict.ts";

/** What is left of a signal in one mode. */
export interface Margin {
  readonly marginDb: number;
  readonly marginSigmaDb: number;
  readonly verdict: Verdict;
}

/** The way that carries the path in one weather, with the feeds of both ends: no cover or mode changes it. */
export function carrier(link: Link, { weather, transmitter, receiver }: Omit<Case, "mode">): Mechanism {
  const { ends, weathers } = link;
  return mechanismsOf(
    link,
    weathers[weather]!,
    ends.transmitter[transmitter.feed]!,
    ends.receiver[receiver.feed]!,
  )[0]!;
}

/**
 * The margins that `evaluate` gives a case in some modes, without the entries behind them: for thousands of stations.
 * Modes differ by their bandwidth, what they need and how sure that is; all else is added up once.
 *
 * @param way  of `carrier`
 */
export function margins(
  link: Link,
  { weather: name, transmitter: sender, receiver: hearer }: Omit<Case, "mode">,
  modes: readonly string[],
  way: Pick<Mechanism, "name" | "excessDb" | "sigmaDb">,
): Margin[] {
  const { scenario } = link;
  const weather = link.weathers[name]!;
  const transmitter = link.ends.transmitter[sender.feed]!;
  const receiver = link.ends.receiver[hearer.feed]!;
  const heard = receiver.mouth[hearer.cover]![name]!;
  const overReceiver = receiver.dishCover[name]!;
  const noise = noiseTemperatures(scenario, weather, heard, overReceiver);
  const sum = startFrom(noise, way);
  add(sum, transmitter.power!);
  add(sum, transmitter.line);
  add(sum, receiver.line);
  addAll(sum, transmitter.mouth[sender.cover]![name]!.entries);
  addAll(sum, transmitter.antenna);
  addAll(sum, transmitter.dishCover[name]!.entries);
  addAll(sum, weather.entries);
  addAll(sum, link.foliage);
  addAll(sum, overReceiver.entries);
  addAll(sum, receiver.antenna);
  addAll(sum, heard.entries);
  const [snrDb, variance] = [sum[0]!, sum[1]!];
  return modes.map((one) => {
    const mode = link.modes[one]!;
    const marginDb = snrDb - powerToDb(mode.noiseBandwidthHz) - requiredSnrInBandwidth(mode);
    const marginSigmaDb = Math.sqrt(variance + mode.sigmaDb ** 2);
    const holds = probabilityAboveZero(marginDb, marginSigmaDb);
    return { marginDb, marginSigmaDb, verdict: verdictOf(marginDb, holds, scenario.decision) };
  });
}

/** Signal less noise [dB], and the variance of both [dB^2]. */
type Sum = Float64Array;

/** One for all: making such an array takes longer than filling it. */
const sumOfMargins: Sum = new Float64Array(2);

/** Against the noise of 1 Hz: each mode takes its bandwidth off. */
function startFrom(noise: NoiseTemperatures, way: Pick<Mechanism, "name" | "excessDb" | "sigmaDb">): Sum {
  const sum = sumOfMargins;
  sum[0] = -thermalNoiseDbm({ temperatureK: noise.steps[4], bandwidthHz: 1 });
  sum[1] = noise.receiverSigmaDb ** 2 + noise.antennaSigmaDb ** 2;
  if (way.name !== "line_of_sight") {
    sum[0] -= way.excessDb;
    sum[1] += way.sigmaDb ** 2;
  }
  return sum;
}

function add(sum: Sum, { db, sigma }: Entry): void {
  sum[0]! += db;
  sum[1]! += sigma * sigma;
}

function addAll(sum: Sum, entries: readonly Entry[]): void {
  for (let i = 0; i < entries.length; i++) add(sum, entries[i]!);
}
