import type { EnergyReading, Suspect } from "../readings/energyContradiction.ts";
import { hundredth } from "./words.ts";

/** `0.21 dB`, never finer than a bench can tell. */
export function decibels(db: number): string {
  return `${hundredth(db)} dB`;
}

/** An uncertainty to a hundredth of a dB, at least one. */
export function spread(db: number): string {
  return `${Math.max(0.01, db).toFixed(2)} dB`;
}

/** `0.21 dB ± 0.06 dB (95 %)` */
export function withSpread(valueDb: number, expandedDb: number, confidence: number): string {
  return `${decibels(valueDb)} ± ${spread(expandedDb)} (${confidenceWords(confidence)})`;
}

export function confidenceWords(confidence: number): string {
  return `${Number((100 * confidence).toPrecision(4))} %`;
}

const readingNames: Readonly<Record<EnergyReading, string>> = {
  insertion_loss: "the insertion loss",
  bare_return_loss: "the bare return loss",
  covered_return_loss: "the covered return loss",
};

/** `likelier culprit: the covered return loss (14.2 dB would fit)` */
export function culpritWords(suspects: readonly Suspect[]): string {
  const [first] = suspects;
  if (first === undefined) return "";
  const fits = Number.isFinite(first.neededDb) ? ` (${decibels(first.neededDb)} would fit)` : "";
  return `likelier culprit: ${readingNames[first.reading]}${fits}`;
}

/** A frequency in GHz with the digits that a sweep has. */
export function gigahertz(hz: number): string {
  return `${Number((hz / 1e9).toFixed(6))} GHz`;
}

/** `1 pair`, `4 pairs` */
export function counted(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? "" : "s"}`;
}
