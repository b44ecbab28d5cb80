import type { MechanismName } from "../budget/types.ts";
import type { SortKey } from "../study/rosterOrder.ts";
import type { RosterPlan, RosterSite } from "../study/rosterPlan.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { meanings } from "./marginText.ts";
import { cautionLines } from "./notes.ts";
import type { RosterLine } from "./rosterData.ts";
import { LINE_WIDTH, lengthOf, listed, type Paint, paragraph, plain, tenth } from "./words.ts";

/** One letter for each way, so that two of them fit. */
const letters: Readonly<Record<MechanismName, string>> = {
  line_of_sight: "S",
  diffraction: "D",
  troposcatter: "T",
  rain_scatter: "R",
};
const letterWords: Readonly<Record<MechanismName, string>> = {
  line_of_sight: "in sight",
  diffraction: "diffraction",
  troposcatter: "troposcatter",
  rain_scatter: "rain scatter",
};

/** From here on a heading is marked as uncertain [deg]. */
const UNCERTAIN_DEG = 1;
/** Names are cut no shorter than this [characters]. */
const SHORTEST_NAME = 8;

export interface RosterTable {
  readonly plan: RosterPlan;
  /** By site of the plan, in order. */
  readonly lines: readonly (readonly RosterLine[])[];
  readonly sort: SortKey;
  /** What was taken for granted, and what is left out; sentences. */
  readonly notes: readonly string[];
  readonly date: string;
}

/** The roster for paper: a table of 80 columns for each site, and what its letters mean. */
export function rosterText(table: RosterTable, paint: Paint = plain): string {
  const { plan, lines, notes } = table;
  const { scenario } = plan;
  const parts = [
    [
      paint("strong", paragraph(scenario.title)),
      paragraph(`${scenario.frequencyGHz} GHz, ${scenario.polarization}; ${answerWords(table)}`),
    ].join("\n"),
    ...plan.sites.map((site, i) => siteText(site, lines[i] ?? [], table, paint)),
    legend(table),
    noteText([...notes, ...doubtNotes(lines.flat())], paint),
    [paint("strong", "Caution"), cautionLines()].join("\n"),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function noteText(notes: readonly string[], paint: Paint): string {
  if (notes.length === 0) return "";
  return [paint("strong", "Notes"), ...notes.map((note) => paragraph(note, "  - "))].join("\n");
}

/** Doubts that the table itself shows: by its ways, its headings and its marks of terrain. */
const shownAlready: readonly string[] = ["beyond_horizon", "locator_too_short", "terrain_gap"];

/** Every other doubt about the paths once, with the first station that it is about. */
function doubtNotes(lines: readonly RosterLine[]): string[] {
  const byCode = new Map<string, { count: number; name: string; message: string }>();
  for (const { name, doubts } of lines) {
    for (const { code, message } of doubts) {
      const known = byCode.get(code);
      if (known) known.count++;
      else if (!shownAlready.includes(code)) byCode.set(code, { count: 1, name, message });
    }
  }
  return [...byCode.values()].map(({ count, name, message }) => {
    const others = count === 1 ? "" : ` and ${count - 1} more`;
    return `${name}${others}: ${message}`;
  });
}

function answerWords({ plan }: RosterTable): string {
  const { scenario, modes, weathers, covers, bothWays } = plan;
  const [dry, wet] = weathers;
  const when = wet === undefined ? `weather "${dry}"` : `dry is "${dry}", wet is "${wet}"`;
  const way = bothWays ? "of the weaker way, out or back" : "of the way out";
  return `margins ${way}, for ${scenario.modes[modes[0]!]!.label}, own cover ${covers[0]}; ${when}.`;
}

function siteText(site: RosterSite, lines: readonly RosterLine[], table: RosterTable, paint: Paint): string {
  const { date, sort } = table;
  const { declinationDeg } = site;
  const compass =
    declinationDeg === undefined
      ? "no magnetic headings"
      : `magnetic heading = ${shifted(-declinationDeg)} on ${date}`;
  const count = `${lines.length === 1 ? "1 station" : `${lines.length} stations`}`;
  const title = paint("strong", paragraph(`From ${site.name}: ${count}, by ${sort}; ${compass}`));
  return lines.length === 0 ? title : `${title}\n${tableOf(lines, table, paint)}`;
}

function tableOf(lines: readonly RosterLine[], { plan }: RosterTable, paint: Paint): string {
  const wet = plan.weathers.length > 1;
  const bothWays = lines.some(({ weathers }) => weathers.some(({ weaker }) => weaker !== undefined));
  const covered = plan.covers[0] !== "bare" && plan.covers.includes("bare");
  const magnetic = lines.some(({ magneticDeg }) => magneticDeg !== undefined);
  const halves = wet ? ["dry", "wet"] : ["dry"];
  const blank = (count: number) => Array.from({ length: count }, () => cell(""));
  const over = (text: string, across: number): Cell[] => [{ text, across }, ...blank(across - 1)];
  const body = (nameWidth: number) =>
    columns([
      [
        ...blank(2),
        ...over(magnetic ? "heading deg" : "heading", magnetic ? 2 : 1),
        ...blank(1),
        ...over("margin dB", halves.length),
        ...blank((bothWays ? 1 : 0) + (covered ? 1 : 0)),
        ...over("best mode", halves.length),
      ],
      [
        ...["station", "km", "true", ...(magnetic ? ["magn"] : []), "way", ...halves],
        ...(bothWays ? ["weak"] : []),
        ...(covered ? ["cover"] : []),
        ...halves,
      ].map((text) => cell(text)),
      RULE,
      ...lines.map((line) => {
        const { weathers } = line;
        const last = weathers[weathers.length - 1]!;
        const uncertain = line.headingErrorDeg >= UNCERTAIN_DEG ? "~" : "";
        const mark = line.terrain === "none" ? "!" : line.terrain === "gaps" ? "?" : "";
        return [
          cell(shortened(line.name, nameWidth)),
          cell(String(line.scoreKm)),
          cell(`${uncertain}${line.headingDeg.toFixed(1)}`),
          ...(magnetic ? [cell(wholeDegrees(line.magneticDeg))] : []),
          cell(mark + [...new Set(weathers.map(({ way }) => letters[way]))].join("/")),
          ...weathers.map(({ marginDb }) => cell(tenth(marginDb))),
          ...(bothWays ? [cell(last.weaker ?? "")] : []),
          ...(covered ? [cell(tenth(last.costDb))] : []),
          ...weathers.map((one) => bestCell(one, plan, paint)),
        ];
      }),
    ]);
  const longest = Math.max(...lines.map(({ name }) => lengthOf(name)));
  const excess = Math.max(...body(longest).split("\n").map(visibleLength)) - LINE_WIDTH;
  return body(excess > 0 ? Math.max(SHORTEST_NAME, longest - excess) : longest);
}

/** A mode that closes by its name, one that is thin in brackets; a star where a bare mouth would do better. */
function bestCell({ best, bareBest }: RosterLine["weathers"][number], plan: RosterPlan, paint: Paint): Cell {
  const rank = (one: typeof best) =>
    one === undefined ? Infinity : (one.verdict === "closes" ? 0 : 1000) + plan.modes.indexOf(one.mode);
  const star = rank(bareBest) < rank(best) ? "*" : "";
  const name = best === undefined ? "-" : shortened(best.mode, 8);
  const text = best?.verdict === "thin" ? `(${name})` : name;
  return cell(text + star, paint(meanings[best?.verdict ?? "fails"], text) + star);
}

function wholeDegrees(deg: number | undefined): string {
  return deg === undefined ? "-" : String(Math.round(deg) % 360);
}

/** `true + 1.2 deg`, `true - 1.2 deg`, or what is left where they agree. */
function shifted(deg: number): string {
  const size = tenth(Math.abs(deg));
  return size === "0.0" ? "the true one" : `true ${deg < 0 ? "-" : "+"} ${size} deg`;
}

function shortened(text: string, width: number): string {
  return lengthOf(text) <= width ? text : `${[...text].slice(0, width - 1).join("")}…`;
}

/** Length without colour. */
function visibleLength(line: string): number {
  // biome-ignore lint/suspicious/noControlCharactersInRegex: colour begins with one
  return lengthOf(line.replace(/\u001b\[[0-9;]*m/g, ""));
}

function legend({ plan, lines }: RosterTable): string {
  const all = lines.flat();
  const weathers = all.flatMap((line) => line.weathers);
  const ways = (Object.keys(letters) as MechanismName[]).filter((way) =>
    weathers.some((one) => one.way === way),
  );
  const two = all.some((line) => new Set(line.weathers.map(({ way }) => way)).size > 1);
  const [dry, wet] = plan.weathers;
  const sentences = [
    "km: for scoring, between the centres of the squares (common practice, no source; rules differ).",
    ...(ways.length > 0
      ? [
          `Way: ${listed(ways.map((way) => `${letters[way]} ${letterWords[way]}`))}${two ? "; two letters, dry/wet" : ""}.`,
        ]
      : []),
    ...(all.some(({ headingErrorDeg }) => headingErrorDeg >= UNCERTAIN_DEG)
      ? [`~: a short locator leaves the heading open by ${UNCERTAIN_DEG} deg or more.`]
      : []),
    ...(weathers.some(({ weaker }) => weaker !== undefined)
      ? [
          `Weak: the weaker way${wet === undefined ? "" : " in the wet"} (out, I am heard worse; back, I hear worse; blank, alike).`,
        ]
      : []),
    ...(plan.covers[0] !== "bare" && plan.covers.includes("bare")
      ? [
          `Cover: what ${plan.covers[0]} takes against a bare mouth in ${wet ?? dry} [dB]; rain into a bare mouth is not charged.`,
        ]
      : []),
    ...(all.some(({ mode }) => mode !== plan.modes[0])
      ? ["A station with a mode of its own has its margins in that mode."]
      : []),
    "Best mode: the most demanding that closes; in brackets, thin; -, none.",
    ...(weathers.some(
      ({ bareBest, best }) => bareBest?.mode !== best?.mode || bareBest?.verdict !== best?.verdict,
    )
      ? ["*: a bare mouth would do better."]
      : []),
    ...(all.some(({ terrain }) => terrain === "none")
      ? ["!: beyond the terrain's tiles, a smooth Earth is taken."]
      : []),
    ...(all.some(({ terrain }) => terrain === "gaps")
      ? ["?: the tiles have gaps on the way, the ground runs straight over them."]
      : []),
  ];
  return paragraph(sentences.join(" "));
}
