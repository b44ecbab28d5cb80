import { tenth } from "./words.ts";

/** A thickness or gap with three or four figures: what a gauge shows. */
export function millimetres(mm: number): string {
  return `${mm < 1 ? Number(mm.toFixed(3)) : mm.toFixed(2)} mm`;
}

/** A number of decibels as it was asked for. */
export function decibels(db: number): string {
  return `${Number(db.toPrecision(3))} dB`;
}

/** A return loss; beyond what can be measured one figure is as good as another. */
export function returnLoss(db: number): string {
  return db > 60 ? "over 60" : tenth(db);
}
