import { sumOf } from "../budget/entry.ts";
import type { Link } from "../budget/types.ts";
import { dbmToWatt, dbToPower } from "../numeric/decibels.ts";
import { exposure, type LimitDistance } from "../safety/exposure.ts";
import { exposureLimits } from "../safety/exposureLimits.ts";

/** How far in front of the transmitting antenna published limits are exceeded, carrier up all the time. */
export interface LinkExposure {
  readonly powerW: number;
  readonly gainDbi: number;
  readonly eirpW: number;
  /** Largest density at the face of the dish [W/m2]; undefined where its size is not known. */
  readonly surfaceWPerM2: number | undefined;
  readonly limits: readonly Pick<LimitDistance, "name" | "audience" | "limitWPerM2" | "distanceM">[];
}

/**
 * Exposure figures of the transmitter as the scenario has it: full power after the line, mismatch and cover
 * left out, on the axis. Where published near-field bounds disagree the farther distance is given.
 */
export function exposureOfLink({ scenario, ends }: Link): LinkExposure {
  const { frequencyGHz, transmitter } = scenario;
  const { antenna } = ends.transmitter[transmitter.feed]!;
  const gainDbi = sumOf(
    antenna.filter(({ id }) => id !== "tx.pointing"),
    "db",
  );
  const powerW = dbmToWatt(transmitter.powerDbm.value - transmitter.lineLossDb.value);
  const eirpW = powerW * dbToPower(gainDbi);
  const diameterM = transmitter.dish === undefined ? undefined : scenario.dish[transmitter.dish]?.diameterM;
  if (diameterM !== undefined) {
    const aperture = antenna.find(({ id }) => id === "tx.aperture");
    const efficiency = aperture ? Math.min(1, dbToPower(gainDbi - aperture.db)) : 0.55;
    const { surfaceWPerM2, limits } = exposure({ powerW, diameterM, frequencyGHz, efficiency });
    return {
      powerW,
      gainDbi,
      eirpW,
      surfaceWPerM2,
      limits: limits.map(({ cautiousDistanceM, ...limit }) => ({
        ...limit,
        distanceM: Math.max(limit.distanceM, cautiousDistanceM),
      })),
    };
  }
  const limits = exposureLimits({ frequencyGHz }).map((limit) => ({
    ...limit,
    distanceM: Math.sqrt(eirpW / (4 * Math.PI * limit.limitWPerM2)),
  }));
  return { powerW, gainDbi, eirpW, surfaceWPerM2: undefined, limits };
}
