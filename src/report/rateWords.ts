import { rainWords } from "../atmosphere/rainWords.ts";
import type { MechanismName } from "../budget/types.ts";
import { type BreakEven, HEAVIEST_MM_PER_H, type RainStretch, type RateSpread } from "../study/breakEven.ts";
import { listed, paragraph } from "./words.ts";

/** A rain rate, to what rain is known to at the best. */
export function rateFigure(rateMmPerH: number): string {
  if (rateMmPerH < 0.095) return String(Number(rateMmPerH.toPrecision(1)));
  return rateMmPerH.toFixed(rateMmPerH < 9.95 ? 1 : 0);
}

/** A rate or an extent that was asked for, as it was asked for where it is round. */
export function askedFigure(value: number): string {
  return String(Number(value.toPrecision(4)));
}

/** A break-even rate: `46`, `over 400`. */
export function breakEvenFigure(rateMmPerH: number | undefined): string {
  return rateMmPerH === undefined ? `over ${HEAVIEST_MM_PER_H}` : rateFigure(rateMmPerH);
}

/** The same with what one standard deviation less or more of margin makes of it: `46 (38-57)`. */
export function spreadFigure(rateMmPerH: number | undefined, { lowMmPerH, highMmPerH }: RateSpread): string {
  const figure = breakEvenFigure(rateMmPerH);
  if (rateMmPerH === 0 || lowMmPerH === undefined) return figure;
  const low = rateFigure(lowMmPerH);
  return highMmPerH === undefined
    ? `${figure} (from ${low})`
    : `${figure} (${low}-${rateFigure(highMmPerH)})`;
}

/** What authorities call a rain: `heavy by AMS and WMO, violent by UK showers`. */
export function rainWordsText(rateMmPerH: number): string {
  const byWord = new Map<string, string[]>();
  for (const { authority, word } of rainWords({ rainRateMmPerH: rateMmPerH })) {
    byWord.set(word, [...(byWord.get(word) ?? []), authority.replace(",", "")]);
  }
  return [...byWord].map(([word, authorities]) => `${word} by ${listed(authorities)}`).join(", ");
}

export const wayWords = {
  line_of_sight: "line of sight",
  diffraction: "diffraction",
  troposcatter: "troposcatter",
  rain_scatter: "rain scatter",
} as const satisfies Record<MechanismName, string>;

/** Harder rain in which what rain has taken is back: `from 12 to 31 mm/h (by rain scatter)`. */
export function backWords(stretches: readonly RainStretch[]): string {
  return listed(
    stretches.map(({ fromMmPerH, toMmPerH, mechanism }) => {
      const from = `from ${rateFigure(fromMmPerH)}`;
      const rain = toMmPerH === undefined ? `${from} mm/h on` : `${from} to ${rateFigure(toMmPerH)} mm/h`;
      return `${rain} (by ${wayWords[mechanism]})`;
    }),
  );
}

/** A line for a cover under which harder rain gives what lighter rain does not leave, none for another. */
export function backLines(cover: string, { closesBack, zeroBack, reserveBack }: BreakEven): string[] {
  const said = [
    ...(closesBack.length === 0 ? [] : [`closes ${backWords(closesBack)}`]),
    ...(zeroBack.length === 0 ? [] : [`something is left ${backWords(zeroBack)}`]),
    ...(reserveBack.length === 0 ? [] : [`the reserve is left ${backWords(reserveBack)}`]),
  ];
  return said.length === 0 ? [] : [paragraph(`${said.join("; ")}.`, `${cover}: `)];
}
