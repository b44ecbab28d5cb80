import { type Bounded, exactly } from "./bounded.ts";
import type { Wetting } from "./materials.ts";

/** How a surface has been kept. */
export type SurfaceCare = "new" | "weathered" | "treated";

export interface SurfaceState {
  /** A closed film by `waterFilm`, or drops by `beadedSheet`. */
  readonly form: "film" | "beads";
  /** Share of the area under water in rain. */
  readonly coveredShare: Bounded;
}

const film: SurfaceState = { form: "film", coveredShare: exactly(1) };
const beads = (low: number, nominal: number, high: number): SurfaceState => ({
  form: "beads",
  coveredShare: { low, nominal, high },
});

/**
 * Fresh repellent surfaces hold 0.05 to 0.3 under drops, aged or dirty ones tend towards a closed film; the
 * figures in between are own choices along that line.
 */
const states: Readonly<Record<Wetting, Readonly<Record<SurfaceCare, SurfaceState>>>> = {
  beading: {
    new: beads(0.05, 0.15, 0.3),
    treated: beads(0.05, 0.15, 0.3),
    weathered: beads(0.15, 0.5, 1),
  },
  mixed: {
    new: beads(0.2, 0.5, 1),
    treated: beads(0.05, 0.2, 0.4),
    weathered: film,
  },
  wetting: {
    new: film,
    treated: beads(0.05, 0.2, 0.4),
    weathered: film,
  },
};

/**
 * In which form rain lies on a surface, and on how much of it.
 *
 * Source: common practice, no source; that the advantage of repellent covers fades with age: Effenberger,
 *         Strickland, Joy 1986, Microwave Journal (no figures consulted)
 *
 * @param wetting  how water lies on the clean new surface: a material's `wetting`, or `wettingOfContactAngle`
 * @param care     "new", "weathered" (aged or dirty) or "treated" (a fresh repellent coat)
 * @throws RangeError on an unknown word
 */
export function surfaceState({
  wetting,
  care,
}: {
  readonly wetting: Wetting;
  readonly care: SurfaceCare;
}): SurfaceState {
  const state = states[wetting]?.[care];
  if (state === undefined) throw new RangeError(`no surface is ${wetting} and ${care}`);
  return state;
}
