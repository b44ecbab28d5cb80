import type { Reach } from "../study/reach.ts";
import type { ThicknessStudy } from "../study/thickness.ts";
import { cell, columns, RULE } from "./columns.ts";
import { millimetres, returnLoss } from "./thicknessWords.ts";
import { hundredth, type Paint, paragraph } from "./words.ts";

/** Two sheets like the cover, and the gap at which they cancel. */
export function pairText({ pair, layers, layer }: ThicknessStudy, paint: Paint): string {
  const own = layers[layer]!;
  const title = paint("strong", `Two such sheets (${millimetres(own.thicknessMm)} of ${own.material} each)`);
  if (pair === undefined)
    return `${title}\n${paragraph("one reflects nothing: there is nothing to cancel", "  ")}`;
  const twenty =
    pair.twentyDbBandGHz === undefined
      ? "Their return loss does not reach 20 dB."
      : `Their return loss stays above 20 dB ${bandWords(pair.twentyDbBandGHz)}.`;
  return [
    title,
    paragraph(
      `A gap of ${millimetres(pair.gapMm)} cancels: return loss ${returnLoss(pair.returnLossDb)} dB, of one ` +
        `sheet ${returnLoss(pair.singleReturnLossDb)} dB. They reflect less than one ${bandWords(pair.betterBandGHz)}. ` +
        `${twenty} It repeats every ${millimetres(pair.periodMm)}, over narrower bands. The worst gap, ` +
        `${millimetres(pair.worstGapMm)}, leaves ${returnLoss(pair.worstReturnLossDb)} dB.`,
      "  ",
    ),
  ].join("\n");
}

/** The gap between feed and sheet: the best ones, or what lies within half a wave. */
export function gapText({ feedGaps, layers, layer, frequencyGHz }: ThicknessStudy, paint: Paint): string {
  const { phaseKnown, periodMm, gaps } = feedGaps;
  const title = paint("strong", `Gap between feed and sheet (${millimetres(layers[layer]!.thicknessMm)})`);
  const where = (from: number, to: number) =>
    phaseKnown ? hundredth(from) : `${hundredth(from)} to ${hundredth(to)}`;
  const heads = phaseKnown
    ? ["mm", "collected", "cost dB", "RL dB", "better than bare, GHz"]
    : ["mm", "collected", "best cost dB", "worst", "best RL dB", "worst"];
  const table = columns([
    heads.map((head) => cell(head)),
    RULE,
    ...gaps.map((gap) => {
      const { insertionLossDb: cost, returnLossDb: match, betterBandGHz } = gap;
      const figures = phaseKnown
        ? [hundredth(cost.nominal), returnLoss(match.nominal), betweenGHz(betterBandGHz!)]
        : [hundredth(cost.low), hundredth(cost.high), returnLoss(match.high), returnLoss(match.low)];
      const share = `${Math.round(100 * gap.collectedShare)} %`;
      return [where(gap.fromMm, gap.toMm), share, ...figures].map((text) => cell(text));
    }),
  ]);
  const words = phaseKnown
    ? `With the feed's phase as given these gaps match it best at ${Number(frequencyGHz.toPrecision(6))} GHz; they ` +
      `repeat every ${millimetres(periodMm)}. Bands: the feed's own reflection taken as the same all over them.`
    : `The best gap lies somewhere within half a wavelength, ${millimetres(periodMm)}, and the worst a quarter ` +
      "wave from it: the return loss of a feed does not tell where. To find it, move the sheet slowly away from the " +
      "mouth while watching the return loss, and stop at its first peak.";
  const collected =
    "collected: what the feed takes in again of the amplitude that the sheet sends back (a rough figure).";
  return [title, table, paragraph(`${words} ${collected}`, "  ")].join("\n");
}

function bandWords(band: Reach): string {
  const { low, high } = band;
  if (low === undefined && high === undefined) return "from half the frequency to half as much again";
  return `from ${betweenGHz(band).replace("...", "below half the frequency")} GHz`;
}

/** `9.88 to 10.95`; dots where the end lies beyond what was searched. */
function betweenGHz({ low, high }: Reach): string {
  return `${low === undefined ? "..." : hundredth(low)} to ${high === undefined ? "..." : hundredth(high)}`;
}
