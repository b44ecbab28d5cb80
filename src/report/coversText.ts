import type { CoverState, Link, Verdict } from "../budget/types.ts";
import { reflectionFigures } from "../cover/reflectionFigures.ts";
import type { Weather } from "../scenario/types.ts";
import { HEAVIEST_MM_PER_H } from "../study/breakEven.ts";
import {
  type CoverJudgement,
  type CoverRow,
  type CoverVerdict,
  type Durability,
  placings,
} from "../study/coverVerdict.ts";
import { type Cell, cell, columns, RULE } from "./columns.ts";
import { meanings, pathLines } from "./marginText.ts";
import { handsOnText, warningText } from "./notes.ts";
import { backLines, rateFigure } from "./rateWords.ts";
import { abreast, capital, listed, type Paint, paragraph, plain, signed, tenth } from "./words.ts";

/** Which cover: one sentence each, best first, then the figures behind it. */
export function coversText(verdict: CoverVerdict, link: Link, paint: Paint = plain): string {
  const { weathers, worstWeather } = verdict;
  const parts = [
    pathLines(verdict, link, paint),
    paragraph(
      `${capital(link.modes[verdict.mode]!.label)}; ` +
        `best first by the margin left in ${worstWeather}, cover on the feeds of both ends.`,
    ),
    dishCoverText(link),
    verdict.covers.map((judged, i) => paragraph(sentence(judged, verdict, link), `${i + 1} `)).join("\n"),
    ...weathers.map(
      (weather) => `${paint("strong", weatherTitle(weather, link))}\n${costTable(verdict, weather, paint)}`,
    ),
    `${paint("strong", "Match at the feed: return loss in dB, change against bare, VSWR")}\n${matchTable(verdict)}`,
    rippleText(verdict, paint),
    `${paint("strong", paragraph(`Rain that uses the margin up (path and covers, as in ${verdict.rainWeather})`))}\n${breakEvenTable(verdict, link)}`,
    `${paint("strong", "Outdoors")}\n${verdict.covers.flatMap(outdoors).join("\n")}`,
    warningText(verdict.warnings, paint),
    handsOnText(paint),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function bothEnds({ rows }: CoverJudgement, weather: string): CoverRow {
  return rows.find((row) => row.weather === weather && row.placing === "both")!;
}

/** Covers over a dish are no choice here: they stay as the scenario has them. */
export function dishCoverText({ scenario, ends }: Link): string {
  const over = (["transmitter", "receiver"] as const).flatMap((end) => {
    const { dishCover, feed } = scenario[end];
    return ends[end][feed]!.isSheltered ? `${dishCover} (${end})` : [];
  });
  if (over.length === 0) return "";
  return paragraph(
    `Over the dish: ${listed(over)}. It stays in every margin below, bare ones too, and keeps the feed behind ` +
      "it dry; `oilskin budget` shows what it takes.",
  );
}

/** The cover in one sentence: dry, wet at its worst, and what that does to the answer. */
function sentence(judged: CoverJudgement, { worstWeather }: CoverVerdict, { scenario }: Link): string {
  const worst = bothEnds(judged, worstWeather);
  const left = `${tenth(worst.marginDb)} dB left in ${worstWeather}`;
  if (judged.cover === "bare") {
    return `bare: ${left}, ${worst.verdict}; rain, dust and insects enter the feed, and nothing is charged for that.`;
  }
  return (
    `${judged.cover}: ${dryWords(judged, worst)}${wetWords(worst, scenario.weather[worstWeather]!)}, ` +
    `and that ${turn(worst.bareVerdict, worst.verdict)}; ${left}.`
  );
}

function dryWords(
  { repeatabilityDb }: CoverJudgement,
  { dryCostDb: { low, nominal, high } }: CoverRow,
): string {
  const figure = tenth(Math.abs(nominal));
  if (Math.abs(nominal) < repeatabilityDb) {
    const verb = nominal < 0 && figure !== "0.0" ? "wins" : "costs";
    return `${verb} ${figure} dB dry, indistinguishable from bare at a bench's repeatability`;
  }
  if (nominal < 0) return `wins ${figure} dB dry, as it tunes the feed`;
  const bounds = tenth(low) === tenth(high) ? "" : ` (${tenth(low)} to ${tenth(high)})`;
  return `costs ${figure} dB dry${bounds}`;
}

/** Everything together in the worst weather, where that puts something on the cover. */
function wetWords({ weather, costDb }: CoverRow, asked: Weather): string {
  const rate = asked.coversWetAsAtMmPerH ?? asked.rainMmPerH.value;
  const lies = asked.dewMm.value > 0 || asked.iceMm > 0 || asked.snow !== undefined;
  if (asked.wets.length === 0 || (rate === 0 && !lies)) return "";
  const raining = rate > 0 && asked.driedForMin === 0 && !lies;
  return `; ${tenth(costDb)} dB ${raining ? `wet at ${rate} mm/h` : `in ${weather}`}`;
}

function turn(before: Verdict, after: Verdict): string {
  return before === after ? `leaves it at \`${after}\`` : `turns \`${before}\` into \`${after}\``;
}

function weatherTitle(weather: string, { scenario }: Link): string {
  const { rainMmPerH, coversWetAsAtMmPerH, driedForMin, dewMm, iceMm, snow, wets } =
    scenario.weather[weather]!;
  const rate = coversWetAsAtMmPerH ?? rainMmPerH.value;
  const onCovers = [
    ...(coversWetAsAtMmPerH === undefined ? [] : [`covers wet as at ${coversWetAsAtMmPerH} mm/h`]),
    ...(rate > 0 && driedForMin > 0 ? [`dried for ${driedForMin} min`] : []),
    ...(dewMm.value > 0 ? [`dew ${dewMm.value} mm`] : []),
    ...(iceMm > 0 ? [`ice ${iceMm} mm`] : []),
    ...(snow === undefined ? [] : [`snow ${snow.depthMm} mm, ${snow.wetnessPercent} % water`]),
  ];
  const lies = rate > 0 || onCovers.length > 0;
  const said = [
    ...(rainMmPerH.value > 0 ? [`rain ${rainMmPerH.value} mm/h`] : []),
    ...onCovers,
    ...(lies && wets.length === 1 ? [`wets the ${wets[0]}`] : []),
    ...(lies && wets.length === 0 ? ["wets no cover"] : []),
  ];
  return paragraph(said.length === 0 ? weather : `${weather}: ${said.join(", ")}`);
}

/** Costs of both ends covered, and the margins with one end covered beside them, or below where names are long. */
function costTable({ covers }: CoverVerdict, weather: string, paint: Paint): string {
  const margin = ({ rows }: CoverJudgement, placing: CoverRow["placing"], paint: Paint) => {
    const row = rows.find((one) => one.weather === weather && one.placing === placing)!;
    const verdict = row.verdict.padEnd(6);
    const figure = `${tenth(row.marginDb)} `;
    return cell(figure + verdict, figure + paint(meanings[row.verdict], verdict));
  };
  const costs = {
    title: "cost in dB at both ends",
    heads: ["dry", "water", "noise (K)", "all"],
    cells: (judged: CoverJudgement) => {
      const { dryCostDb, waterCostDb, noiseCostDb, noiseAddedK, costDb } = bothEnds(judged, weather);
      const noise = `${tenth(noiseCostDb)} (${Math.round(noiseAddedK) + 0})`;
      return [tenth(dryCostDb.nominal), tenth(waterCostDb.nominal), noise, tenth(costDb)].map((text) =>
        cell(text),
      );
    },
  };
  const margins = {
    title: "margin left in dB, covered at",
    heads: placings,
    cells: (judged: CoverJudgement, paint: Paint) =>
      placings.map((placing) => margin(judged, placing, paint)),
  };
  return abreast([costs, margins], (some, measured) =>
    columns([
      [cell(""), ...some.flatMap(({ title, heads }) => spanning(title, heads.length))],
      [cell("cover"), ...some.flatMap(({ heads }) => heads.map((text) => cell(text)))],
      RULE,
      ...covers.map((judged) => [
        cell(judged.cover),
        ...some.flatMap(({ cells }) => cells(judged, measured ? plain : paint)),
      ]),
    ]),
  );
}

/** A heading over some columns: its own cell and the covered ones. */
function spanning(text: string, across: number): Cell[] {
  return [{ text, across }, ...Array.from({ length: across - 1 }, () => cell(""))];
}

/** Return loss of both feeds in the dry and in the worst weather. */
function matchTable({ covers, weathers, worstWeather }: CoverVerdict): string {
  return abreast([...new Set([weathers[0]!, worstWeather])], (shown) =>
    columns([
      [cell(""), ...shown.flatMap((weather) => spanning(weather, 2))],
      [cell("cover"), ...shown.flatMap(() => [cell("transmitter"), cell("receiver")])],
      RULE,
      ...covers.map((judged) => [
        cell(judged.cover),
        ...shown.flatMap((weather) => {
          const { transmitter, receiver } = bothEnds(judged, weather);
          return [cell(match(transmitter)), cell(match(receiver))];
        }),
      ]),
    ]),
  );
}

function match({ bareReturnLossDb, returnLossDb: { nominal } }: CoverState): string {
  const change = signed(nominal - bareReturnLossDb);
  return `${tenth(nominal)} ${change} ${reflectionFigures({ returnLossDb: nominal }).vswr.toFixed(2)}`;
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
  const rate = (value: number | undefined) => {
    if (value === undefined) return `not by ${HEAVIEST_MM_PER_H} mm/h`;
    return value === 0 ? "without rain" : `${rateFigure(value)} mm/h`;
  };
  const ways = [
    { head: `down to the reserve of ${tenth(scenario.decision.reserveDb)} dB at`, way: "reserveMmPerH" },
    { head: "down to nothing at", way: "zeroMmPerH" },
  ] as const;
  const table = abreast(ways, (some) =>
    columns([
      [cell("cover"), ...some.map(({ head }) => cell(head))],
      RULE,
      ...covers.map(({ cover, breakEven }) => [
        cell(cover),
        ...some.map(({ way }) => cell(rate(breakEven[way]))),
      ]),
    ]),
  );
  return [table, ...covers.flatMap(({ cover, breakEven }) => backLines(cover, breakEven))].join("\n");
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
