import type { Link, Warning } from "../budget/types.ts";
import { cautions } from "../safety/cautions.ts";
import type { LinkExposure } from "../study/exposureOfLink.ts";
import { metres, type Paint, paragraph } from "./words.ts";

/** The doubts, one a paragraph. */
export function warningText(warnings: readonly Warning[], paint: Paint): string {
  if (warnings.length === 0) return "";
  const lines = warnings.map(({ where, message }) => paragraph(`${where}: ${message}`, "  - "));
  return [paint("strong", "Warnings"), ...lines].join("\n");
}

/** What no figure of the report holds, so that silence is not taken for nothing. */
export function leftOutText({ scenario, ground }: Link): string {
  const left = [
    ...(ground === undefined
      ? [
          "hills, trees and buildings in the way",
          "troposcatter, ducting, aircraft and rain scatter, which can carry a path that this report fails",
        ]
      : [
          ...(ground.fromTerrain ? [] : ["hills, trees and buildings in the way"]),
          "ducting (`oilskin path` shows the lift) and aircraft scatter, which can carry a path that this report fails",
        ]),
    "multipath fading",
    "crossed or tilted polarization",
    "a transmitter or receiver off frequency",
    ...(Object.values(scenario.weather).some(({ rainMmPerH }) => rainMmPerH.value > 0)
      ? ["water inside a bare feed or on the dish, and the long-term statistics of rain"]
      : []),
  ];
  return paragraph(`Not in these figures: ${left.join("; ")}.`);
}

/** The hazards of every transmitting station, and the sentence of each that a margin report repeats. */
const brief = ["radio-frequency exposure", "masts and height", "lightning"].map((hazard) => {
  const { sentences } = cautions.find((caution) => caution.hazard === hazard)!;
  return sentences.slice(...(hazard === "radio-frequency exposure" ? [1, 4] : [0, 2])).join(" ");
});

/** For those who go up to an antenna or put it up. */
export function heightCautions(paint: Paint): string {
  const sentences = ["masts and height", "power lines and supplies", "lightning"].map((hazard) =>
    cautions
      .find((caution) => caution.hazard === hazard)!
      .sentences.slice(0, hazard === "power lines and supplies" ? 1 : 2)
      .join(" "),
  );
  return [paint("strong", "Caution"), ...sentences.map((text) => paragraph(text, "  - "))].join("\n");
}

/** The usual cautions, for whoever goes to the antennas. */
export function cautionLines(): string {
  return brief.map((sentence) => paragraph(sentence, "  - ")).join("\n");
}

/** Where published exposure limits are exceeded, and the usual cautions. */
export function safetyText(found: LinkExposure, paint: Paint): string {
  const audience = (who: "public" | "occupational") => {
    const limits = found.limits.filter((limit) => limit.audience === who);
    const strictest = limits.reduce((a, b) => (b.distanceM > a.distanceM ? b : a), limits[0]!);
    return limits.length === 0 ? undefined : strictest;
  };
  const forAll = audience("public");
  const power =
    found.powerW >= 0.1
      ? `${Number(found.powerW.toPrecision(2))} W`
      : `${Number((1000 * found.powerW).toPrecision(2))} mW`;
  const distance =
    forAll === undefined
      ? "No published limit is at hand for this frequency."
      : forAll.distanceM > 0
        ? `With ${power} at the antenna the strictest public limit known here (${forAll.name}, ` +
          `${Number(forAll.limitWPerM2.toPrecision(3))} W/m2) may be exceeded on the axis out to about ${metres(forAll.distanceM)}.`
        : `With ${power} at the antenna no public limit known here is reached on the axis in front of the dish ` +
          "by the published estimates; at the feed itself it can be.";
  return [
    paint("strong", "Caution"),
    paragraph(`${distance} An estimate for carrier all the time; local exposure rules decide.`, "  - "),
    cautionLines(),
  ].join("\n");
}

/** What to mind before going to a feed with a cover in hand. */
export function handsOnText(paint: Paint): string {
  const sentences = cautions
    .flatMap((caution) => caution.sentences)
    .filter((sentence) =>
      /^(Switch the transmitter off|Never look into a feed|Keep off masts)/.test(sentence),
    );
  return [paint("strong", "Caution"), ...sentences.map((sentence) => paragraph(sentence, "  - "))].join("\n");
}
