import type { Overreach } from "../numeric/check.ts";
import type { Warning } from "./types.ts";

/** Units at the end of a field's name, as people write them. */
const units: Readonly<Record<string, string>> = {
  GHz: "GHz",
  Km: "km",
  M: "m",
  Mrad: "mrad",
  Percent: "%",
  C: "degC",
  K: "K",
  Gcm3: "g/cm^3",
};

/** A model asked beyond the range that its source vouches for: it answers, and the report says so. */
export function overreachWarning(model: string, where: string): (overreach: Overreach) => Warning {
  return ({ field, value, low, high }) => {
    const { name, unit } = inWords(field);
    return {
      code: "model_range",
      message: `${model}: ${name}${Number(value.toPrecision(4))}${unit} lies outside ${low} to ${high}${unit}, where it was tested`,
      where,
    };
  };
}

/** `distanceKm` is a distance in km; a bare `percent` has no name beside its unit. */
function inWords(field: string): { readonly name: string; readonly unit: string } {
  const [, stem = field, suffix = ""] = /^(.*?)(GHz|Km|Mrad|M|Percent|percent|C|K|Gcm3)$/.exec(field) ?? [];
  const unit = units[suffix] ?? (suffix === "percent" ? "%" : "");
  const name = stem.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
  return { name: name === "" ? "" : `${name} `, unit: unit === "" ? "" : ` ${unit}` };
}
