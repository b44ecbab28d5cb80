import type { EndName, Scenario } from "../scenario/types.ts";
import { type Cause, column, type Sketch, STILL, tiedUniforms, uniformsOf } from "./causes.ts";
import type { Doubts } from "./doubts.ts";
import type { PreparedEnd } from "./types.ts";

/**
 * What draws of each dish's aim add to the level, against the mean that a budget takes [dB].
 *
 *     loss = 12 ((o + x)^2 + y^2)/b^2,  x and y normal with deviation s about a standing offset o
 *
 * One random number gives the radius of (x, y), which without an offset is all that counts and makes the loss
 * exponential; with one a second number gives the side.
 *
 * Source: as `antenna/pointing.ts`; Box & Muller, Ann. Math. Statist. 29, 610-611, 1958
 */
export function aimLevels(
  sketch: Sketch,
  scenario: Scenario,
  ends: Readonly<Record<EndName, PreparedEnd>>,
  { correlation }: Doubts,
): Float64Array[] {
  const levels: Float64Array[] = [];
  let before: Float64Array | undefined;
  for (const end of ["transmitter", "receiver"] as const) {
    const { dish: name } = scenario[end];
    const { beamwidthDeg, antenna } = ends[end];
    const entry = antenna.find(({ id }) => id.endsWith(".pointing"));
    if (name === undefined || beamwidthDeg === undefined || entry === undefined || entry.sigma === 0)
      continue;
    const error = scenario.dish[name]!.pointingErrorDeg / beamwidthDeg;
    const offset = scenario.dish[name]!.pointingOffsetDeg / beamwidthDeg;
    const mean = 24 * error * error;
    const scatter = { kind: "exponential", mean } as const;
    const cause: Cause = {
      id: entry.id,
      matter: "aim",
      end,
      label: "aim",
      scatter,
      unit: "dB",
      stated: true,
      still: STILL,
    };
    const own = uniformsOf(sketch, cause);
    const radius = before === undefined ? own : tiedUniforms(sketch, before, own, correlation.aim);
    before ??= own;
    levels.push(offset === 0 ? straight(sketch, radius, mean) : aside(sketch, cause, radius, error, offset));
  }
  return levels;
}

function straight(sketch: Sketch, radius: Float64Array, mean: number): Float64Array {
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      out[i] = radius[i] === STILL ? 0 : mean * (1 + Math.log(1 - radius[i]!));
    }
  });
}

function aside(
  sketch: Sketch,
  aim: Cause,
  radius: Float64Array,
  error: number,
  offset: number,
): Float64Array {
  const side = uniformsOf(sketch, {
    ...aim,
    id: `${aim.id}_side`,
    label: "side of the aim",
    scatter: { kind: "flat", low: 0, high: 360 },
    unit: "deg",
    still: 0.25,
  });
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) {
      const far = error * Math.sqrt(radius[i] === STILL ? 2 : -2 * Math.log(1 - radius[i]!));
      const square = far * far + 2 * offset * far * Math.cos(2 * Math.PI * side[i]!);
      out[i] = 12 * (2 * error * error - square);
    }
  });
}
