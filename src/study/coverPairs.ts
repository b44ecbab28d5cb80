import type { Case, Link } from "../budget/types.ts";
import type { EndName } from "../scenario/types.ts";

/** Feeds and covers of both ends. */
export type BothEnds = Pick<Case, EndName>;

/** Open mouths at both ends. */
export function isBare({ transmitter, receiver }: BothEnds): boolean {
  return transmitter.cover === "bare" && receiver.cover === "bare";
}

/** The scenario's feeds under a cover each. */
export function endsUnder({ scenario }: Link, sent: string, heard: string): BothEnds {
  return {
    transmitter: { feed: scenario.transmitter.feed, cover: sent },
    receiver: { feed: scenario.receiver.feed, cover: heard },
  };
}

/** The covers of the scenario as it has them, then each on both ends; none twice. */
export function coverPairs(link: Link): BothEnds[] {
  const { transmitter, receiver, covers } = link.scenario;
  const pairs = [
    [transmitter.cover, receiver.cover] as const,
    ...Object.keys(covers).map((cover) => [cover, cover] as const),
  ];
  const once = new Map(pairs.map((pair) => [JSON.stringify(pair), pair]));
  return [...once.values()].map(([sent, heard]) => endsUnder(link, sent, heard));
}
