/** What a piece of text means, so that a terminal may colour it; the words alone always say the same. */
export type Meaning = "strong" | "quiet" | "good" | "doubtful" | "bad";

/** Puts colour on a text, or leaves it as it is. */
export type Paint = (meaning: Meaning, text: string) => string;

export const plain: Paint = (_, text) => text;

/** Widest line of a report. */
export const LINE_WIDTH = 80;

/** A level, a loss or an angle to a tenth; a trace of nothing is 0.0 and never -0.0. */
export function tenth(db: number): string {
  const text = db.toFixed(1);
  return text === "-0.0" ? "0.0" : text;
}

/** The same to a hundredth, where one entry is looked at closely. */
export function hundredth(db: number): string {
  const text = db.toFixed(2);
  return text === "-0.00" ? "0.00" : text;
}

/** The same as `tenth` with a sign: what a change adds or takes. */
export function signed(db: number): string {
  const text = tenth(db);
  return text.startsWith("-") || text === "0.0" ? text : `+${text}`;
}

/** A probability in whole per cent; nothing here is known better than that. */
export function percent(share: number): string {
  if (share > 0.99) return "over 99 %";
  if (share < 0.01) return "under 1 %";
  return `${Math.round(100 * share)} %`;
}

/** A bandwidth in hertz or kilohertz. */
export function hertz(bandwidthHz: number): string {
  if (bandwidthHz >= 1e6) return `${Number((bandwidthHz / 1e6).toPrecision(4))} MHz`;
  if (bandwidthHz >= 1e3) return `${Number((bandwidthHz / 1e3).toPrecision(4))} kHz`;
  return `${Number(bandwidthHz.toPrecision(4))} Hz`;
}

/** Metres, near or far, to a figure that can be paced; rounded away from the antenna. */
export function metres(distanceM: number): string {
  if (distanceM >= 1000) return `${(Math.ceil(distanceM / 100) / 10).toFixed(1)} km`;
  return distanceM >= 10 ? `${Math.ceil(distanceM)} m` : `${(Math.ceil(distanceM * 10) / 10).toFixed(1)} m`;
}

/** `a`, `a and b`, `a, b and c` */
export function listed(words: readonly string[]): string {
  return [words.slice(0, -1).join(", "), ...words.slice(-1)].filter(Boolean).join(" and ");
}

/** Characters, not code units. */
export function lengthOf(text: string): number {
  return [...text].length;
}

/** A paragraph broken into lines; every line but the first hangs under the text after `lead`. */
export function paragraph(text: string, lead = "", width = LINE_WIDTH): string {
  const indent = " ".repeat(lead.length);
  const lines: string[] = [];
  let line = lead;
  let empty = true;
  for (const word of text.split(/\s+/).filter(Boolean)) {
    if (!empty && lengthOf(line) + 1 + lengthOf(word) > width) {
      lines.push(line);
      line = indent;
      empty = true;
    }
    line += empty ? word : ` ${word}`;
    empty = false;
  }
  lines.push(line);
  return lines.join("\n");
}

/**
 * Tables of as many columns side by side as fit on a line, the rest below.
 *
 * @param items   what the columns show
 * @param render  the table of some of them, without colour where `measured`
 */
export function abreast<T>(
  items: readonly T[],
  render: (some: readonly T[], measured: boolean) => string,
): string {
  for (let size = items.length; size > 0; size--) {
    const groups = Array.from({ length: Math.ceil(items.length / size) }, (_, i) =>
      items.slice(i * size, (i + 1) * size),
    );
    const fits = groups.every((some) =>
      render(some, true)
        .split("\n")
        .every((line) => lengthOf(line) <= LINE_WIDTH),
    );
    if (fits || size === 1) return groups.map((some) => render(some, false)).join("\n\n");
  }
  return "";
}

/** First letter large, as a sentence begins. */
export function capital(text: string): string {
  return text.slice(0, 1).toUpperCase() + text.slice(1);
}
