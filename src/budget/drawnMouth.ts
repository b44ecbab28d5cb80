import { column, logSpread, type Sketch } from "./causes.ts";
import { type DrawnCover, readingOff } from "./drawnCover.ts";
import type { DrawnFeed } from "./drawnFeed.ts";
import { atRate, type DrawnRain } from "./drawnRain.ts";
import type { Mouth } from "./types.ts";

/** A beat nearer to 1 would cost without end in the worst phase; no feed and sheet reflect that much. */
const MOST_BEAT = 0.99;

/** One feed's mouth under one cover in one weather, in a block of draws. */
export interface DrawnMouth {
  /** Mismatch but for what the phase adds, and what heats cover and water [dB]. */
  readonly mismatchDb: Float64Array;
  readonly heatDb: Float64Array;
  /** |1 - x e^(j psi)|^2: what the phase adds to the mismatch, as a power ratio; of a known one, beside its nominal. */
  readonly beat: Float64Array;
  readonly nominal: { readonly mismatchDb: number; readonly heatDb: number };
}

/**
 * A mouth's draws: the bare feed's mismatch, the cover's by its place in the spread of its materials, its heat, the
 * water on it by the drawn rate and by the doubt of its model.
 *
 * @param nodes  the mouth at the nodes of the rain's grid; without one, the mouth alone
 */
export function drawnMouth(
  sketch: Sketch,
  feed: DrawnFeed,
  drawn: DrawnCover,
  nodes: readonly Mouth[],
  rain: DrawnRain | undefined,
): DrawnMouth {
  const mouth = nodes[rain?.grid.middle ?? 0]!;
  const { coverMismatchDb, coverHeatDb, beat: nominalBeat, scatter } = mouth.parts;
  const { stackIsSigma, planeWaveDb, readingDb } = scatter;
  const heatSpread = logSpread(scatter.heatShare);
  const heatIsDrawn = coverHeatDb > 0 && scatter.heatShare > 0;
  const readOff = readingDb > 0 ? readingOff(sketch, drawn.reading, readingDb, scatter.reading) : undefined;
  const mismatchDb = column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      out[i] = feed.mismatchDb[i]! + coverMismatchDb + planeWaveDb * drawn.planeWave[i]!;
    }
    if (readOff !== undefined) for (let i = 0; i < out.length; i++) out[i]! += readOff[i]!;
  });
  const heatDb = column(sketch, (out) => {
    if (!heatIsDrawn) out.fill(coverHeatDb);
    else if (scatter.heatShare === drawn.heatShare)
      for (let i = 0; i < out.length; i++) out[i] = coverHeatDb * drawn.heatTimes[i]!;
    else for (let i = 0; i < out.length; i++) out[i] = coverHeatDb * Math.exp(heatSpread * drawn.heat[i]!);
  });
  if (scatter.stack !== undefined) {
    const [low, high] = [scatter.stack("low"), scatter.stack("high")];
    const places = stackIsSigma ? drawn.stackNormal : drawn.stackFlat;
    addBent(sketch, mismatchDb, places, low.mismatchDb, high.mismatchDb);
    addBent(sketch, heatDb, places, low.heatDb, high.heatDb);
  }
  addWater(
    sketch,
    mismatchDb,
    drawn.waterTimes,
    rain,
    nodes.map(({ parts }) => parts.waterMismatchDb),
  );
  addWater(
    sketch,
    heatDb,
    drawn.waterTimes,
    rain,
    nodes.map(({ parts }) => parts.waterHeatDb),
  );
  const { beat: tunedBeat = 0, cosine = 1 } = mouth.parts.tuned ?? {};
  const beat = column(sketch, (out) => {
    if (nominalBeat === 0 && tunedBeat === 0) out.fill(1);
    else if (nominalBeat === 0) {
      const held = 1 + tunedBeat * (tunedBeat - 2 * cosine);
      for (let i = 0; i < out.length; i++) {
        const x = Math.min(MOST_BEAT, tunedBeat * feed.gammaRatio[i]!);
        out[i] = (1 + x * (x - 2 * cosine)) / held;
      }
    } else {
      for (let i = 0; i < out.length; i++) {
        const x = Math.min(MOST_BEAT, nominalBeat * feed.gammaRatio[i]!);
        out[i] = 1 + x * (x - 2 * feed.cosine[i]!);
      }
    }
  });
  return {
    mismatchDb,
    heatDb,
    beat,
    nominal: { mismatchDb: mouth.mismatchLossDb, heatDb: mouth.dissipationDb },
  };
}

/** Adds a line that bends at nought: so much a unit below, so much above. */
export function addBent(
  sketch: Sketch,
  to: Float64Array,
  places: Float64Array,
  low: number,
  high: number,
): void {
  sketch.steps.push(() => {
    for (let i = 0; i < to.length; i++)
      to[i]! += Math.max(0, -places[i]!) * low + Math.max(0, places[i]!) * high;
  });
}

/** Adds what water costs at the drawn rate, times what its model is off by. */
function addWater(
  sketch: Sketch,
  to: Float64Array,
  times: Float64Array,
  rain: DrawnRain | undefined,
  atNodes: readonly number[],
): void {
  if (atNodes.every((db) => db === 0)) return;
  const water = atRate(sketch, rain, atNodes);
  sketch.steps.push(() => {
    for (let i = 0; i < to.length; i++) to[i]! += times[i]! * water[i]!;
  });
}
