import type { Scenario, SpreadSettings, Uncertain } from "../scenario/types.ts";

type Correlation = NonNullable<SpreadSettings["correlation"]>;

/** One standard deviation of what no field of a scenario states, or what its `spread` says in their stead. */
export interface Doubts {
  readonly feedReturnLossDb: number;
  /** Of a dry cover's heat, as a share of it. */
  readonly coverLossShare: number;
  /** Of what water adds, as a share of it. */
  readonly waterShare: number;
  readonly rainRateFactor: number;
  /** Of the length of path in the rain, so of its loss. */
  readonly rainLengthShare: number;
  readonly gasShare: number;
  readonly fogShare: number;
  /** Undefined: by what stands in the way. */
  readonly diffractionDb: number | undefined;
  readonly troposcatterDb: number;
  readonly rainScatterDb: number;
  /** Undefined: by the depth of the trees. */
  readonly foliageDb: number | undefined;
  readonly tiltLossDb: Uncertain;
  readonly blunder: { readonly chance: number; readonly lossDb: Uncertain };
  /** Between the two ends. */
  readonly correlation: Readonly<Record<keyof Correlation, number>>;
}

/** Common practice, no source, all of them but the P.530 share, which is from memory; correlations are own estimates. */
const usual: Doubts = {
  feedReturnLossDb: 2, // read with a coupler
  coverLossShare: 0.4, // loss tangents and thicknesses scatter
  waterShare: 0.5, // film or drops, age, wind: a factor of two each way in nine cases of ten
  rainRateFactor: 1.15, // a gauge; a forecast is good to 1.6, a word to 2
  rainLengthShare: 0.25, // error of P.530's path reduction in its own tests, taken for a stated extent too
  gasShare: 0.05, // humidity guesses dominate
  fogShare: 0.5, // liquid water by the visibility
  diffractionDb: undefined,
  troposcatterDb: 7, // season and hour
  rainScatterDb: 5, // the rain in a cell
  foliageDb: undefined,
  tiltLossDb: { value: 0.15, sigma: 0.3 / Math.sqrt(12), scatter: { kind: "flat", low: 0, high: 0.3 } },
  blunder: {
    chance: 0.035, // 2 to 5 %: a relay, the wrong sideband, a dead stage
    lossDb: { value: 15, sigma: 10 / Math.sqrt(12), scatter: { kind: "flat", low: 10, high: 20 } },
  },
  correlation: {
    water: 0.8, // the same rain and the same error of the model, but other wind and other dirt
    cover: 1, // cut from one sheet
    aim: 0,
    gain: 0,
    returnLoss: 0,
    line: 0,
  },
};

/** What a scenario leaves unknown, its own figures in the place of the usual ones. */
export function doubtsOf({ spread = {} }: Pick<Scenario, "spread">): Doubts {
  return {
    ...usual,
    ...statedOf(spread),
    correlation: { ...usual.correlation, ...statedOf(spread.correlation ?? {}) },
  } as Doubts;
}

/** Keys that hold something: an undefined one would hide the usual figure. */
function statedOf(group: object): object {
  return Object.fromEntries(Object.entries(group).filter(([, value]) => value !== undefined));
}
