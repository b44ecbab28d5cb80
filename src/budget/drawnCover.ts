import { normalCdf } from "../numeric/normal.ts";
import { normalDeviates } from "../numeric/normalDeviate.ts";
import type { EndName, Uncertain } from "../scenario/types.ts";
import {
  type Cause,
  column,
  logSpread,
  normalsOf,
  PREFIX,
  type Sketch,
  STILL,
  tied,
  tiedUniforms,
  uniformsOf,
  valuesOf,
} from "./causes.ts";
import type { DishCoverState, Link, Mouth } from "./types.ts";

/** What scatters about the covers of an end, in a block of draws. */
export interface DrawnCover {
  /** Place in the spread of permittivity and thickness, as a probability. */
  readonly stack: Float64Array;
  /** The same as standard normal deviates. */
  readonly stackNormal: Float64Array;
  /** The same as flat numbers from -1 to 1. */
  readonly stackFlat: Float64Array;
  /** What the heat is off by, as a factor, where it scatters by the usual share. */
  readonly heatTimes: Float64Array;
  readonly heatShare: number;
  /** Standard normal deviates. */
  readonly planeWave: Float64Array;
  readonly reading: Float64Array;
  readonly water: Float64Array;
  /** What the model of the water is off by, as a factor. */
  readonly waterTimes: Float64Array;
  readonly heat: Float64Array;
  /** Which of them are drawn at all at this end. */
  readonly parts: ReadonlySet<CoverPart>;
}

type CoverPart = "heat" | "planeWave" | "reading" | "water";

/** How the entries of a dish cover end that take the chance of a part; a reading of it counts as heat. */
const dishEntry: Readonly<Record<CoverPart, string>> = {
  heat: ".dish_cover_heat",
  reading: ".dish_cover_heat",
  water: ".dish_cover_water",
  planeWave: ".none",
};

/** What a reading is off by [dB], from its standard normal deviates: normally, or as the scenario says that it scatters. */
export function readingOff(
  sketch: Sketch,
  deviates: Float64Array,
  sigmaDb: number,
  input: Uncertain | undefined,
): Float64Array {
  const scatter = input?.scatter;
  if (input === undefined || scatter === undefined || scatter.kind === "normal") {
    return column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) out[i] = sigmaDb * deviates[i]!;
    });
  }
  const places = column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) out[i] = deviates[i] === 0 ? STILL : normalCdf(deviates[i]!);
  });
  const values = valuesOf(sketch, input.value, scatter, places);
  return column(sketch, (out) => {
    for (let i = 0; i < out.length; i++) out[i] = values[i]! - input.value;
  });
}

/**
 * Causes of an end's covers; what no cover of the study has is not drawn.
 *
 * @param mouths    all mouths of the end that the study looks at
 * @param over      the states of a cover over its dish, none where there is none
 * @param other     the other end's: the water of both hangs together
 * @param oneBatch  true where the sheets of both ends are one cover of the scenario, so that they do too
 */
export function drawnCover(
  sketch: Sketch,
  { doubts, scenario: { spread } }: Link,
  end: EndName,
  mouths: readonly Mouth[],
  over: readonly DishCoverState[],
  other: DrawnCover | undefined,
  oneBatch: boolean,
): DrawnCover {
  const { correlation, coverLossShare, waterShare } = doubts;
  const none = new Float64Array(sketch.block);
  const parts = new Set<CoverPart>();
  const isOverDish = (part: CoverPart) =>
    over.some(({ entries }) => entries.some(({ id, sigma }) => sigma > 0 && id.endsWith(dishEntry[part])));
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
  const normals = (part: CoverPart, has: (mouth: Mouth["parts"]) => boolean, cause: Cause) => {
    if (!mouths.some((mouth) => has(mouth.parts)) && !isOverDish(part)) return none;
    parts.add(part);
    const own = normalsOf(sketch, cause);
    const tie = part === "water" ? correlation.water : oneBatch ? correlation.cover : 0;
    return other?.parts.has(part) && tie !== 0 ? tied(sketch, other[part], own, tie) : own;
  };
  const hasStack =
    mouths.some(({ parts: { scatter } }) => scatter.stack !== undefined) ||
    over.some((state) => state.stack !== undefined);
  const stack = hasStack ? stackOf() : new Float64Array(sketch.block).fill(0.5);
  const hasSigma =
    mouths.some(({ parts: { scatter } }) => scatter.stackIsSigma) ||
    over.some(({ stackIsSigma }) => stackIsSigma);
  const heat = normals(
    "heat",
    ({ coverHeatDb, scatter }) => coverHeatDb > 0 && scatter.heatShare > 0,
    causeOf("cover_heat", "heat in the cover", coverLossShare, spread?.coverLossShare !== undefined),
  );
  const water = normals(
    "water",
    ({ waterMismatchDb, waterHeatDb }) => waterMismatchDb !== 0 || waterHeatDb !== 0,
    causeOf("water", "water on the cover", waterShare, spread?.waterShare !== undefined),
  );
  return {
    stack,
    stackNormal: hasSigma ? column(sketch, (out) => normalDeviates(stack, out)) : none,
    stackFlat: column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) out[i] = 2 * stack[i]! - 1;
    }),
    heat,
    heatTimes: factors(heat, coverLossShare),
    heatShare: coverLossShare,
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
    water,
    waterTimes: factors(water, waterShare),
    parts,
  };

  function factors(deviates: Float64Array, share: number): Float64Array {
    if (deviates === none) return new Float64Array(sketch.block).fill(1);
    const spread = logSpread(share);
    return column(sketch, (out) => {
      for (let i = 0; i < out.length; i++) out[i] = Math.exp(spread * deviates[i]!);
    });
  }

  function stackOf(): Float64Array {
    const own = uniformsOf(sketch, causeOf("cover_stack", "permittivity and thickness", undefined, false));
    return other === undefined || !oneBatch ? own : tiedUniforms(sketch, other.stack, own, correlation.cover);
  }
}
