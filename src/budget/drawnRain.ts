import { type Cause, column, normalsOf, type Sketch, STILL, uniformsOf, valuesOf } from "./causes.ts";
import { isStated } from "./drawnLevels.ts";
import { type RainGrid, rainGrid } from "./rainGrid.ts";
import type { Link } from "./types.ts";

/** Rain rates of the grid's nodes, and where between them each draw lies. */
export interface DrawnRain {
  readonly grid: RainGrid;
  readonly node: Int32Array;
  readonly share: Float64Array;
}

/** Where the drawn rates or films of dew lie among the grid's nodes; one random number makes it rain alike in all weathers. */
export function drawnRain(sketch: Sketch, link: Link, name: string): DrawnRain | undefined {
  const grid = rainGrid(link, name);
  if (grid === undefined) return undefined;
  const { rainMmPerH } = link.scenario.weather[name]!;
  const common = { end: undefined, scatter: grid.scatter, still: STILL };
  const cause: Cause =
    grid.of === "dew"
      ? {
          ...common,
          id: "dew",
          matter: "water",
          label: `dew on the covers, ${name}`,
          unit: "mm",
          stated: true,
        }
      : {
          ...common,
          id: "rain.rate",
          matter: "rate",
          label: isStated(rainMmPerH) ? `rain rate, ${name}` : "rain rate",
          unit: "rate",
          stated: isStated(rainMmPerH) || link.scenario.spread?.rainRateFactor !== undefined,
        };
  const rates = valuesOf(sketch, grid.nominal, grid.scatter, uniformsOf(sketch, cause));
  const { stepLog, least, middle, links } = grid;
  const last = links.length - 1;
  const leastRatio = Math.exp((least - middle) * stepLog);
  const node = new Int32Array(sketch.block);
  const share = new Float64Array(sketch.block);
  sketch.steps.push(() => {
    for (let i = 0; i < node.length; i++) {
      const ratio = rates[i]! / grid.nominal;
      const place =
        ratio > leastRatio
          ? Math.min(last, least + Math.log(ratio / leastRatio) / stepLog)
          : least * Math.max(0, ratio / leastRatio); // between none and the least rate in proportion
      const lower = Math.min(last - 1, Math.floor(place));
      node[i] = lower;
      share[i] = place - lower;
    }
  });
  return { grid, node, share };
}

/** Rain on the path [dB]: by its rate, whose loss is nearly a power of it, and by the length of path in it. */
export function rainLossOf(
  sketch: Sketch,
  link: Link,
  name: string,
  rain: DrawnRain | undefined,
): Float64Array {
  const { rainLengthShare } = link.doubts;
  const atNodes = rain?.grid.links ?? [link];
  const logsAtNodes = atNodes.map(({ weathers }) => Math.log(Math.max(1e-12, weathers[name]!.rainLossDb)));
  const lengths = normalsOf(sketch, {
    id: "rain.length",
    matter: "extent",
    end: undefined,
    label: "length of path in the rain",
    scatter: { kind: "normal", sigma: rainLengthShare },
    unit: "share",
    stated: link.scenario.spread?.rainLengthShare !== undefined,
    still: 0.5,
  });
  const logs = atRate(sketch, rain, logsAtNodes);
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      out[i] = Math.exp(logs[i]!) * Math.max(0, 1 + rainLengthShare * lengths[i]!);
    }
  });
}

/** A figure at the drawn rates, on straight lines between its values at the nodes of the rate; one value without any. */
export function atRate(
  sketch: Sketch,
  rain: DrawnRain | undefined,
  atNodes: readonly number[],
): Float64Array {
  const values = Float64Array.from(atNodes);
  return column(sketch, (out) => {
    if (rain === undefined) out.fill(values[0]!);
    else {
      const { node, share } = rain;
      for (let i = 0; i < out.length; i++) {
        const lower = values[node[i]!]!;
        out[i] = lower + share[i]! * (values[node[i]! + 1]! - lower);
      }
    }
  });
}
