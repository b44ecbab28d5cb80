import { powerToDb } from "../numeric/decibels.ts";
import { requiredSnrInBandwidth } from "../receiver/modes.ts";
import { thermalNoiseDbm } from "../receiver/noise.ts";
import type { Entry } from "./entry.ts";
import { mechanismsOf } from "./mechanisms.ts";
import { noiseTemperatures } from "./noiseSide.ts";
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
  const byGround = way.name !== "line_of_sight";
  // Against the noise of 1 Hz: each mode takes its bandwidth off.
  let snrDb =
    (byGround ? -way.excessDb : 0) - thermalNoiseDbm({ temperatureK: noise.steps[4], bandwidthHz: 1 });
  let variance = noise.receiverSigmaDb ** 2 + noise.antennaSigmaDb ** 2 + (byGround ? way.sigmaDb ** 2 : 0);
  const add = ({ db, sigma }: Entry) => {
    snrDb += db;
    variance += sigma * sigma;
  };
  add(transmitter.power!);
  add(transmitter.line);
  add(receiver.line);
  for (const entries of [
    transmitter.mouth[sender.cover]![name]!.entries,
    transmitter.antenna,
    transmitter.dishCover[name]!.entries,
    weather.entries,
    link.foliage,
    overReceiver.entries,
    receiver.antenna,
    heard.entries,
  ]) {
    for (const entry of entries) add(entry);
  }
  return modes.map((one) => {
    const mode = link.modes[one]!;
    const marginDb = snrDb - powerToDb(mode.noiseBandwidthHz) - requiredSnrInBandwidth(mode);
    const marginSigmaDb = Math.sqrt(variance + mode.sigmaDb ** 2);
    const holds = probabilityAboveZero(marginDb, marginSigmaDb);
    return { marginDb, marginSigmaDb, verdict: verdictOf(marginDb, holds, scenario.decision) };
  });
}
