import type { Case, Link } from "../budget/types.ts";
import type { EndName } from "../scenario/types.ts";
import type { SpreadRow, SpreadStudy } from "../study/spread.ts";
import { coverMatters, type MatterOfSpread, type SpreadRanking } from "../study/spreadRanking.ts";
import { coverName } from "./marginText.ts";
import { matterWords } from "./spreadWords.ts";
import { listed, paragraph, percent, signed, tenth } from "./words.ts";

/** What a median and a chance may differ by before it is worth a word [dB, share]. */
const MEDIAN_DB = 0.3;
const CHANCE = 0.02;
/** Skew and shift of a matter that bends a margin away from the normal distribution. */
const SKEW = 0.5;
const SHIFT_DB = 0.1;

/** Where draws and a budget's root-sum-square part ways, and why. */
export function agreementText(study: SpreadStudy, link: Link): string {
  const apart = study.rows.filter((row) => differs(row));
  const count = `${study.rows.length} case${study.rows.length === 1 ? "" : "s"}`;
  if (apart.length === 0 && study.rows.length === 1) {
    return paragraph(
      `Against \`oilskin budget\`: the verdict agrees, the median to ${tenth(MEDIAN_DB)} dB and the chance to ` +
        `${100 * CHANCE} points.`,
    );
  }
  if (apart.length === 0) {
    return paragraph(
      `Against \`oilskin budget\`: verdicts of all ${count} agree, medians to ${tenth(MEDIAN_DB)} dB and chances to ` +
        `${100 * CHANCE} points.`,
    );
  }
  const turned = apart.filter(({ verdict, budget }) => verdict !== budget.verdict);
  const lines = [
    `Against \`oilskin budget\`, which adds the deviations as root-sum-square: ${study.rows.length === 1 ? "" : `${apart.length} of `}${count} ${apart.length === 1 ? "differs" : "differ"} by more ` +
      `than ${tenth(MEDIAN_DB)} dB or ${100 * CHANCE} points; ` +
      (turned.length === 0
        ? `the verdict${study.rows.length === 1 ? " is" : "s are"} the same.`
        : `verdicts differ in ${listed(turned.map((row) => `${row.case.weather} under ${coverName(row)} (${row.budget.verdict} there, ${row.verdict} here)`))}.`),
    ...reasonTexts(apart, study.rankings, link),
  ];
  return [paragraph(lines[0]!), ...lines.slice(1).map((line) => paragraph(line, "- "))].join("\n");
}

function differs({ marginDb, closes, verdict, budget }: SpreadRow): boolean {
  const sampling = (closes.high - closes.low) / 2;
  return (
    verdict !== budget.verdict ||
    Math.abs(marginDb.medianDb - budget.marginDb) > MEDIAN_DB ||
    Math.abs(closes.share - budget.holdProbability) > CHANCE + sampling
  );
}

/** Where in each weather the ranked case parts from the budget, or the first that does; then all reasons, once. */
function reasonTexts(apart: readonly SpreadRow[], rankings: readonly SpreadRanking[], link: Link): string[] {
  const weathers = [...new Set(apart.map(({ case: { weather } }) => weather))];
  const told = weathers.map((weather) => {
    const rows = apart.filter((row) => row.case.weather === weather);
    const ranked = rankings.find(({ case: one }) => one.weather === weather);
    const own = rows.find((row) => ranked !== undefined && coverName(row) === coverName(ranked));
    // Another cover's share in it is not ranked; all else is alike.
    const matters = (ranked?.matters ?? []).filter(
      ({ matter }) => own !== undefined || !coverMatters.includes(matter),
    );
    const whole = (own === undefined ? ranked?.otherSigmaDb : ranked?.sigmaDb) ?? 0;
    const row = own ?? rows[0]!;
    return { line: partingText(row), reasons: reasonsOf(row, matters, whole, link) };
  });
  const reasons = new Map<string, Reason>();
  for (const reason of told.flatMap((one) => one.reasons)) {
    const known = reasons.get(reason.about);
    if (known === undefined || reason.weight > known.weight) reasons.set(reason.about, reason);
  }
  const why =
    reasons.size > 0 ? [...reasons.values()].map(({ text }) => text) : ["the tails are no normal ones"];
  return [...told.map(({ line }) => line), `because ${why.join("; ")}.`];
}

/** Why draws part from a budget; of those about one thing the weightiest is told. */
interface Reason {
  readonly about: string;
  readonly weight: number;
  readonly text: string;
}

function reasonsOf(row: SpreadRow, matters: readonly MatterOfSpread[], whole: number, link: Link): Reason[] {
  const { case: one } = row;
  const always = (about: string, texts: readonly string[]) =>
    texts.map((text) => ({ about, weight: 1, text }));
  const tied =
    link.doubts.correlation.water !== 0 && isWet(link, one, "transmitter") && isWet(link, one, "receiver");
  return [
    ...always("blunder", blunderReason(link)),
    ...always("rate as written", rateReason(one.weather, link)),
    ...matters
      .filter(({ sigmaDb, skewness, shiftDb }) => {
        const counts = sigmaDb > whole / 5;
        return (counts && Math.abs(skewness) > SKEW) || Math.abs(shiftDb) > SHIFT_DB;
      })
      .map((matter) => ({
        about: matter.matter,
        weight: Math.abs(matter.shiftDb) + matter.sigmaDb * Math.abs(matter.skewness),
        text: bentReason(matter, one.weather),
      })),
    ...always(
      "tied water",
      tied ? ["water at both ends is tied, which a root-sum-square takes as independent"] : [],
    ),
  ];
}

function partingText(row: SpreadRow): string {
  const { budget, marginDb, closes } = row;
  const [drawn, summed] = [percent(closes.share), percent(budget.holdProbability)];
  const chance = drawn === summed ? `chance ${drawn} in both` : `chance ${drawn} for ${summed}`;
  const figures = `median ${tenth(marginDb.medianDb)} for ${tenth(budget.marginDb)} dB, ${chance}`;
  return `${row.case.weather}, ${coverName(row)}: ${figures};`;
}

/** Whether water costs anything at an end. */
function isWet({ ends }: Link, { weather, ...one }: Case, end: EndName): boolean {
  const ready = ends[end][one[end].feed]!;
  const { waterMismatchDb, waterHeatDb } = ready.mouth[one[end].cover]![weather]!.parts;
  const overDish = ready.dishCover[weather]!.entries.some(({ id }) => id.endsWith("dish_cover_water"));
  return waterMismatchDb !== 0 || waterHeatDb !== 0 || overDish;
}

function blunderReason({ doubts: { blunder } }: Link): string[] {
  if (blunder.chance === 0) return [];
  return [
    `blunders, which a budget leaves out, cost some ${tenth(blunder.lossDb.value)} dB in ${Number((100 * blunder.chance).toPrecision(2))} % of the draws`,
  ];
}

function rateReason(weather: string, { doubts, scenario }: Link): string[] {
  const { rainMmPerH, coversWetAsAtMmPerH = 0 } = scenario.weather[weather]!;
  const rains = rainMmPerH.value + coversWetAsAtMmPerH > 0;
  const stated = rainMmPerH.sigma !== undefined || rainMmPerH.scatter !== undefined;
  if (!rains || stated || doubts.rainRateFactor === 1) return [];
  return [
    `the rain rate, which a budget takes as written, is drawn with a deviation of a factor of ${doubts.rainRateFactor}`,
  ];
}

function bentReason({ matter, skewness, shiftDb }: MatterOfSpread, weather: string): string {
  const { name, many } = matterWords[matter];
  const moves = `${many ? "move" : "moves"} the mean by ${signed(shiftDb)} dB (${weather})`;
  if (Math.abs(skewness) <= SKEW) return `${name} ${moves}`;
  const tail = `${name} ${many ? "have their" : "has its"} long tail towards ${skewness < 0 ? "loss" : "gain"}`;
  return Math.abs(shiftDb) > SHIFT_DB ? `${tail} and ${moves}` : tail;
}
