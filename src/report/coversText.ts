import type { CoverState, Link, Verdict } from "../budget/types.ts";
import { reflectionFigures } from "../cover/reflectionFigures.ts";
import type { CoverJudgement, CoverRow, CoverVerdict, Durability } from "../study/coverVerdict.ts";
import { cell, columns, RULE } from "./columns.ts";
import { meanings, pathLines } from "./marginText.ts";
import { warningText } from "./notes.ts";
import { capital, type Paint, paragraph, plain, tenth } from "./words.ts";

/** Which cover: one sentence each, best first, then the figures behind it. */
export function coversText(verdict: CoverVerdict, link: Link, paint: Paint = plain): string {
  const { weathers, worstWeather } = verdict;
  const parts = [
    pathLines(verdict, link, paint),
    paragraph(
      `${capital(link.modes[verdict.mode]!.label)}; ` +
        `best first by the margin left in ${worstWeather}, cover at both ends.`,
    ),
    verdict.covers.map((judged, i) => paragraph(sentence(judged, verdict, link), `${i + 1} `)).join("\n"),
    ...weathers.map(
      (weather) => `${paint("strong", weatherTitle(weather, link))}\n${costTable(verdict, weather, paint)}`,
    ),
    `${paint("strong", "Match at the feed: return loss in dB, change against bare, VSWR")}\n${matchTable(verdict)}`,
    rippleText(verdict, paint),
    `${paint("strong", `Rain that uses the margin up (path and covers, as in ${verdict.rainWeather})`)}\n${breakEvenTable(verdict, link)}`,
    `${paint("strong", "Outdoors")}\n${verdict.covers.flatMap(outdoors).join("\n")}`,
    warningText(verdict.warnings, paint),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function bothEnds({ rows }: CoverJudgement, weather: string): CoverRow {
  return rows.find((row) => row.weather === weather && row.placing === "both")!;
}

/** The cover in one sentence: dry, wet at its worst, and what that does to the answer. */
function sentence(judged: CoverJudgement, { worstWeather }: CoverVerdict, { scenario }: Link): string {
  const worst = bothEnds(judged, worstWeather);
  const left = `${tenth(worst.marginDb)} dB left in ${worstWeather}`;
  if (judged.cover === "bare")
    return `bare: ${left}, ${worst.verdict}; rain, dust and insects enter the feed.`;
  const dry = worst.dryCostDb.nominal;
  const dryWords =
    Math.abs(dry) < judged.repeatabilityDb
      ? `costs ${tenth(Math.abs(dry))} dB dry, indistinguishable from bare at a bench's repeatability`
      : dry < 0
        ? `wins ${tenth(-dry)} dB dry, as it tunes the feed`
        : `costs ${tenth(dry)} dB dry (${tenth(worst.dryCostDb.low)} to ${tenth(worst.dryCostDb.high)})`;
  const rate =
    scenario.weather[worstWeather]!.coversWetAsAtMmPerH ?? scenario.weather[worstWeather]!.rainMmPerH.value;
  const wetWords = rate > 0 ? `; ${tenth(worst.costDb)} dB wet at ${rate} mm/h` : "";
  return `${judged.cover}: ${dryWords}${wetWords}, and that ${turn(worst.bareVerdict, worst.verdict)}; ${left}.`;
}

function turn(before: Verdict, after: Verdict): string {
  return before === after ? `leaves it at \`${after}\`` : `turns \`${before}\` into \`${after}\``;
}

function weatherTitle(weather: string, { scenario }: Link): string {
  const { rainMmPerH, coversWetAsAtMmPerH, wets } = scenario.weather[weather]!;
  const said = [
    ...(rainMmPerH.value > 0 ? [`rain ${rainMmPerH.value} mm/h`] : []),
    ...(coversWetAsAtMmPerH === undefined ? [] : [`covers wet as at ${coversWetAsAtMmPerH} mm/h`]),
    ...(wets.length === 1 && (rainMmPerH.value > 0 || coversWetAsAtMmPerH) ? [`wets the ${wets[0]}`] : []),
  ];
  return said.length === 0 ? weather : `${weather}: ${said.join(", ")}`;
}

/** Costs of both ends covered, and the margins with one end covered beside them. */
function costTable({ covers }: CoverVerdict, weather: string, paint: Paint): string {
  const margin = ({ rows }: CoverJudgement, placing: CoverRow["placing"]) => {
    const row = rows.find((one) => one.weather === weather && one.placing === placing)!;
    const verdict = row.verdict.padEnd(6);
    const figure = `${tenth(row.marginDb)} `;
    return cell(figure + verdict, figure + paint(meanings[row.verdict], verdict));
  };
  return columns([
    [
      cell(""),
      { text: "cost in dB at both ends", across: 4 },
      ...empty(3),
      { text: "margin left in dB, covered at", across: 3 },
      ...empty(2),
    ],
    ["cover", "dry", "water", "noise (K)", "all", "both", "transmitter", "receiver"].map((text) =>
      cell(text),
    ),
    RULE,
    ...covers.map((judged) => {
      const row = bothEnds(judged, weather);
      return [
        cell(judged.cover),
        cell(tenth(row.dryCostDb.nominal)),
        cell(tenth(row.waterCostDb.nominal)),
        cell(`${tenth(row.noiseCostDb)} (${Math.round(row.noiseAddedK) + 0})`),
        cell(tenth(row.costDb)),
        margin(judged, "both"),
        margin(judged, "transmitter"),
        margin(judged, "receiver"),
      ];
    }),
  ]);
}

const empty = (count: number) => Array.from({ length: count }, () => cell(""));

/** Return loss of both feeds in the dry and in the worst weather. */
function matchTable({ covers, weathers, worstWeather }: CoverVerdict): string {
  const shown = [...new Set([weathers[0]!, worstWeather])];
  return columns([
    [cell(""), ...shown.flatMap((weather) => [{ text: weather, across: 2 }, cell("")])],
    [cell("cover"), ...shown.flatMap(() => [cell("transmitter"), cell("receiver")])],
    RULE,
    ...covers.map((judged) => [
      cell(judged.cover),
      ...shown.flatMap((weather) => {
        const { transmitter, receiver } = bothEnds(judged, weather);
        return [cell(match(transmitter)), cell(match(receiver))];
      }),
    ]),
  ]);
}

function match({ bareReturnLossDb, returnLossDb: { nominal } }: CoverState): string {
  const change = nominal - bareReturnLossDb;
  const signed =
    tenth(change).startsWith("-") || tenth(change) === "0.0" ? tenth(change) : `+${tenth(change)}`;
  return `${tenth(nominal)} ${signed} ${reflectionFigures({ returnLossDb: nominal }).vswr.toFixed(2)}`;
}

/** Swing of each cover's loss over the band, where it is worth a line. */
function rippleText({ covers, bandGHz }: CoverVerdict, paint: Paint): string {
  const swings = covers.flatMap(({ cover, rippleDb }) => {
    if (rippleDb === undefined || cover === "bare") return [];
    const { transmitter, receiver } = rippleDb;
    return `${cover} ${transmitter.toFixed(2)} and ${receiver.toFixed(2)} dB`;
  });
  if (swings.length === 0) return "";
  const title = `Ripple over a band of ${Number((1000 * bandGHz).toPrecision(3))} MHz, dry, transmitter and receiver`;
  return `${paint("strong", title)}\n${paragraph(`  ${swings.join("; ")}`)}`;
}

function breakEvenTable({ covers }: CoverVerdict, { scenario }: Link): string {
  const rate = (value: number | undefined) =>
    value === undefined
      ? "none"
      : value === 0
        ? "any"
        : `${value < 10 ? value.toFixed(1) : value.toFixed(0)} mm/h`;
  return columns([
    [
      cell("cover"),
      cell(`leaves the reserve of ${tenth(scenario.decision.reserveDb)} dB up to`),
      cell("leaves anything up to"),
    ],
    RULE,
    ...covers.map(({ cover, breakEven }) => [
      cell(cover),
      cell(rate(breakEven.reserveMmPerH)),
      cell(rate(breakEven.zeroMmPerH)),
    ]),
  ]);
}

/** What the weather does to a cover, how it is fixed and what to mind. */
function outdoors({ cover, durability }: CoverJudgement): string[] {
  if (cover === "bare") return [];
  if (durability.length === 0) return [paragraph("measured; its material is not known here", `  ${cover}: `)];
  const seen = new Set<string>();
  return durability
    .filter(({ name }) => !seen.has(name) && seen.add(name))
    .map((one) => paragraph(durabilityWords(one), `  ${cover}: `));
}

function durabilityWords({ name, material, fixing }: Durability): string {
  const figures = [
    material?.uvWords,
    material?.waterUptakePercent === undefined
      ? undefined
      : `takes up ${material.waterUptakePercent} % of water in a day`,
    material?.serviceMaxC === undefined
      ? undefined
      : `${material.serviceMinC ?? "?"} to ${material.serviceMaxC} degC`,
    material?.wetting === undefined ? undefined : `${material.wetting} when clean and new`,
    material?.notes,
  ].filter((word) => word !== undefined);
  const known = figures.length === 0 ? "nothing known of it outdoors" : figures.join("; ");
  return `${name}: ${known}. Held ${fixing.how}. Mind: ${fixing.caution}.`;
}
