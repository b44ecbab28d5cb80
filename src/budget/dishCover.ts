import { type Bounded, plus } from "../cover/bounded.ts";
import { type Layer, layeredSheet } from "../cover/layeredSheet.ts";
import { measuredCover } from "../cover/measuredCover.ts";
import { mismatchLossDb } from "../cover/reflectionFigures.ts";
import { abs } from "../numeric/complex.ts";
import { dbToPower } from "../numeric/decibels.ts";
import type { Cover } from "../scenario/types.ts";
import type { EndHeading } from "./antennaEntries.ts";
import { depositOn, isDry, type Surface, type Wetness } from "./deposit.ts";
import { type Entry, lossEntry } from "./entry.ts";

/** A cover over the whole dish in one weather. */
export interface DishCoverState {
  readonly entries: readonly Entry[];
  /** Shares of the power that come through, and that heat cover and water; the rest goes back to the sky. */
  readonly passed: number;
  readonly heated: number;
}

export const NO_DISH_COVER: DishCoverState = { entries: [], passed: 1, heated: 0 };

/**
 * Part of a big sheet's reflected amplitude that the dish gathers back into its feed: nothing where the sheet is
 * tilted or bulges by a wavelength, a fifth at the most (own estimate, no source).
 */
const GATHERED_SHARE = 0.2;
const LOSS_SIGMA_SHARE = 0.4;
const WATER_SIGMA_SHARE = 0.5;
/** Loss of an opaque sheet [dB]: finite, so that entries can be added up. */
const OPAQUE_DB = 400;

interface Loss {
  readonly reflectedDb: number;
  readonly heatDb: number;
  readonly reflection: number;
}

/**
 * Cloth or shell over the whole aperture: a plane wave meets a sheet many wavelengths wide, straight on. What it
 * reflects is lost, but hardly disturbs the feed; what little is gathered widens the bounds.
 *
 * @param gamma  reflection of the bare feed, against which a gathered wave beats
 * @returns the cover by what the weather has put on it
 */
export function dishCoverOver(
  heading: EndHeading,
  frequencyGHz: number,
  cover: Cover,
  diameterM: number,
  gamma: number,
): (wetness: Wetness | undefined) => DishCoverState {
  const surface: Surface =
    cover.domeRadiusMm === undefined
      ? { shape: "plate", sizeM: cover.slopeMm === undefined ? diameterM : cover.slopeMm / 1000, tiltDeg: 90 }
      : { shape: "dome", sizeM: cover.domeRadiusMm / 1000 };
  const layersOf = (figure: keyof Bounded): Layer[] =>
    cover.layers.map(({ thicknessMm, permittivity, lossTangent }) => ({
      thicknessMm,
      permittivity: permittivity[figure],
      lossTangent: lossTangent[figure],
    }));
  const through = (layers: readonly Layer[]) => lossThrough(frequencyGHz, layers);
  const dryLayers = layersOf("nominal");
  const dry = cover.measured ? measuredLoss(cover) : through(dryLayers);
  const spread = cover.measured ? [dry] : [through(layersOf("low")), dry, through(layersOf("high"))];
  const source = cover.measured ? "measured, scenario" : "plane wave through the layers, Born & Wolf 1.6";
  const range = (part: "reflectedDb" | "heatDb"): Bounded => ({
    low: Math.min(...spread.map((loss) => loss[part])),
    nominal: dry[part],
    high: Math.max(...spread.map((loss) => loss[part])),
  });
  const gathered = beat(gamma, dry.reflection);
  const dryEntries = [
    lossEntry(
      heading("dish_cover_reflected", "dish cover, reflected", source),
      plus(range("reflectedDb"), gathered),
    ),
    lossEntry(
      heading("dish_cover_heat", "dish cover, heat", source),
      range("heatDb"),
      LOSS_SIGMA_SHARE * dry.heatDb,
    ),
  ];
  return (wetness) => {
    if (wetness === undefined || isDry(wetness)) return stateOf(dryEntries, dry);
    const deposit = depositOn(frequencyGHz, surface, wetness);
    const stand = cover.layers.length > 0 ? dryLayers : [];
    const bare = through(stand);
    const wet = through([...stand, ...deposit.layersAt(deposit.filmMm.nominal)]);
    const more = { reflectedDb: wet.reflectedDb - bare.reflectedDb, heatDb: wet.heatDb - bare.heatDb };
    const whole = more.reflectedDb + more.heatDb;
    const label = `${deposit.noun} on the dish cover`;
    const entry = lossEntry(
      heading("dish_cover_water", label, deposit.source),
      whole,
      WATER_SIGMA_SHARE * Math.abs(whole),
    );
    return stateOf([...dryEntries, entry], {
      reflectedDb: dry.reflectedDb + more.reflectedDb,
      heatDb: dry.heatDb + more.heatDb,
    });
  };
}

/** Change of the feed's loss by a small wave that comes back in any phase: nothing on the mean. */
function beat(gamma: number, reflection: number): Bounded {
  const share = gamma * GATHERED_SHARE * reflection;
  return { low: 20 * Math.log10(1 - share), nominal: 0, high: 20 * Math.log10(1 + share) };
}

function lossThrough(frequencyGHz: number, layers: readonly Layer[]): Loss {
  const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
  const reflection = abs(sheet.reflection);
  const reflectedDb = mismatchLossDb(reflection);
  return {
    reflectedDb,
    heatDb: Math.min(OPAQUE_DB, Math.max(0, sheet.transmissionLossDb - reflectedDb)),
    reflection,
  };
}

/** A reading over a dish: its insertion loss is charged as heat, for nothing tells the parts apart. */
function measuredLoss({ measured }: Cover): Loss {
  const { value } = measured!.insertionLossDb;
  const { dissipationDb } = measuredCover({
    feedReturnLossDb: Number.POSITIVE_INFINITY,
    insertionLossDb: value,
  });
  return { reflectedDb: value - dissipationDb, heatDb: dissipationDb, reflection: 0 };
}

function stateOf(
  entries: readonly Entry[],
  { reflectedDb, heatDb }: Omit<Loss, "reflection">,
): DishCoverState {
  const entered = Math.min(1, dbToPower(-reflectedDb));
  const passed = entered * dbToPower(-heatDb);
  return { entries, passed, heated: Math.max(0, entered - passed) };
}
