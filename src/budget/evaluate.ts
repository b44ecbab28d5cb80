import { requiredSnrInBandwidth } from "../receiver/modes.ts";
import { lossEntry, sumOf } from "./entry.ts";
import { mechanismEntries, mechanismsOf } from "./mechanisms.ts";
import { noiseSide } from "./noiseSide.ts";
import type { Budget, Case, Link, PreparedEnd } from "./types.ts";
import { combinedSigma, probabilityAboveZero, verdictOf } from "./verdict.ts";

/**
 * The budget of one case: entries from transmitter power to the receiver's input, the noise side, the margin
 * and the verdict.
 *
 * @throws RangeError on a weather, feed, cover or mode that the link does not have
 */
export function evaluate(link: Link, chosen: Case): Budget {
  const { scenario } = link;
  const weather = have(link.weathers, chosen.weather, "weather");
  const mode = have(link.modes, chosen.mode, "mode");
  const transmitter = have(link.ends.transmitter, chosen.transmitter.feed, "transmitter feed");
  const receiver = have(link.ends.receiver, chosen.receiver.feed, "receiver feed");
  const sent = mouthAt(transmitter, chosen.transmitter.cover, chosen.weather);
  const heard = mouthAt(receiver, chosen.receiver.cover, chosen.weather);

  const overSender = have(transmitter.dishCover, chosen.weather, "weather");
  const overReceiver = have(receiver.dishCover, chosen.weather, "weather");
  const mechanisms = mechanismsOf(link, weather, transmitter, receiver);
  const entries = [
    transmitter.power!,
    transmitter.line,
    ...sent.entries,
    ...transmitter.antenna,
    ...overSender.entries,
    ...weather.entries,
    ...mechanismEntries(mechanisms[0]!),
    ...link.foliage,
    ...overReceiver.entries.toReversed(),
    ...receiver.antenna,
    ...heard.entries.toReversed(),
    receiver.line,
  ];
  const noise = noiseSide(scenario, mode, weather, heard, overReceiver);
  const requiredSnrDb = requiredSnrInBandwidth(mode);
  const heading = {
    id: "mode.required",
    stage: "mode",
    label: `needed for ${mode.label}`,
    source: mode.source,
  } as const;
  const requirement = lossEntry(heading, requiredSnrDb, mode.sigmaDb);

  const receivedDbm = sumOf(entries, "db");
  const snrDb = receivedDbm - noise.noiseDbm;
  const marginDb = snrDb - requiredSnrDb;
  const all = [...entries, ...noise.entries, requirement];
  const marginSigmaDb = combinedSigma(all);
  const holdProbability = probabilityAboveZero(marginDb, marginSigmaDb);
  return {
    case: chosen,
    entries,
    receivedDbm,
    noiseEntries: noise.entries,
    noiseDbm: noise.noiseDbm,
    systemTemperatureK: noise.systemTemperatureK,
    snrDb,
    requirement,
    requiredSnrDb,
    marginDb,
    marginLowDb: sumOf(all, "low"),
    marginHighDb: sumOf(all, "high"),
    marginSigmaDb,
    holdProbability,
    verdict: verdictOf(marginDb, holdProbability, scenario.decision),
    mechanisms: mechanisms.map(({ warnings, ...mechanism }) => mechanism),
    transmitterCover: stateOf(sent),
    receiverCover: stateOf(heard),
    warnings: [
      ...link.warnings,
      ...transmitter.warnings,
      ...receiver.warnings,
      ...weather.warnings,
      ...mechanisms[0]!.warnings,
      ...sent.warnings,
      ...heard.warnings,
      ...overSender.warnings,
      ...overReceiver.warnings,
    ],
  };
}

function mouthAt(end: PreparedEnd, cover: string, weather: string) {
  return have(have(end.mouth, cover, "cover"), weather, "weather");
}

function stateOf({
  dryCostDb,
  waterCostDb,
  bareReturnLossDb,
  returnLossDb,
  filmMm,
}: ReturnType<typeof mouthAt>) {
  return { dryCostDb, waterCostDb, bareReturnLossDb, returnLossDb, filmMm };
}

function have<T>(group: Readonly<Record<string, T>>, name: string, noun: string): T {
  const found = Object.hasOwn(group, name) ? group[name] : undefined;
  if (found === undefined) throw new RangeError(`the link has no ${noun} "${name}"`);
  return found;
}
