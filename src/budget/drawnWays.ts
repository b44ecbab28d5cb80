import { type Cause, column, normalsOf, type Sketch } from "./causes.ts";
import type { EndsInUse } from "./drawnLevels.ts";
import { atRate, type DrawnRain } from "./drawnRain.ts";
import { mechanismsOf } from "./mechanisms.ts";
import type { Link, Mechanism } from "./types.ts";

/** What a way costs that is not there at this rate of rain: finite, so that it can be interpolated [dB]. */
const CLOSED_DB = 400;

/**
 * What the best of the ways over the ground costs in each draw, against the budget's best [dB]; undefined on a plain
 * line of sight, of which nothing is drawn. Each way scatters by itself, so that one draw may be carried by a way
 * that is second best on the whole; rain scatter follows the drawn rate.
 */
export function wayLevel(
  sketch: Sketch,
  link: Link,
  ends: EndsInUse,
  name: string,
  rain: DrawnRain | undefined,
): Float64Array | undefined {
  const { transmitter, receiver } = ends;
  const ways = mechanismsOf(link, link.weathers[name]!, transmitter, receiver);
  const best = ways[0]!;
  if (best.name === "line_of_sight") return undefined;
  const drawn = ways.map((way) => {
    const atNodes =
      way.name === "rain_scatter" && rain !== undefined ? scatterByRate(ends, name, rain) : [way.excessDb];
    const excess = atRate(sketch, atNodes.length > 1 ? rain : undefined, atNodes);
    const { sigmaDb } = way;
    const normals = sigmaDb > 0 ? normalsOf(sketch, wayCause(way, link)) : new Float64Array(sketch.block);
    return { sigmaDb, leastDb: leastOf(way), normals, excess };
  });
  return column(sketch, (out) => {
    out.fill(CLOSED_DB);
    for (const { sigmaDb, leastDb, normals, excess } of drawn) {
      for (let i = 0; i < out.length; i++) {
        out[i] = Math.min(out[i]!, Math.max(leastDb, excess[i]! + sigmaDb * normals[i]!));
      }
    }
    for (let i = 0; i < out.length; i++) out[i] = best.excessDb - out[i]!;
  });
}

/** An obstacle brings no gain; what scatters may do better than free space only on paper, and is left to. */
function leastOf({ name }: Mechanism): number {
  return name === "diffraction" ? 0 : Number.NEGATIVE_INFINITY;
}

function wayCause({ name, label, sigmaDb }: Mechanism, { scenario: { spread = {} } }: Link): Cause {
  const { diffractionDb, troposcatterDb, rainScatterDb } = spread;
  const stated = { diffraction: diffractionDb, troposcatter: troposcatterDb, rain_scatter: rainScatterDb };
  return {
    id: `path.${name}`,
    matter: "ground",
    end: undefined,
    label,
    scatter: { kind: "normal", sigma: sigmaDb },
    unit: "dB",
    stated: name !== "line_of_sight" && stated[name] !== undefined,
    still: 0.5,
  };
}

/** Excess of rain scatter at the nodes of the rate [dB]. */
function scatterByRate({ transmitter, receiver }: EndsInUse, name: string, { grid }: DrawnRain): number[] {
  return grid.links.map((link) => {
    const ways = mechanismsOf(link, link.weathers[name]!, transmitter, receiver);
    return ways.find((way) => way.name === "rain_scatter")?.excessDb ?? CLOSED_DB;
  });
}
