import { REFERENCE_TEMPERATURE_K } from "../numeric/constants.ts";
import { requiredSnrInBandwidth } from "../receiver/modes.ts";
import { thermalNoiseDbm } from "../receiver/noise.ts";
import type { Entry } from "./entry.ts";
import { mechanismsOf } from "./mechanisms.ts";
import { noiseSide } from "./noiseSide.ts";
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
  const first = link.modes[modes[0]!]!;
  const noise = noiseSide(scenario, first, weather, heard, overReceiver);
  const byGround = way.name !== "line_of_sight";
  let snrDb = (byGround ? -way.excessDb : 0) - noise.noiseDbm;
  let variance = byGround ? way.sigmaDb ** 2 : 0;
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
  for (const { sigma } of noise.entries) variance += sigma * sigma;
  const firstDbm = thermalDbm(first.noiseBandwidthHz);
  return modes.map((one) => {
    const mode = link.modes[one]!;
    const widerDb = thermalDbm(mode.noiseBandwidthHz) - firstDbm;
    const marginDb = snrDb - widerDb - requiredSnrInBandwidth(mode);
    const marginSigmaDb = Math.sqrt(variance + mode.sigmaDb ** 2);
    const holds = probabilityAboveZero(marginDb, marginSigmaDb);
    return { marginDb, marginSigmaDb, verdict: verdictOf(marginDb, holds, scenario.decision) };
  });
}

function thermalDbm(bandwidthHz: number): number {
  return thermalNoiseDbm({ temperatureK: REFERENCE_TEMPERATURE_K, bandwidthHz });
}
