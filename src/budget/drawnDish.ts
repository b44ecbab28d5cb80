import { NEPERS_PER_DB } from "../numeric/decibels.ts";
import type { EndName } from "../scenario/types.ts";
import { column, logSpread, type Sketch } from "./causes.ts";
import { type DrawnCover, readingOff } from "./drawnCover.ts";
import { addBent } from "./drawnMouth.ts";
import { atRate } from "./drawnRain.ts";
import type { DrawnWeather } from "./drawnWeather.ts";
import type { DishCoverState, Link } from "./types.ts";

/** A cover over the whole dish in a block of draws; undefined where there is none, or where it is known. */
export interface DrawnDish {
  /** What is drawn costs beyond what a budget takes [dB]. */
  readonly excessDb: Float64Array | undefined;
  /** Shares of the power as the budget has them, and what of the former is left in a draw. */
  readonly nominal: DishCoverState;
  readonly passed: Float64Array | undefined;
}

/** Heat, water, permittivity and thickness of a cover over the dish: of the same make as the covers of feeds, so of the same chance. */
export function drawnDish(
  sketch: Sketch,
  link: Link,
  feeds: Readonly<Record<EndName, string>>,
  end: EndName,
  { name, rain }: DrawnWeather,
  drawn: DrawnCover,
): DrawnDish {
  const stateIn = (there: Link) => there.ends[end][feeds[end]]!.dishCover[name]!;
  const nominal = stateIn(link);
  if (nominal.entries.length === 0) return { excessDb: undefined, nominal, passed: undefined };
  const lossOf = (state: DishCoverState, part: string) => {
    const entry = state.entries.find(({ id }) => id.endsWith(part));
    return { db: -(entry?.db ?? 0), sigma: entry?.sigma ?? 0 };
  };
  const heat = lossOf(nominal, ".dish_cover_heat");
  const { measured } = link.scenario.covers[link.scenario[end].dishCover!]!;
  const readOff = measured && readingOff(sketch, drawn.reading, heat.sigma, measured.insertionLossDb);
  const waterDb = lossOf(nominal, "_water").db;
  const nodes = rain?.grid.links ?? [link];
  const water = atRate(
    sketch,
    rain,
    nodes.map((there) => lossOf(stateIn(there), "_water").db),
  );
  // A dish cover's own heat may scatter by another share than that of covers before a feed: by its entry's sigma.
  const heatSpread = heat.db > 0 ? logSpread(heat.sigma / heat.db) : 0;
  const excessDb = column(sketch, (out) => {
    if (readOff) out.set(readOff);
    else for (let i = 0; i < out.length; i++) out[i] = heat.db * (Math.exp(heatSpread * drawn.heat[i]!) - 1);
    for (let i = 0; i < out.length; i++) out[i]! += drawn.waterTimes[i]! * water[i]! - waterDb;
  });
  if (nominal.stack !== undefined) {
    const { low, high } = nominal.stack;
    addBent(sketch, excessDb, nominal.stackIsSigma ? drawn.stackNormal : drawn.stackFlat, low, high);
  }
  return {
    excessDb,
    nominal,
    passed: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) {
        out[i] = Math.min(
          nominal.passed + nominal.heated,
          nominal.passed * Math.exp(-NEPERS_PER_DB * excessDb[i]!),
        );
      }
    }),
  };
}
