import type { EndName } from "../scenario/types.ts";
import {
  type Cause,
  logSpread,
  normalsOf,
  PREFIX,
  type Sketch,
  tied,
  tiedUniforms,
  uniformsOf,
} from "./causes.ts";
import type { Link, Mouth } from "./types.ts";

/** What scatters about the covers of an end, in a block of draws. */
export interface DrawnCover {
  /** Place in the spread of permittivity and thickness, as a probability. */
  readonly stack: Float64Array;
  /** Standard normal deviates. */
  readonly heat: Float64Array;
  readonly planeWave: Float64Array;
  readonly reading: Float64Array;
  readonly water: Float64Array;
}

/**
 * Causes of an end's covers; what no cover of the study has is not drawn.
 *
 * @param mouths  all mouths of the end that the study looks at
 * @param twin    the other end's, where sheets of one batch hang together; water does in any case
 */
export function drawnCover(
  sketch: Sketch,
  { doubts, scenario: { spread } }: Link,
  end: EndName,
  mouths: readonly Mouth[],
  other: DrawnCover | undefined,
  oneBatch: boolean,
): DrawnCover {
  const { correlation, coverLossShare, waterShare } = doubts;
  const none = new Float64Array(sketch.block);
  const causeOf = (part: string, label: string, share: number | undefined, stated: boolean): Cause => ({
    id: `${PREFIX[end]}.${part}`,
    matter: part === "water" ? "water" : "cover",
    end,
    label,
    scatter:
      share === undefined
        ? { kind: "normal", sigma: 1 }
        : { kind: "lognormal", factor: Math.exp(logSpread(share)) },
    unit: "share",
    stated,
    still: 0.5,
  });
  const normals = (
    part: "heat" | "planeWave" | "reading" | "water",
    has: (mouth: Mouth["parts"]) => boolean,
    cause: Cause,
  ) => {
    if (!mouths.some(({ parts }) => has(parts))) return none;
    const own = normalsOf(sketch, cause);
    const tie = part === "water" ? correlation.water : oneBatch ? correlation.cover : 0;
    return other === undefined || tie === 0 ? own : tied(sketch, other[part], own, tie);
  };
  const hasStack = mouths.some(({ parts: { scatter } }) => scatter.stack !== undefined);
  return {
    stack: hasStack ? stackOf() : new Float64Array(sketch.block).fill(0.5),
    heat: normals(
      "heat",
      ({ coverHeatDb, scatter }) => coverHeatDb > 0 && scatter.heatShare > 0,
      causeOf("cover_heat", "heat in the cover", coverLossShare, spread?.coverLossShare !== undefined),
    ),
    planeWave: normals(
      "planeWave",
      ({ scatter }) => scatter.planeWaveDb > 0,
      causeOf("plane_wave", "sheet before a small mouth", undefined, false),
    ),
    reading: normals(
      "reading",
      ({ scatter }) => scatter.readingDb > 0,
      causeOf("cover_reading", "reading of the cover", undefined, false),
    ),
    water: normals(
      "water",
      ({ waterMismatchDb, waterHeatDb }) => waterMismatchDb !== 0 || waterHeatDb !== 0,
      causeOf("water", "water on the cover", waterShare, spread?.waterShare !== undefined),
    ),
  };

  function stackOf(): Float64Array {
    const own = uniformsOf(sketch, causeOf("cover_stack", "permittivity and thickness", undefined, false));
    return other === undefined || !oneBatch ? own : tiedUniforms(sketch, other.stack, own, correlation.cover);
  }
}
