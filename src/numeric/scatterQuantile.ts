import { normalDeviate } from "./normalDeviate.ts";
import type { Scatter } from "./scatter.ts";

/** Value of an input at a probability inside (0, 1). */
export type Quantile = (probability: number) => number;

/**
 * What an input is at a probability, by the way in which it scatters.
 *
 * Source: inverse distribution functions, as in any text on statistics; the parts of a mixture follow each other, so
 *         that its quantile does not rise throughout, which a draw need not mind
 *
 * @param value    value about which a normal, or median about which a log-normal scatters
 * @param scatter  as `momentsOf` takes it
 */
export function scatterQuantile(value: number, scatter: Scatter): Quantile {
  switch (scatter.kind) {
    case "normal":
      return (p) => value + scatter.sigma * normalDeviate(p);
    case "lognormal": {
      const spread = Math.log(scatter.factor);
      return (p) => value * Math.exp(spread * normalDeviate(p));
    }
    case "flat":
      return (p) => scatter.low + (scatter.high - scatter.low) * p;
    case "exponential":
      return (p) => -scatter.mean * Math.log(1 - p);
    case "mixture": {
      const parts = scatter.parts.map(({ share, value: centre, scatter: own }) => ({
        share,
        quantile: own === undefined ? () => centre : scatterQuantile(centre, own),
      }));
      return (p) => {
        let below = 0;
        for (const { share, quantile } of parts) {
          // The last part takes what rounding of the shares leaves.
          if (p < below + share) return quantile((p - below) / share);
          below += share;
        }
        return parts.at(-1)!.quantile(p);
      };
    }
  }
}
