import { evaluate } from "../budget/evaluate.ts";
import { mouthWidthMm, sheetOf } from "../budget/mouthpiece.ts";
import type { Budget, Case, CoverState, Link, PathGeometry, Verdict, Warning } from "../budget/types.ts";
import { bandRipple } from "../cover/bandRipple.ts";
import { type Bounded, plus } from "../cover/bounded.ts";
import { type Fixing, fixingOf } from "../cover/fixing.ts";
import { findMaterial, type Material } from "../cover/materials.ts";
import { collectedShare } from "../cover/nearMouth.ts";
import { powerToDb } from "../numeric/decibels.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { Cover, EndName, Scenario } from "../scenario/types.ts";
import { type BreakEven, breakEven, rainiest } from "./breakEven.ts";
import { USUAL_BAND_SHARE } from "./thickness.ts";

/** Where a cover sits while it is judged. */
export type Placing = "both" | "transmitter" | "receiver";
export const placings: readonly Placing[] = ["both", "transmitter", "receiver"];

/** One cover in one weather at one or both ends. */
export interface CoverRow {
  readonly weather: string;
  readonly placing: Placing;
  /** What the cover takes dry, by mismatch and heat, and what water adds; of both ends together where both are covered [dB]. */
  readonly dryCostDb: Bounded;
  readonly waterCostDb: Bounded;
  /** Rise of the system's noise temperature against bare [K], and what that costs in signal to noise [dB]. */
  readonly noiseAddedK: number;
  readonly noiseCostDb: number;
  /** Bare margin less covered margin [dB]: all of the above. */
  readonly costDb: number;
  readonly transmitter: CoverState;
  readonly receiver: CoverState;
  readonly marginDb: number;
  readonly marginSigmaDb: number;
  readonly verdict: Verdict;
  readonly bareMarginDb: number;
  readonly bareVerdict: Verdict;
}

/** What a layer's material is known to do outdoors; undefined for a material of the user's own. */
export interface Durability {
  readonly name: string;
  readonly material: Material | undefined;
  readonly fixing: Fixing;
}

export interface CoverJudgement {
  readonly cover: string;
  readonly rows: readonly CoverRow[];
  /** The layers, feed side first. */
  readonly durability: readonly Durability[];
  /** Swing of the dry cover's loss over the band at each end, peak to peak [dB]; undefined for a measured cover. */
  readonly rippleDb: { readonly transmitter: number; readonly receiver: number } | undefined;
  /** Repeatability below which its dry cost cannot be told from nothing, both ends together [dB]. */
  readonly repeatabilityDb: number;
  readonly breakEven: BreakEven;
}

export interface CoverVerdict {
  readonly title: string;
  readonly frequencyGHz: number;
  readonly path: PathGeometry;
  readonly mode: string;
  readonly weathers: readonly string[];
  /** The asked weather in which a cover at both ends, or bare, leaves the least. */
  readonly worstWeather: string;
  /** The weather that break-even rates are sought in. */
  readonly rainWeather: string;
  /** Width of the band in which the ripple is sought [GHz]. */
  readonly bandGHz: number;
  /** Best first, by the margin left in the worst weather with the cover at both ends; bare among them. */
  readonly covers: readonly CoverJudgement[];
  readonly warnings: readonly Warning[];
}

/**
 * Which cover: every cover of the scenario in every asked weather, at one end and at both, against bare mouths.
 *
 * @param mode      name of a mode of the link
 * @param weathers  names of weathers of the link, at least one
 * @param bandGHz   band in which the ripple is sought [GHz]
 */
export function coverVerdict(
  link: Link,
  mode: string,
  weathers: readonly string[],
  bandGHz = USUAL_BAND_SHARE * link.scenario.frequencyGHz,
): CoverVerdict {
  const { scenario, path } = link;
  const warnings = new Map<string, Warning>();
  const budgetOf = (weather: string, placing: Placing, cover: string): Budget => {
    const budget = evaluate(link, caseOf(link, weather, placing, cover, mode));
    for (const warning of budget.warnings)
      warnings.set(`${warning.code} ${warning.where} ${warning.message}`, warning);
    return budget;
  };
  const bare = new Map(weathers.map((weather) => [weather, budgetOf(weather, "both", "bare")]));
  const rainWeather = rainiest(link, weathers);

  const covers = Object.entries(scenario.covers).map(([name, cover]): CoverJudgement => {
    const rows = weathers.flatMap((weather) =>
      placings.map((placing) =>
        rowOf(weather, placing, budgetOf(weather, placing, name), bare.get(weather)!),
      ),
    );
    return {
      cover: name,
      rows,
      durability: cover.layers
        .filter(({ material }) => material !== "air")
        .map(({ material }) => durabilityOf(material)),
      rippleDb: rippleOf(scenario, cover, bandGHz),
      repeatabilityDb: repeatabilityOf(cover),
      breakEven: breakEven(link, caseOf(link, rainWeather, "both", name, mode)),
    };
  });
  const left = ({ rows }: CoverJudgement, asked: string) =>
    rows.find(({ weather, placing }) => weather === asked && placing === "both")!.marginDb;
  const least = (weather: string) => Math.min(...covers.map((judged) => left(judged, weather)));
  const worstWeather = weathers.reduce((a, b) => (least(b) < least(a) ? b : a));
  return {
    title: scenario.title,
    frequencyGHz: scenario.frequencyGHz,
    path,
    mode,
    weathers,
    worstWeather,
    rainWeather,
    bandGHz,
    covers: covers.toSorted((a, b) => left(b, worstWeather) - left(a, worstWeather)),
    warnings: [...warnings.values()],
  };
}

function caseOf({ scenario }: Link, weather: string, placing: Placing, cover: string, mode: string): Case {
  const at = (end: "transmitter" | "receiver") => ({
    feed: scenario[end].feed,
    cover: placing === "both" || placing === end ? cover : "bare",
  });
  return { weather, mode, transmitter: at("transmitter"), receiver: at("receiver") };
}

function rowOf(weather: string, placing: Placing, budget: Budget, bare: Budget): CoverRow {
  const { transmitterCover: transmitter, receiverCover: receiver } = budget;
  return {
    weather,
    placing,
    dryCostDb: plus(transmitter.dryCostDb, receiver.dryCostDb),
    waterCostDb: plus(transmitter.waterCostDb, receiver.waterCostDb),
    noiseAddedK: budget.systemTemperatureK - bare.systemTemperatureK,
    noiseCostDb: powerToDb(budget.systemTemperatureK / bare.systemTemperatureK),
    costDb: bare.marginDb - budget.marginDb,
    transmitter,
    receiver,
    marginDb: budget.marginDb,
    marginSigmaDb: budget.marginSigmaDb,
    verdict: budget.verdict,
    bareMarginDb: bare.marginDb,
    bareVerdict: bare.verdict,
  };
}

/** Each end's feed under the dry cover, straight on, swept over the band. */
function rippleOf(scenario: Scenario, cover: Cover, bandGHz: number): CoverJudgement["rippleDb"] {
  const { frequencyGHz } = scenario;
  if (cover.measured) return undefined;
  const layers = cover.layers.map(({ thicknessMm, permittivity, lossTangent }) => ({
    thicknessMm,
    permittivity: permittivity.nominal,
    lossTangent: lossTangent.nominal,
  }));
  const at = (end: EndName) => {
    const feed = scenario.feeds[scenario[end].feed]!;
    const near = { frequencyGHz, apertureMm: mouthWidthMm(feed), gapMm: cover.gapMm };
    return bandRipple({
      frequencyGHz,
      bandGHz,
      sheetAt: (swept) => sheetOf(swept, layers),
      feedReturnLossDb: feed.returnLossDb,
      phaseDeg: feed.phaseDeg,
      gapMm: cover.gapMm,
      ...collectedShare(near),
    }).rippleDb;
  };
  return { transmitter: at("transmitter"), receiver: at("receiver") };
}

function durabilityOf(name: string): Durability {
  return { name, material: findMaterial(name), fixing: fixingOf(name) };
}

/** Twice the standard deviation of a reading, or the bench's usual; two ends add by root-sum-square. */
function repeatabilityOf({ measured }: Cover): number {
  const oneEnd = Math.max(BENCH_REPEATABILITY_DB, 2 * (measured?.insertionLossDb.sigma ?? 0));
  return Math.SQRT2 * oneEnd;
}
