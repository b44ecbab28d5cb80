import { shown } from "./wording.ts";

/** Seconds in the units that a time column may name. */
const seconds = { s: 1, min: 60, h: 3600 } as const;
export type TimeUnit = keyof typeof seconds;
export const timeUnits = Object.keys(seconds) as TimeUnit[];

type Kind = "number" | "clock" | "date";

const nouns: Readonly<Record<Kind, string>> = {
  number: "a plain number",
  clock: "a time of day",
  date: "a date with a time",
};

export type TimeRead =
  | { readonly value: number; readonly message?: undefined }
  | { readonly value?: undefined; readonly message: string };

const plainNumber = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i;
const timeOfDay = /^(\d{1,2}):(\d{2})(?::(\d{2}(?:\.\d+)?))?$/;
const dateAndTime = /^\d{4}-\d{2}-\d{2}[T ]\d{2}:\d{2}(?::\d{2}(?:\.\d+)?)?(?<zone>Z|[+-]\d{2}:?\d{2})?$/i;

/**
 * Reader of a time column: a plain number in the header's unit (or an order), 12:03:30, or 2031-05-01 12:03:30.
 * All cells of a column must be of one kind.
 *
 * @param unit  of plain numbers; without one they are an order, or time in a unit of their own
 * @returns inSeconds, whether values are seconds; read, the value of a cell or what is wrong with it
 */
export function timeReader(unit: TimeUnit | undefined): {
  readonly inSeconds: () => boolean;
  readonly read: (text: string) => TimeRead;
} {
  let kind: Kind | undefined;
  return {
    inSeconds: () => unit !== undefined || kind === "clock" || kind === "date",
    read: (text) => {
      const found = timeOf(text, unit === undefined ? 1 : seconds[unit]);
      if (found === undefined) {
        return { message: `read ${shown(text)}, expected a number, 12:03:30 or 2031-05-01 12:03:30` };
      }
      kind ??= found.kind;
      if (found.kind === kind) return { value: found.value };
      return {
        message: `read ${shown(text)}, ${nouns[found.kind]}, where the column began with ${nouns[kind]}`,
      };
    },
  };
}

function timeOf(text: string, unitSeconds: number): { kind: Kind; value: number } | undefined {
  if (plainNumber.test(text)) {
    const value = Number(text) * unitSeconds;
    return Number.isFinite(value) ? { kind: "number", value } : undefined;
  }
  const [, hours, minutes, rest = "0"] = timeOfDay.exec(text) ?? [];
  if (hours !== undefined) {
    const value = 3600 * Number(hours) + 60 * Number(minutes) + Number(rest);
    return Number(hours) < 24 && Number(minutes) < 60 && Number(rest) < 60
      ? { kind: "clock", value }
      : undefined;
  }
  const date = dateAndTime.exec(text);
  if (date === null) return undefined;
  // Without a zone any one will do: only differences count.
  const value = Date.parse(`${text.replace(" ", "T")}${date.groups?.["zone"] ? "" : "Z"}`) / 1000;
  return Number.isNaN(value) ? undefined : { kind: "date", value };
}
