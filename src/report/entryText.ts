import type { Entry, Stage } from "../budget/entry.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { grid } from "./grid.ts";
import type { ReportBudget } from "./marginText.ts";
import { abreast, hundredth, LINE_WIDTH, percent, tenth } from "./words.ts";

/** Entries that are levels themselves: they fill the level's column and leave the change's empty. */
const levels = new Set(["tx.power", "noise.thermal"]);

interface Column {
  readonly budget: ReportBudget;
  readonly byId: ReadonlyMap<string, Entry>;
  /** Level that each entry leaves, by id: of the signal, then of the noise [dBm]. */
  readonly levelAfter: ReadonlyMap<string, number>;
}

function columnOf(budget: ReportBudget): Column {
  const levelAfter = new Map<string, number>();
  let signal = 0;
  for (const { id, db } of budget.entries) {
    signal += db;
    levelAfter.set(id, signal);
  }
  let noise = 0;
  for (const { id, db } of budget.noiseEntries) {
    noise -= db;
    levelAfter.set(id, noise);
  }
  const byId = new Map([...budget.entries, ...budget.noiseEntries].map((entry) => [entry.id, entry]));
  return { budget, byId, levelAfter };
}

/** The entries of the budgets side by side, each with the level that it leaves. */
export function entryTable(budgets: readonly ReportBudget[]): string {
  return abreast(budgets, (some) => entriesAbreast(some.map(columnOf)));
}

function entriesAbreast(shown: readonly Column[]): string {
  const across = (figure: (budget: ReportBudget) => string): Cell[] =>
    shown.flatMap(({ budget }) => [{ text: figure(budget), across: 2 }, cell("")]);
  const result = (label: string, figure: (budget: ReportBudget) => number) => [
    cell(label),
    ...shown.flatMap(({ budget }) => [cell(tenth(figure(budget))), cell("")]),
  ];
  return columns([
    [cell(""), ...across(({ case: { weather } }) => weather)],
    [cell(""), ...shown.flatMap(() => [cell("dB"), cell("dBm")])],
    RULE,
    ...stageRows(shown, "transmitter"),
    ...stageRows(shown, "path"),
    ...stageRows(shown, "receiver"),
    ...stageRows(shown, "noise"),
    [cell("RESULT")],
    result("  signal to noise", ({ snrDb }) => snrDb),
    result("  needed", ({ requiredSnrDb }) => requiredSnrDb),
    result("  margin", ({ marginDb }) => marginDb),
    result("  one standard deviation", ({ marginSigmaDb }) => marginSigmaDb),
    [
      cell("  bounds, phase and water"),
      ...across(({ marginLowDb, marginHighDb }) => `${tenth(marginLowDb)} to ${tenth(marginHighDb)}`),
    ],
    [cell("  holds with"), ...across(({ holdProbability }) => percent(holdProbability))],
    [cell("  verdict"), ...across(({ verdict }) => verdict)],
  ]);
}

function stageRows(shown: readonly Column[], stage: Stage): Cell[][] {
  const labelOf = (id: string) => sharedLabel(shown.flatMap(({ byId }) => byId.get(id)?.label ?? [])) || id;
  const title =
    stage === "transmitter" || stage === "receiver"
      ? `${stage.toUpperCase()}, cover ${shown[0]!.budget.case[stage].cover}`
      : stage.toUpperCase();
  return [
    [cell(title)],
    ...idsOf(shown, stage).map((id) => [
      cell(`  ${labelOf(id)}`),
      ...shown.flatMap(({ byId, levelAfter }) => {
        const entry = byId.get(id);
        if (entry === undefined) return [cell("-"), cell("")];
        // A noise entry adds to the margin what it takes from the noise; here the noise itself is read.
        const change = stage === "noise" ? 0 - entry.db : entry.db;
        return [cell(levels.has(id) ? "" : tenth(change)), cell(tenth(levelAfter.get(id)!))];
      }),
    ]),
  ];
}

/** One label for a row: figures that differ from weather to weather as a range, `rain, 5.0-16.1 km of it`. */
function sharedLabel(labels: readonly string[]): string {
  const [first = [], ...others] = labels.map((label) => label.split(" "));
  if (others.some(({ length }) => length !== first.length)) return first.join(" ");
  return first
    .map((word, i) => {
      const words = [...new Set([word, ...others.map((other) => other[i]!)])];
      if (words.length === 1) return word;
      if (words.some((one) => Number.isNaN(Number(one)))) return words.join("/");
      const rising = words.sort((a, b) => Number(a) - Number(b));
      return `${rising[0]}-${rising.at(-1)}`;
    })
    .join(" ");
}

/** Ids of a stage in the order of the budgets; an entry that only one weather has keeps its place. */
function idsOf(shown: readonly Column[], stage: Stage): string[] {
  const ids: string[] = [];
  for (const { budget } of shown) {
    let place = 0;
    for (const entry of [...budget.entries, ...budget.noiseEntries]) {
      if (entry.stage !== stage) continue;
      const known = ids.indexOf(entry.id);
      if (known >= 0) place = known + 1;
      else ids.splice(place++, 0, entry.id);
    }
  }
  return ids;
}

/** Every entry of one budget with its bounds, deviation and source. */
export async function entryDetail(budget: ReportBudget): Promise<string> {
  const rows = [...budget.entries, ...budget.noiseEntries, budget.requirement].map((entry) => {
    const bounded = entry.low !== entry.high;
    return [
      entry.id,
      hundredth(entry.db),
      bounded ? hundredth(entry.low) : "",
      bounded ? hundredth(entry.high) : "",
      entry.sigma === 0 ? "" : entry.sigma.toFixed(2),
      entry.source,
    ];
  });
  const widths = [17, 7, 6, 6, 5];
  const sourceWidth = LINE_WIDTH - widths.reduce((sum, width) => sum + width + 2, 0);
  return grid(
    [["entry", "dB", "low", "high", "sigma", "source"], ...rows],
    [
      ...widths.map((width, i) => ({ align: i === 0 ? ("left" as const) : ("right" as const), width })),
      { align: "left", width: sourceWidth },
    ],
  );
}
