import { outside, requireNotNegative, requirePositive, type Validity } from "../numeric/check.ts";
import { ZERO_CELSIUS_K } from "../numeric/constants.ts";
import { type Layer, layeredSheet } from "./layeredSheet.ts";
import { schleissWetLoss } from "./schleissWetLoss.ts";
import { waterLayer } from "./waterFilm.ts";

interface Rain {
  readonly frequencyGHz: number;
  readonly rainRateMmPerH: number;
}

/** Film gamma R^delta [m] on a cover of complex index n and a thickness. */
interface LeijnseInput extends Rain {
  readonly model: "leijnse2008";
  readonly gamma?: number | undefined;
  readonly delta?: number | undefined;
  readonly n?: { readonly re: number; readonly im: number } | undefined;
  readonly thicknessMm?: number | undefined;
  readonly temperatureK?: number | undefined;
}

/** W = C (1 - exp(-d R^z)), C in dB. */
interface PastorekInput extends Rain {
  readonly model: "pastorek2022";
  readonly C?: number | undefined;
  readonly d?: number | undefined;
  readonly z?: number | undefined;
}

/** W = C (1 - exp(-d A)), C in dB, d per dB, A the attenuation measured in all. */
interface KharadlyInput extends Rain {
  readonly model: "kharadly2001";
  readonly attenuationDb: number;
  readonly C?: number | undefined;
  readonly d?: number | undefined;
}

/** W = h R tanh^2(f/10), f in GHz. */
interface MerceretInput extends Rain {
  readonly model: "merceret2000";
  readonly surface?: keyof typeof merceretCoefficients | undefined;
}

interface ConstantInput extends Rain {
  readonly model: "constant";
  readonly constantDb?: number | undefined;
}

/** `schleissWetLoss` after some minutes of steady rain on a link that lost attenuationDb. */
interface SchleissAfterInput extends Rain {
  readonly model: "schleiss2013";
  readonly attenuationDb: number;
  readonly wetMinutes: number;
  readonly stepMinutes?: number | undefined;
  readonly maximumDb?: number | undefined;
  readonly riseMinutes?: number | undefined;
}

export type WetAntennaInput =
  | LeijnseInput
  | PastorekInput
  | KharadlyInput
  | MerceretInput
  | ConstantInput
  | SchleissAfterInput;

export interface WetAntennaLoss {
  readonly lossDb: number;
  /** Whether the loss is that of one wet antenna or of both ends of a link together. */
  readonly ends: "one" | "both";
  /** True outside the frequencies of the model's measurements. */
  readonly extrapolated: boolean;
  readonly range: Validity;
}

export interface WetAntennaModel {
  readonly name: WetAntennaInput["model"];
  readonly ends: "one" | "both";
  readonly range: { readonly frequencyGHz: readonly [low: number, high: number] };
  readonly source: string;
}

/** The models by name; "second-hand" figures were taken from open code that cites the paper, not from the paper. */
export const wetAntennaModels: readonly WetAntennaModel[] = [
  {
    name: "leijnse2008",
    ends: "one",
    range: { frequencyGHz: [27, 27] },
    source: "Leijnse, Uijlenhoet, Stricker 2008, Adv. Water Resour. 31, 1481; coefficients second-hand",
  },
  {
    name: "pastorek2022",
    ends: "both",
    range: { frequencyGHz: [25, 39] },
    source:
      "Pastorek et al. 2022, IEEE TGRS, doi 10.1109/TGRS.2021.3110004, KR-alt; coefficients second-hand",
  },
  {
    name: "kharadly2001",
    ends: "one",
    range: { frequencyGHz: [20, 27] },
    source: "Kharadly & Ross 2001, IEEE Trans. AP-49, 1183; coefficients second-hand, from memory: C 6-8 dB",
  },
  {
    name: "merceret2000",
    ends: "one",
    range: { frequencyGHz: [2, 8] },
    source: "Merceret & Ward 2000, fitted to S and C band radar radomes; form second-hand",
  },
  {
    name: "constant",
    ends: "both",
    range: { frequencyGHz: [15, 40] },
    source: "practice of rain measurement by microwave links, 1.5-2.3 dB when wet (from memory)",
  },
  {
    name: "schleiss2013",
    ends: "both",
    range: { frequencyGHz: [38, 38] },
    source: "Schleiss, Rieckermann, Berne 2013, IEEE Geosci. Remote Sens. Lett. 10",
  },
];

const merceretCoefficients = { standard: 0.165, hydrophobic: 0.0575 } as const;

/**
 * Loss of wet antennas by a published model of its own name, as a check beside the film on the cover.
 *
 * All were fitted to dishes behind shrouds or radomes; none is a model of a cover on a small feed.
 *
 * Source: that of each entry of `wetAntennaModels`
 * Valid:  the `range` of each entry; elsewhere the formula is carried on and `extrapolated` is set. No rain, no
 *         loss.
 *
 * @param model           name of an entry of `wetAntennaModels`; the further parameters are those of its input
 *                        type, under the symbols of its source, and have that source's values by default
 * @param frequencyGHz    [GHz], above 0
 * @param rainRateMmPerH  [mm/h], at least 0
 * @throws RangeError on an unknown model, a missing or a bad argument
 */
export function wetAntennaLoss(input: WetAntennaInput): WetAntennaLoss {
  requirePositive("frequencyGHz", input.frequencyGHz);
  requireNotNegative("rainRateMmPerH", input.rainRateMmPerH);
  const entry = wetAntennaModels.find(({ name }) => name === input.model);
  if (entry === undefined) throw new RangeError(`model must be one of wetAntennaModels, got ${input.model}`);
  return {
    lossDb: input.rainRateMmPerH === 0 ? 0 : lossOf(input),
    ends: entry.ends,
    extrapolated: outside(entry.range, { frequencyGHz: input.frequencyGHz }).length > 0,
    range: entry.range,
  };
}

function lossOf(input: WetAntennaInput): number {
  switch (input.model) {
    case "leijnse2008":
      return leijnse(input);
    case "pastorek2022": {
      const { C = 14, d = 0.1, z = 0.55 } = input;
      return saturating(C, d * input.rainRateMmPerH ** z);
    }
    case "kharadly2001": {
      const { C = 7, d = 0.125, attenuationDb } = input;
      requireNotNegative("attenuationDb", attenuationDb);
      return saturating(C, d * attenuationDb);
    }
    case "merceret2000": {
      const coefficient = merceretCoefficients[input.surface ?? "standard"];
      return coefficient * input.rainRateMmPerH * Math.tanh(input.frequencyGHz / 10) ** 2;
    }
    case "constant": {
      const { constantDb = 1.9 } = input; // middle of the practice's 1.5 to 2.3 dB
      requireNotNegative("constantDb", constantDb);
      return constantDb;
    }
    case "schleiss2013":
      return schleissAfter(input);
  }
}

/** C (1 - e^-x), C in dB. */
function saturating(C: number, x: number): number {
  requireNotNegative("C", C);
  requireNotNegative("d", x);
  return -C * Math.expm1(-x);
}

function leijnse({
  frequencyGHz,
  rainRateMmPerH,
  gamma = 2.06e-5,
  delta = 0.24,
  n = { re: 1.73, im: -0.014 },
  thicknessMm = 1,
  temperatureK = 293,
}: LeijnseInput): number {
  const permittivity = n.re * n.re - n.im * n.im;
  const cover = { permittivity, lossTangent: (-2 * n.re * n.im) / permittivity, thicknessMm };
  const film = waterLayer({
    thicknessMm: 1e3 * gamma * rainRateMmPerH ** delta,
    frequencyGHz,
    temperatureC: temperatureK - ZERO_CELSIUS_K,
  });
  const lossDb = (layers: readonly Layer[]) =>
    layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers }).transmissionLossDb;
  return lossDb([cover, film]) - lossDb([cover]);
}

function schleissAfter({
  attenuationDb,
  wetMinutes,
  stepMinutes = 1,
  maximumDb,
  riseMinutes,
}: SchleissAfterInput) {
  requireNotNegative("wetMinutes", wetMinutes);
  requirePositive("stepMinutes", stepMinutes);
  const steps = Math.round(wetMinutes / stepMinutes);
  const { lossDb } = schleissWetLoss({
    attenuationDb: Array<number>(steps).fill(attenuationDb),
    wet: Array<boolean>(steps).fill(true),
    stepMinutes,
    maximumDb,
    riseMinutes,
  });
  return lossDb.at(-1) ?? 0;
}
