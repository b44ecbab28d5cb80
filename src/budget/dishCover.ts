import { BEAD_HEIGHT_MM, beadedSheet } from "../cover/beads.ts";
import { type Bounded, bounded, plus } from "../cover/bounded.ts";
import type { Layer, SheetScattering } from "../cover/layeredSheet.ts";
import { measuredCover } from "../cover/measuredCover.ts";
import { mismatchLossDb } from "../cover/reflectionFigures.ts";
import { surfaceState } from "../cover/surfaceState.ts";
import { waterLayer } from "../cover/waterFilm.ts";
import { abs } from "../numeric/complex.ts";
import { amplitudeToDb, dbToPower } from "../numeric/decibels.ts";
import { BENCH_REPEATABILITY_DB } from "../readings/verdict.ts";
import type { Cover } from "../scenario/types.ts";
import type { EndHeading } from "./antennaEntries.ts";
import { depositOn, isDry, type Surface } from "./deposit.ts";
import type { Doubts } from "./doubts.ts";
import { hasStackSpread, heatShareOf, layerAt, thicknessWarnings, withLossKept } from "./dryCover.ts";
import { type Entry, lossEntry } from "./entry.ts";
import { sheetOf } from "./mouthpiece.ts";
import { publishedWater, waterModelOf } from "./publishedWater.ts";
import type { DishCoverState, Warning, Wetness } from "./types.ts";

export const NO_DISH_COVER: DishCoverState = {
  entries: [],
  passed: 1,
  heated: 0,
  stack: undefined,
  stackIsSigma: false,
  warnings: [],
};

/**
 * Part of a big sheet's reflected amplitude that the dish gathers back into its feed: nothing where the sheet is
 * tilted or bulges by a wavelength, a fifth at the most (own estimate, no source).
 */
const GATHERED_SHARE = 0.2;
/** Loss of an opaque sheet [dB]: finite, so that entries can be added up. */
const OPAQUE_DB = 400;

interface Loss {
  readonly reflectedDb: number;
  readonly heatDb: number;
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
  where: string,
  diameterM: number,
  gamma: number,
  doubts: Doubts,
): (wetness: Wetness | undefined) => DishCoverState {
  const stack = (figure: keyof Bounded) => cover.layers.map((layer) => layerAt(layer, figure));
  const layers = stack("nominal");
  const through = (some: readonly Layer[]) => lossOf(sheetOf(frequencyGHz, some));
  const dry = cover.measured ? measuredLoss(cover) : through(layers);
  const dryEntries = cover.measured
    ? measuredEntries(heading, cover, dry)
    : layeredEntries(heading, dry, [through(stack("low")), through(stack("high"))], {
        gamma,
        reflection: abs(sheetOf(frequencyGHz, layers).reflection),
        heatShare: heatShareOf(cover.layers, doubts.coverLossShare, (some) => {
          const { reflectedDb, heatDb } = through(some);
          return { heatDb, wholeDb: reflectedDb + heatDb };
        }),
      });
  const warnings = [...thicknessWarnings(frequencyGHz, cover, where), ...gainWarnings(cover, where)];
  const wholeAt = (figure: keyof Bounded) => {
    const { reflectedDb, heatDb } = through(withLossKept(cover.layers, figure));
    return reflectedDb + heatDb - dry.reflectedDb - dry.heatDb;
  };
  const isSpread = cover.measured === undefined && hasStackSpread(cover);
  const common = {
    stack: isSpread ? { low: wholeAt("low"), high: wholeAt("high") } : undefined,
    stackIsSigma: cover.layers.some(({ statedSpread }) => statedSpread),
    warnings,
  };
  return (wetness) => {
    if (wetness === undefined || isDry(wetness)) return { ...common, ...stateOf(dryEntries, dry) };
    const water = waterOver(frequencyGHz, cover, layers, diameterM, wetness, where);
    const { low, nominal, high } = water.lossDb;
    const label = `${water.noun} on the dish cover`;
    const entry = lossEntry(
      heading("dish_cover_water", label, water.source),
      { low, nominal, high },
      doubts.waterShare * Math.abs(nominal),
    );
    const wet = {
      reflectedDb: dry.reflectedDb + water.reflectedDb,
      heatDb: dry.heatDb + nominal - water.reflectedDb,
    };
    const all = [...warnings, ...water.warnings];
    return { ...common, ...stateOf([...dryEntries, entry], wet), warnings: all };
  };
}

function layeredEntries(
  heading: EndHeading,
  dry: Loss,
  spread: readonly Loss[],
  {
    heatShare,
    ...beating
  }: { readonly gamma: number; readonly reflection: number; readonly heatShare: number },
): Entry[] {
  const source = "plane wave through the layers, Born & Wolf 1.6";
  const range = (part: keyof Loss): Bounded => {
    const ends = spread.map((loss) => loss[part]);
    return bounded(Math.min(...ends), dry[part], Math.max(...ends));
  };
  return [
    lossEntry(
      heading("dish_cover_reflected", "dish cover, reflected", source),
      plus(range("reflectedDb"), beat(beating)),
    ),
    lossEntry(
      heading("dish_cover_heat", "dish cover, heat", source),
      range("heatDb"),
      heatShare * dry.heatDb,
    ),
  ];
}

/** Change of the feed's loss by a small wave that comes back in any phase: nothing on the mean. */
function beat({ gamma, reflection }: { readonly gamma: number; readonly reflection: number }): Bounded {
  const share = gamma * GATHERED_SHARE * reflection;
  return { low: 20 * Math.log10(1 - share), nominal: 0, high: 20 * Math.log10(1 + share) };
}

function lossOf({ reflection, transmission }: SheetScattering): Loss {
  const reflectedDb = mismatchLossDb(abs(reflection));
  const wholeDb = 0 - amplitudeToDb(abs(transmission));
  return { reflectedDb, heatDb: Math.min(OPAQUE_DB, Math.max(0, wholeDb - reflectedDb)) };
}

/** A reading over a dish: its insertion loss is charged as heat, for nothing tells the parts apart. */
function measuredLoss({ measured }: Cover): Loss {
  const { value } = measured!.insertionLossDb;
  const { dissipationDb } = measuredCover({
    feedReturnLossDb: Number.POSITIVE_INFINITY,
    insertionLossDb: value,
  });
  return { reflectedDb: value - dissipationDb, heatDb: dissipationDb };
}

function measuredEntries(heading: EndHeading, { measured }: Cover, { reflectedDb, heatDb }: Loss): Entry[] {
  const source = "measured, scenario";
  const sigma = measured!.insertionLossDb.sigma ?? BENCH_REPEATABILITY_DB;
  return [
    lossEntry(heading("dish_cover_reflected", "dish cover, reflected", source), reflectedDb),
    lossEntry(heading("dish_cover_heat", "dish cover, heat", source), heatDb, sigma),
  ];
}

/** A reading that no sheet without a power supply can give. */
function gainWarnings({ measured }: Cover, where: string): Warning[] {
  if (measured === undefined) return [];
  const { value, sigma = BENCH_REPEATABILITY_DB } = measured.insertionLossDb;
  if (value >= -2 * sigma) return [];
  const message = `a gain of ${-value} dB is more than any cover over a dish can give; the reading is used`;
  return [{ code: "implausible_gain", message, where: `${where}.measured` }];
}

/** What water, ice or snow adds to the cover: as a film, as drops or by a published model, as on a feed's mouth. */
function waterOver(
  frequencyGHz: number,
  cover: Cover,
  dryLayers: readonly Layer[],
  diameterM: number,
  wetness: Wetness,
  where: string,
) {
  const deposit = depositOn(frequencyGHz, surfaceOf(cover, diameterM), wetness, where);
  const { filmMm, noun, source } = deposit;
  const dry = sheetOf(frequencyGHz, dryLayers);
  const more = (sheet: SheetScattering) => {
    const [wet, bare] = [lossOf(sheet), lossOf(dry)];
    const reflectedDb = wet.reflectedDb - bare.reflectedDb;
    return { reflectedDb, wholeDb: reflectedDb + wet.heatDb - bare.heatDb };
  };
  const at = (thicknessMm: number) =>
    more(sheetOf(frequencyGHz, [...dryLayers, ...deposit.layersAt(thicknessMm)]));
  const film = at(filmMm.nominal);
  const ends = [at(filmMm.low).wholeDb, at(filmMm.high).wholeDb];
  const filmDb = bounded(Math.min(...ends), film.wholeDb, Math.max(...ends));
  const model = waterModelOf(cover);
  if (noun !== "water" || model === "film") {
    return { noun, source, lossDb: filmDb, reflectedDb: film.reflectedDb, warnings: deposit.warnings };
  }
  if (model === "beads") {
    const temperatureC = Math.max(0, wetness.temperatureC);
    const drop = waterLayer({ thicknessMm: BEAD_HEIGHT_MM, frequencyGHz, temperatureC });
    const { coveredShare } = surfaceState({ wetting: cover.surface, care: cover.state });
    const sheet = beadedSheet({ dry, wet: sheetOf(frequencyGHz, [...dryLayers, drop]), coveredShare });
    const drops = more(sheet);
    // Drops hold no more water than the rain brings.
    const scarce = drops.wholeDb > filmDb.nominal ? Math.max(0, filmDb.nominal) / drops.wholeDb : 1;
    const { low, high } = sheet.excessDb;
    return {
      noun,
      source: "drops by covered share",
      lossDb: bounded(low * scarce, drops.wholeDb * scarce, high * scarce),
      reflectedDb: drops.reflectedDb * scarce,
      warnings: deposit.warnings,
    };
  }
  const costOf = (thicknessMm: number) => Math.max(0, at(thicknessMm).wholeDb);
  const published = publishedWater(model, cover, frequencyGHz, wetness, filmMm.nominal, costOf);
  return {
    noun,
    source: published.source,
    // A published figure does not say how much of it is reflection: all of it counts as heat.
    lossDb: bounded(0, published.lossDb, filmDb.high),
    reflectedDb: 0,
    warnings: [...published.warnings, ...deposit.warnings],
  };
}

function surfaceOf({ domeRadiusMm, slopeMm }: Cover, diameterM: number): Surface {
  if (domeRadiusMm !== undefined) return { shape: "dome", sizeM: domeRadiusMm / 1000 };
  return { shape: "plate", sizeM: slopeMm === undefined ? diameterM : slopeMm / 1000, tiltDeg: 90 };
}

function stateOf(
  entries: readonly Entry[],
  { reflectedDb, heatDb }: Loss,
): Pick<DishCoverState, "entries" | "passed" | "heated"> {
  const entered = Math.min(1, dbToPower(-reflectedDb));
  const passed = entered * dbToPower(-heatDb);
  return { entries, passed, heated: Math.max(0, entered - passed) };
}
