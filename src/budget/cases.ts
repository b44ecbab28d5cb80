import type { End } from "../scenario/types.ts";
import type { Case, Link } from "./types.ts";

/** The cases of a report: the ends as the scenario has them, then every cover on both ends; by weather, by mode. */
export function cases({ scenario }: Link): Case[] {
  const { transmitter, receiver } = scenario;
  const choices = [
    { transmitter: choiceOf(transmitter), receiver: choiceOf(receiver) },
    ...Object.keys(scenario.covers).map((cover) => ({
      transmitter: { feed: transmitter.feed, cover },
      receiver: { feed: receiver.feed, cover },
    })),
  ];
  const asWritten = ({ transmitter: tx, receiver: rx }: (typeof choices)[number]) =>
    tx.cover === transmitter.cover && rx.cover === receiver.cover;
  return choices
    .filter((choice, i) => i === 0 || !asWritten(choice))
    .flatMap((choice) =>
      receiver.modes.flatMap((mode) =>
        Object.keys(scenario.weather).map((weather) => ({ weather, ...choice, mode })),
      ),
    );
}

function choiceOf({ feed, cover }: End) {
  return { feed, cover };
}
