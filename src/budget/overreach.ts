import type { Overreach } from "../numeric/check.ts";
import type { Warning } from "./types.ts";

/** A model asked beyond the range that its source vouches for: it answers, and the report says so. */
export function overreachWarning(model: string, where: string): (overreach: Overreach) => Warning {
  return ({ field, value, low, high }) => ({
    code: "model_range",
    message: `${model}: ${field} ${Number(value.toPrecision(6))} lies outside ${low} to ${high}, where it was tested`,
    where,
  });
}
