import type { Link } from "../budget/types.ts";
import type { Chance, SpreadRow, SpreadStudy } from "../study/spread.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { dishCoverText } from "./coversText.ts";
import { coverName, meanings, pathLines } from "./marginText.ts";
import { carriedText, verdictWords } from "./mechanismText.ts";
import { warningText } from "./notes.ts";
import { adviceText, rankingTable } from "./spreadAdvice.ts";
import { agreementText } from "./spreadAgreement.ts";
import { spreadCautions } from "./spreadCautions.ts";
import { rangePicture } from "./spreadPicture.ts";
import { scatterWords } from "./spreadWords.ts";
import { abreast, capital, lengthOf, listed, type Paint, paragraph, plain, tenth } from "./words.ts";

/** How sure the verdict is, in words; then margins, covers, what the spread hangs on, and what a budget says. */
export function spreadText(
  study: SpreadStudy,
  link: Link,
  { detail = false, paint = plain }: { readonly detail?: boolean; readonly paint?: Paint } = {},
): string {
  const weathers = [...new Set(study.rows.map(({ case: { weather } }) => weather))];
  const rowsIn = (weather: string) => study.rows.filter((row) => row.case.weather === weather);
  const parts = [
    pathLines(study, link, paint),
    paragraph(howDrawn(study, link)),
    dishCoverText(link),
    weathers.map((weather) => paragraph(sentence(rowsIn(weather), weather), "- ")).join("\n"),
    wayText(study, link),
    ...weathers.map((weather) =>
      [
        paint("strong", `${capital(weather)}: margin in dB`),
        marginTable(rowsIn(weather), link, paint),
        "",
        rangePicture(rowsIn(weather), link.scenario.decision.reserveDb),
      ].join("\n"),
    ),
    paragraph(
      "5 %, 95 %: one draw in twenty lies below, one above. hold: draws with a margin above 0. takes: bare less covered " +
        "in the same draws, median (5 to 95 %). lost: draws that hold with bare feeds and not with the cover. *: as the " +
        "scenario has it. Bars: 5 to 95 %, o the median, | a margin of 0, : the reserve.",
    ),
    `${paint("strong", "What the spread hangs on, scenario's covers, blunders left out")}\n${rankingTable(study)}\n${rankingLegend}`,
    adviceText(study),
    agreementText(study, link),
    detail ? `${paint("strong", "What was drawn")}\n${causeTable(study)}` : "",
    warningText(study.warnings, paint),
    spreadCautions(paint),
    leftOut,
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

const rankingLegend = paragraph(
  "share: part of the variance that would go if it were known; rank: rank correlation with the margin, 0 to 1; dB: " +
    "standard deviation that it makes by itself.",
);

const leftOut = paragraph(
  "Not drawn: errors of the standards themselves where they state none, multipath fading and ducting, a station off " +
    "frequency, the day's refraction beyond what the doubt of the way over the ground holds.",
);

function howDrawn({ mode, draws, mostDraws, seed, halfWidth, precision }: SpreadStudy, link: Link): string {
  const within = Number((100 * halfWidth).toPrecision(1));
  const points = `${within} point${within === 1 ? "" : "s"}`;
  const stop =
    draws < mostDraws
      ? `enough for chances good to ${points}`
      : halfWidth <= precision
        ? `chances good to ${points}`
        : `chances good to ${points}, where ${Number((100 * precision).toPrecision(2))} were asked for`;
  return (
    `${capital(link.modes[mode]!.label)}: ${draws.toLocaleString("en-GB")} draw${draws === 1 ? "" : "s"}, ${stop} (95 %), the same draws for all ` +
    `covers and weathers; seed ${seed}.`
  );
}

/** The answer in one weather: the scenario's covers, or the first asked for, against bare feeds. */
function sentence(rows: readonly SpreadRow[], weather: string): string {
  const [row] = rows as [SpreadRow];
  const { marginDb, closes } = row;
  const range = `${tenth(marginDb.medianDb)} dB in the middle, ${tenth(marginDb.lowDb)} to ${tenth(marginDb.highDb)} dB in nine draws of ten`;
  const answer = `${capital(weather)}: ${coverName(row)} ${verdictWords[row.verdict]} and holds in ${chance(closes)} of the draws (${range})`;
  if (row.costDb === undefined) return `${answer}.`;
  const turned = [
    { verb: "loses", hundredth: 100 * row.lost },
    { verb: "wins", hundredth: 100 * row.won },
  ].filter(({ hundredth }) => hundredth >= 0.05);
  const what = turned.map(
    ({ verb, hundredth }, i) => `${verb} ${countOf(hundredth)}${i === 0 ? " of a hundred draws" : ""}`,
  );
  return `${answer}; against bare feeds the cover ${what.length === 0 ? "changes no outcome" : listed(what)}.`;
}

/** What carries the path, as a budget has it; draws take the best way each. */
function wayText({ rows }: SpreadStudy, link: Link): string {
  if (link.ground === undefined)
    return paragraph("Line of sight is taken: no hill, tree or building in the way.");
  const first = rows[0]!;
  const own = rows.filter((row) => coverName(row) === coverName(first));
  return carriedText(own.map(({ case: one, budget }) => ({ case: one, ...budget })))
    .map((line) => paragraph(line))
    .join("\n");
}

const countOf = (hundredth: number) => hundredth.toFixed(hundredth < 9.95 ? 1 : 0);

/** A drawn probability to a tenth of a per cent, and no surer than the draws are. */
export function chance({ share, low, high }: Chance): string {
  if (low > 0.999) return "over 99.9 %";
  if (high < 0.001) return "under 0.1 %";
  if (share === 0 || share === 1) return share === 0 ? "none" : "all";
  return `${(100 * share).toFixed(1)} %`;
}

function marginTable(rows: readonly SpreadRow[], { scenario }: Link, paint: Paint): string {
  const { transmitter, receiver } = scenario;
  const isOwn = ({ case: one }: SpreadRow) =>
    one.transmitter.cover === transmitter.cover && one.receiver.cover === receiver.cover;
  const figures: readonly { readonly head: string; readonly of: (row: SpreadRow) => string }[] = [
    { head: "5 %", of: ({ marginDb }) => tenth(marginDb.lowDb) },
    { head: "median", of: ({ marginDb }) => tenth(marginDb.medianDb) },
    { head: "95 %", of: ({ marginDb }) => tenth(marginDb.highDb) },
    { head: "hold %", of: ({ closes }) => share(closes.share) },
    { head: "verdict", of: ({ verdict }) => verdict },
    {
      head: "takes",
      of: ({ costDb }) =>
        costDb === undefined
          ? "-"
          : `${tenth(costDb.medianDb)} (${tenth(costDb.lowDb)}..${tenth(costDb.highDb)})`,
    },
    { head: "lost %", of: ({ costDb, lost }) => (costDb === undefined ? "-" : share(lost)) },
  ];
  return abreast(figures, (some, measured) =>
    columns([
      [cell("cover"), ...some.map(({ head }) => cell(head))],
      RULE,
      ...rows.map((row): Cell[] => [
        cell(isOwn(row) ? `${coverName(row)} *` : coverName(row)),
        ...some.map(({ head, of }) => {
          const text = of(row);
          return cell(text, head === "verdict" && !measured ? paint(meanings[row.verdict], text) : text);
        }),
      ]),
    ]),
  );
}

/** A share to a tenth of a per cent; only what never failed in the draws is told by a bound. */
function share(part: number): string {
  if (part > 0.9995) return ">99.9";
  return part > 0 && part < 0.0005 ? "<0.1" : (100 * part).toFixed(1);
}

/** Every cause with its distribution, a line each or two. */
function causeTable({ causes }: SpreadStudy): string {
  const lines = causes.map(({ label, end, scatter, unit, stated }) => ({
    name: end === undefined || label.startsWith(end) ? label : `${end}, ${label}`,
    how: `${scatterWords({ scatter, unit })}${stated ? " (scenario)" : ""}`,
  }));
  const width = Math.max(...lines.map(({ name }) => lengthOf(name))) + 2;
  return lines.map(({ name, how }) => paragraph(how, `  ${name.padEnd(width)}`)).join("\n");
}
