import type { Cause, Matter } from "../budget/causes.ts";
import type { Scatter } from "../numeric/scatter.ts";

/** What a matter is called, and what a user can do about it; advice is common practice, no source. */
export const matterWords: Readonly<
  Record<Matter, { readonly name: string; readonly many?: true; readonly advice: string }>
> = {
  power: {
    name: "transmitter power",
    advice: "measure it at the feed with a sensor: that leaves 0.25 dB of doubt",
  },
  line: { name: "lines and joints", many: true, advice: "measure them: that leaves 0.1 dB each" },
  gain: {
    name: "antenna gain",
    advice: "compare the dish with another at a known distance, or by sun noise",
  },
  aim: {
    name: "aim",
    advice:
      "set the scale on a beacon or by the shadow that the sun casts: 0.3 to 0.5 deg, where a compass leaves 1 to 5",
  },
  match: { name: "match of the feeds", advice: "sweep the return loss with a bridge that you have checked" },
  cover: { name: "cover, dry", advice: "measure it on the bench (`oilskin readings`), with and without" },
  water: {
    name: "water on the covers",
    advice: "see how drops run off a wetted cover, renew a repellent coat, or take another cover",
  },
  rate: {
    name: "rain rate",
    advice: "read a gauge or the weather radar: a forecast is good to a factor of 1.6, a word to 2",
  },
  extent: { name: "extent of the rain", advice: "see on the weather radar how much of the path lies in it" },
  air: { name: "gas and fog", advice: "state temperature and humidity" },
  place: { name: "place of the stations", advice: "use more characters of the locator, or coordinates" },
  ground: {
    name: "way over the ground",
    advice: "walk the path: trees and ridges decide, not tenths of a dB",
  },
  trees: { name: "trees", many: true, advice: "move a few metres, or raise the dish over them" },
  tilt: { name: "tilted polarization", advice: "level the tripods" },
  noise: { name: "receiver's noise", advice: "measure the noise figure, or the step from ground to sky" },
  sky: { name: "what the antenna sees", advice: "measure the step from ground to sky on the site" },
  operator: {
    name: "threshold of the mode",
    advice: "try it on a known signal, or take a mode that asks for less",
  },
  blunder: { name: "blunder", advice: "run through relays, sideband and power before you blame the path" },
};

/** How a cause scatters, in a few words. */
export function scatterWords({ scatter, unit }: Pick<Cause, "scatter" | "unit">): string {
  return words(scatter, unit);
}

function words(scatter: Scatter, unit: Cause["unit"]): string {
  const figure = (value: number) => {
    const shown = unit === "share" ? 100 * value : value;
    return `${Number(shown.toPrecision(Math.abs(shown) < 10 ? 2 : 3))}`;
  };
  const units = { dB: "dB", dBm: "dBm", K: "K", deg: "deg", share: "%", rate: "mm/h", mm: "mm" }[unit];
  switch (scatter.kind) {
    case "normal":
      if (unit === "share" && scatter.sigma === 1) return "by the cover's own figures";
      return `normal, ${figure(scatter.sigma)} ${unit === "dBm" ? "dB" : units}`; // a difference of levels
    case "lognormal":
      return `log-normal, factor ${Number(scatter.factor.toPrecision(3))}`;
    case "flat":
      return `flat, ${figure(scatter.low)} to ${figure(scatter.high)} ${units}`;
    case "exponential":
      return `exponential, mean ${figure(scatter.mean)} ${units}`;
    case "mixture":
      return scatter.parts
        .map(({ share, value, scatter: own }) => {
          // A normal and a log-normal are told by their width alone; here nothing else says about what.
          const about = own === undefined || own.kind === "normal" || own.kind === "lognormal";
          const what = [
            ...(about ? [`${figure(value)} ${units}`] : []),
            ...(own === undefined ? [] : [words(own, unit)]),
          ];
          return `${Number((100 * share).toPrecision(3))} % ${what.join(", ")}`;
        })
        .join("; ");
  }
}
