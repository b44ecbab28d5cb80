import { normalDeviate } from "../numeric/normalDeviate.ts";
import { logSpread, type Sketch } from "./causes.ts";
import type { Doubts } from "./doubts.ts";
import type { DrawnCover } from "./drawnCover.ts";
import type { DrawnFeed } from "./drawnFeed.ts";
import type { DrawnRain } from "./drawnWeather.ts";
import type { Mouth } from "./types.ts";

/** A beat nearer to 1 would cost without end in the worst phase; no feed and sheet reflect that much. */
const MOST_BEAT = 0.99;

/** One feed's mouth under one cover in one weather, in a block of draws. */
export interface DrawnMouth {
  /** Mismatch but for what the phase adds, and what heats cover and water [dB]. */
  readonly mismatchDb: Float64Array;
  readonly heatDb: Float64Array;
  /** |1 - x e^(j psi)|^2: what the phase adds to the mismatch, as a power ratio. */
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
  doubts: Doubts,
  feed: DrawnFeed,
  drawn: DrawnCover,
  nodes: readonly Mouth[],
  rain: DrawnRain | undefined,
): DrawnMouth {
  const mouth = nodes[(nodes.length - 1) / 2]!;
  const { coverMismatchDb, coverHeatDb, beat: nominalBeat, scatter } = mouth.parts;
  const { stackIsSigma, planeWaveDb, readingDb } = scatter;
  const [low, high] = [scatter.stack?.("low"), scatter.stack?.("high")];
  const waters = nodes.map(({ parts }) => parts);
  const waterMismatch = Float64Array.from(waters, ({ waterMismatchDb }) => waterMismatchDb);
  const waterHeat = Float64Array.from(waters, ({ waterHeatDb }) => waterHeatDb);
  const isWet = waterMismatch.some((db) => db !== 0) || waterHeat.some((db) => db !== 0);
  const heatSpread = logSpread(scatter.heatShare);
  const waterSpread = logSpread(doubts.waterShare);
  const hasHeat = coverHeatDb > 0 && heatSpread > 0;
  const beats = nominalBeat > 0;

  const mismatchDb = new Float64Array(sketch.block);
  const heatDb = new Float64Array(sketch.block);
  const beat = new Float64Array(sketch.block).fill(1);
  sketch.steps.push(() => {
    for (let i = 0; i < mismatchDb.length; i++) {
      let mismatch = feed.mismatchDb[i]! + coverMismatchDb;
      let heat = hasHeat ? coverHeatDb * Math.exp(heatSpread * drawn.heat[i]!) : coverHeatDb;
      if (low !== undefined && high !== undefined) {
        const place = stackIsSigma ? normalDeviate(drawn.stack[i]!) : 2 * drawn.stack[i]! - 1;
        const shift = place < 0 ? low : high;
        mismatch += Math.abs(place) * shift.mismatchDb;
        heat += Math.abs(place) * shift.heatDb;
      }
      mismatch += planeWaveDb * drawn.planeWave[i]! + readingDb * drawn.reading[i]!;
      if (isWet) {
        const node = rain === undefined ? 0 : rain.node[i]!;
        const share = rain === undefined ? 0 : rain.share[i]!;
        const times = Math.exp(waterSpread * drawn.water[i]!);
        mismatch += times * between(waterMismatch, node, share);
        heat += times * between(waterHeat, node, share);
      }
      mismatchDb[i] = mismatch;
      heatDb[i] = heat;
      if (beats) {
        const x = Math.min(MOST_BEAT, nominalBeat * feed.gammaRatio[i]!);
        beat[i] = 1 + x * (x - 2 * feed.cosine[i]!);
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

function between(values: Float64Array, node: number, share: number): number {
  const lower = values[node]!;
  return share === 0 ? lower : lower + share * (values[node + 1]! - lower);
}
