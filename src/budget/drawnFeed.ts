import { NEPERS_PER_DB } from "../numeric/decibels.ts";
import type { EndName } from "../scenario/types.ts";
import {
  type Cause,
  column,
  PREFIX,
  type Sketch,
  STILL,
  tiedUniforms,
  uniformsOf,
  valuesOf,
} from "./causes.ts";
import { isStated } from "./drawnLevels.ts";
import type { Link } from "./types.ts";

/** Match of the bare feed in a block of draws. */
export interface DrawnFeed {
  readonly mismatchDb: Float64Array;
  /** Reflection over that of the scenario. */
  readonly gammaRatio: Float64Array;
  readonly cosine: Float64Array;
}

/**
 * Return loss of a feed, and the phase between it and whatever cover it has.
 *
 * @param beats  whether that phase does anything under any cover of the study
 */
export function drawnFeed(
  sketch: Sketch,
  { scenario, doubts }: Link,
  feeds: Readonly<Record<EndName, string>>,
  end: EndName,
  beats: boolean,
): DrawnFeed {
  const cause = (of: EndName): Cause => {
    const { returnLossSpread: stated } = scenario.feeds[feeds[of]]!;
    const sigma = stated?.sigma ?? doubts.feedReturnLossDb;
    const scatter = stated?.scatter ?? ({ kind: "normal", sigma } as const);
    return {
      id: `${PREFIX[of]}.return_loss`,
      matter: "match",
      end: of,
      label: "return loss of the feed",
      scatter,
      unit: "dB",
      stated: isStated(stated) || scenario.spread?.feedReturnLossDb !== undefined,
      still: STILL,
    };
  };
  const { returnLossDb } = scenario.feeds[feeds[end]]!;
  const own = uniformsOf(sketch, cause(end));
  const uniforms =
    end === "transmitter"
      ? own
      : tiedUniforms(sketch, uniformsOf(sketch, cause("transmitter")), own, doubts.correlation.returnLoss);
  const phase: Cause = {
    id: `${PREFIX[end]}.phase`,
    matter: "cover",
    end,
    label: "phase between feed and cover",
    scatter: { kind: "flat", low: 0, high: 360 },
    unit: "deg",
    stated: false,
    still: 0.25, // where the phase adds next to nothing
  };
  const phases = beats ? uniformsOf(sketch, phase) : new Float64Array(sketch.block);
  const values = valuesOf(sketch, returnLossDb, cause(end).scatter, uniforms);
  const gammaRatio = column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      out[i] = Math.exp((NEPERS_PER_DB / 2) * (returnLossDb - Math.max(LEAST_RETURN_LOSS_DB, values[i]!)));
    }
  });
  const gamma2 = Math.exp(-NEPERS_PER_DB * returnLossDb);
  return {
    gammaRatio,
    mismatchDb: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++)
        out[i] = -Math.log(1 - gamma2 * gammaRatio[i]! ** 2) / NEPERS_PER_DB;
    }),
    cosine: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) out[i] = Math.cos(2 * Math.PI * phases[i]!);
    }),
  };
}

/** As the schema has it: below, next to nothing enters the feed at all [dB]. */
const LEAST_RETURN_LOSS_DB = 0.1;
