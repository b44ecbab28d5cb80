import type { SheetSolution } from "../readings/inferSheet.ts";
import type { FurtherReading } from "../readings/tellApart.ts";
import type {
  FeedReport,
  InferReport,
  PossibleFeed,
  SheetByFeed,
  SheetReport,
} from "../study/inferReadings.ts";
import { culpritWords, decibels } from "./readingsWords.ts";
import { hundredth, listed, type Paint, paragraph, plain, tenth } from "./words.ts";

/** What the readings say of a feed and of sheets, for a terminal of 80 columns: the answer first. */
export function inferText(report: InferReport, paint: Paint = plain): string {
  const { file, title, frequencyGHz, feed, sheets, contradictions } = report;
  const parts = [
    [
      paint("strong", paragraph(`Inferred from ${file}, ${frequencyGHz} GHz`)),
      ...(title === undefined ? [] : [paragraph(title)]),
    ].join("\n"),
    feed ? feedText(feed, paint) : "",
    ...sheets.map((sheet) => sheetText(sheet, report, paint)),
    contradictions.length === 0
      ? ""
      : [
          paint("bad", "Contradictions"),
          ...contradictions.map(({ sheet, insertionLossDb, floorDb, suspects }) =>
            paragraph(
              `${sheet}: a loss of ${decibels(insertionLossDb)} lies below the ${decibels(floorDb)} that the return losses ` +
                `demand (below_energy_floor); ${culpritWords(suspects)}; read it again`,
              "  - ",
            ),
          ),
        ].join("\n"),
    paragraph(trustWords(report)),
  ];
  return `${parts.filter((part) => part !== "").join("\n\n")}\n`;
}

function feedText(feed: FeedReport, paint: Paint): string {
  const { outcome, feeds, residuals, outlier, chiSquared, degreesOfFreedom, advice } = feed;
  const list = feeds.length > 1 ? feeds.map((one) => paragraph(feedWords(one), "  - ")) : [];
  const facts = [
    ...(outlier
      ? [
          `${outlier.name} stands out: without it the others agree far better (chi-squared ${tenth(outlier.chiSquaredWithout)} ` +
            `in place of ${tenth(chiSquared!)}); it is kept in the fit`,
        ]
      : []),
    ...(degreesOfFreedom > 0
      ? [
          `off the best fit, in standard uncertainties: ${residuals.map(residualWords).join("; ")}` +
            ` (chi-squared ${tenth(chiSquared!)} over ${degreesOfFreedom})`,
        ]
      : []),
  ];
  return [
    paint(outcome === "decided" ? "good" : "doubtful", paragraph(`Feed: ${feedAnswer(feed)}`)),
    ...list,
    ...facts.map((fact) => paragraph(fact, "  - ")),
    ...adviceLines(advice),
  ].join("\n");
}

function feedAnswer({ outcome, feeds, cosSum, cosSumExpanded }: FeedReport): string {
  switch (outcome) {
    case "decided":
      return feedWords(feeds[0]!);
    case "undetermined":
      return (
        `the readings cannot decide the phase: return loss ${tenth(feeds[0]!.returnLossDb)} dB, ` +
        "any phase fits nearly as well; a sheet that reflects about as much as the feed tells most"
      );
    case "ambiguous":
      return `the readings cannot decide between ${feeds.length} solutions:`;
    case "contradictory":
      return (
        `contradictory: no phase of the feed explains these readings of this sheet (cosine ${hundredth(cosSum!)} ± ` +
        `${hundredth(cosSumExpanded!)}, beyond 1); wrong material or thickness, a gap, or a leaking coupler?`
      );
  }
}

function feedWords({
  returnLossDb,
  gamma,
  gammaExpanded,
  phaseDeg,
  phaseLowDeg,
  phaseHighDeg,
}: PossibleFeed): string {
  const spread = gammaExpanded === undefined ? "" : ` ± ${gammaExpanded.toFixed(3)}`;
  return (
    `reflection ${gamma.toFixed(3)}${spread} (return loss ${tenth(returnLossDb)} dB), phase ${phaseDeg.toFixed(0)} deg ` +
    `(${phaseLowDeg.toFixed(0)} to ${phaseHighDeg.toFixed(0)})`
  );
}

function residualWords({ name, returnLoss, insertionLoss }: FeedReport["residuals"][number]): string {
  const figures = [
    ...(returnLoss === undefined ? [] : [`match ${tenth(returnLoss)}`]),
    ...(insertionLoss === undefined ? [] : [`loss ${tenth(insertionLoss)}`]),
  ];
  return `${name} ${figures.join(", ")}`;
}

function adviceLines(advice: readonly FurtherReading[]): string[] {
  const [best] = advice;
  if (best === undefined) return [];
  const foretold = listed(best.returnLossDb.map((db) => `${tenth(db)} dB`));
  const what =
    best.change === "gap"
      ? `the same sheet ${hundredth(best.gapMm)} mm from the mouth`
      : best.change === "thickness"
        ? `a sheet of ${hundredth(best.thicknessMm)} mm`
        : `${Number(best.frequencyGHz.toFixed(4))} GHz`;
  const force = best.decides
    ? "would tell them apart"
    : "tells them apart best, but not by more than a return loss is uncertain";
  return [paragraph(`${what} ${force}: return loss ${foretold}, in the order above`, "  - next: ")];
}

function sheetText({ name, thicknessMm, byFeed }: SheetReport, report: InferReport, paint: Paint): string {
  const several = byFeed.length > 1;
  return byFeed
    .map((one) => {
      const by = several ? `, if the feed's phase is ${one.feedPhaseDeg!.toFixed(0)} deg` : "";
      const heading = `${name}, ${Number(thicknessMm.toPrecision(4))} mm${by}: ${sheetAnswer(one)}`;
      const { solutions, advice } = one.result;
      return [
        paint(one.result.outcome === "decided" && !several ? "good" : "doubtful", paragraph(heading)),
        ...(solutions.length > 1
          ? solutions.map((solution) => paragraph(solutionWords(solution), "  - "))
          : []),
        ...adviceLines(advice),
        ...(report.phaseFrom === "nowhere" && one.result.outcome === "undetermined"
          ? [paragraph("known sheets before the same feed give its phase, and that a figure", "  - next: ")]
          : []),
      ].join("\n");
    })
    .join("\n");
}

function sheetAnswer({ result }: SheetByFeed): string {
  const { outcome, solutions, permittivityIntervals, heatDb } = result;
  switch (outcome) {
    case "decided":
      return solutionWords(solutions[0]!);
    case "ambiguous":
      return `the readings cannot decide between ${solutions.length} solutions:`;
    case "undetermined":
      return (
        "the feed's phase is not known, so only a range follows: permittivity " +
        permittivityIntervals.map(([low, high]) => `${hundredth(low)} to ${hundredth(high)}`).join(", or ")
      );
    case "contradictory":
      return heatDb !== undefined && heatDb < 0
        ? `contradictory: the loss is ${decibels(-heatDb)} less than the change of match alone costs; read it again`
        : "contradictory: no sheet of this thickness explains these readings";
  }
}

function solutionWords(solution: SheetSolution): string {
  const { permittivity, permittivityLow, permittivityHigh, lossTangent, lossTangentLow, lossTangentHigh } =
    solution;
  const loss = solution.onlyBelow
    ? `loss tangent below ${lossTangentHigh.toFixed(4)}`
    : lossTangentLow === lossTangentHigh
      ? `loss tangent taken as ${lossTangent.toFixed(4)}`
      : `loss tangent ${lossTangent.toFixed(4)} (${lossTangentLow.toFixed(4)} to ${lossTangentHigh.toFixed(4)})`;
  const waves = solution.halfWaves === 0 ? "" : `; ${solution.halfWaves} half waves or more inside`;
  const near = solution.exact ? "" : "; met within the uncertainty only";
  return `permittivity ${hundredth(permittivity)} (${hundredth(permittivityLow)} to ${hundredth(permittivityHigh)}), ${loss}${waves}${near}`;
}

function trustWords({ returnLossStandardDb, lossStandardDb, phaseFrom, sheets }: InferReport): string {
  const phase =
    sheets.length === 0 || phaseFrom === "nowhere"
      ? ""
      : ` The feed's phase is ${phaseFrom === "file" ? "the file's" : "that of the known sheets"}.`;
  return (
    `Ranges are of k = 2, with a standard uncertainty of ${decibels(returnLossStandardDb)} for a return loss and ` +
    `${decibels(lossStandardDb)} for a loss.${phase} Flat sheets straight on, on or near the mouth, that send all they ` +
    "reflect back into the feed."
  );
}
