import { type Refusal, type RefusalCode, tidy } from "./quantity.ts";

export type Axis = "latitude" | "longitude";

export interface Coordinate {
  readonly ok: true;
  /** North and east positive [deg]. */
  readonly degrees: number;
}

const axes = {
  latitude: {
    limit: 90,
    letters: "NS",
    expected: "a latitude in degrees, such as 53.43, 53.43 N or 53°25'48\" N",
  },
  longitude: {
    limit: 180,
    letters: "EW",
    expected: "a longitude in degrees, such as -0.19, 0.19 W or 0°11'24\" W",
  },
};

const decimal = String.raw`(\d+(?:\.\d*)?|\.\d+)`;
/** Degrees, then minutes, then seconds: by signs, colons or spaces ... */
const bySigns = new RegExp(`^${decimal}(?:[°: ] *${decimal}(?:[': ] *${decimal} *"?| *'?)| *°?)$`);
/** ... or by the letters d, m, s, where s after minutes means seconds and not south. */
const byLetters = new RegExp(`^${decimal} *d(?: *${decimal} *m(?: *${decimal} *s)?)?$`);

/**
 * Reads a latitude or longitude as people write it: `53.43`, `-0.19`, `0.19 W`, `N53.43`, `53°25'48" N`,
 * `53 25 48 N`, `53:25:48 N`, `53d25m48s N`.
 *
 * A sign together with a letter is read only where both point the same way (`-0.19 W`).
 *
 * @param input  text of the scalar, or the number that YAML made of it
 */
export function readCoordinate(input: string | number, axis: Axis): Coordinate | Refusal {
  const { limit, letters, expected } = axes[axis];
  const text = tidy(String(input));
  const no = (code: RefusalCode, hint?: string): Refusal => {
    return { ok: false, code, read: text, expected, libraryMayRead: false, ...(hint && { hint }) };
  };
  if (/\d,\d/.test(text)) return no("decimal_comma", "write one coordinate, with a decimal point");

  const { letter, sign, angle } = takeApart(text.replace(/ *deg(rees?)?/i, "°"));
  const parts = (bySigns.exec(angle) ?? byLetters.exec(angle))?.slice(1).filter((part) => part !== undefined);
  if (letter === undefined || !parts) return no(/\d/.test(text) ? "unreadable" : "no_number");
  const [whole = 0, minutes = 0, seconds = 0] = parts.map(Number);
  if (minutes >= 60 || seconds >= 60) return no("out_of_range", "minutes and seconds end below 60");
  if (parts.slice(0, -1).some((part) => part.includes("."))) {
    return no("unreadable", "only the last of degrees, minutes and seconds may have decimals");
  }

  if (letter !== "" && !letters.includes(letter)) {
    const other: Axis = axis === "latitude" ? "longitude" : "latitude";
    return no("contradiction", `${letter} belongs to a ${other}; latitude and longitude swapped?`);
  }
  const letterSign = letter === "" ? undefined : letter === letters[0] ? "+" : "-";
  if (sign !== "" && letterSign !== undefined && sign !== letterSign) {
    return no("contradiction", `${sign} and ${letter} point opposite ways; write one of them`);
  }

  const magnitude = whole + minutes / 60 + seconds / 3600;
  const degrees = (letterSign ?? sign) === "-" ? -magnitude : magnitude;
  if (magnitude <= limit) return { ok: true, degrees };
  return no("out_of_range", beyond(degrees, axis));
}

/** Letter of the hemisphere (before or after, upper case, "" where none, undefined where two), sign, and rest. */
function takeApart(text: string): { letter: string | undefined; sign: string; angle: string } {
  const secondsByLetter = /\d *d.*m.*\d *s$/.test(text);
  const match = /^([NSEW]?) *([+-]?) *(.*?) *([NSEW]?)$/i.exec(text)!;
  const [, before = "", sign = "", middle = "", after = ""] = match;
  const angle = secondsByLetter ? `${middle}${after}` : middle;
  const last = secondsByLetter ? "" : after;
  const letter = before !== "" && last !== "" ? undefined : (before + last).toUpperCase();
  return { letter, sign, angle };
}

function beyond(degrees: number, axis: Axis): string {
  const magnitude = Math.abs(degrees);
  if (axis === "latitude") {
    return magnitude <= 180 ? "beyond 90; latitude and longitude swapped?" : "latitude ends at 90";
  }
  if (magnitude > 360) return "longitude ends at 180";
  const turned = Number((degrees - Math.sign(degrees) * 360).toFixed(9));
  return `beyond 180; write ${turned}, with east positive and west negative`;
}
