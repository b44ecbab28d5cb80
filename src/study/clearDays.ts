import { vapourPressureFromDensity } from "../atmosphere/humidity.ts";
import { referenceAtmosphere } from "../atmosphere/referenceAtmosphere.ts";
import { sumOf } from "../budget/entry.ts";
import type { GroundPath } from "../budget/groundPath.ts";
import { overreachWarning } from "../budget/overreach.ts";
import type { Budget, Link, Warning } from "../budget/types.ts";
import { outside } from "../numeric/check.ts";
import { ZERO_CELSIUS_K } from "../numeric/constants.ts";
import { clearAirLoss, clearAirValidity } from "../path/clearAir.ts";

/** Shares of the year: the normal day, and lifts ever more seldom [%]. */
export const dayPercents = [50, 10, 1, 0.1] as const;

/** A path in clear air for a share of the year in which it is no worse. */
export interface ClearDay {
  readonly percent: number;
  /** Basic transmission loss of all mechanisms together, gas included [dB]. */
  readonly lossDb: number;
  /** Each by itself, gas included [dB]. */
  readonly alongGroundDb: number;
  readonly troposcatterDb: number;
  readonly ductingDb: number;
  readonly marginDb: number;
}

/**
 * The normal day and the lift by P.452-18, and the margin of a budget with that loss in the place of its own path.
 *
 * @param budget  in the weather that the margins are asked for; its rain, fog and gas are not counted
 */
export function clearDays(
  { scenario, path, ends }: Link,
  ground: GroundPath,
  budget: Pick<Budget, "case" | "entries" | "marginDb">,
): { readonly days: readonly ClearDay[]; readonly warnings: readonly Warning[] } {
  const { frequencyGHz } = scenario;
  const gain = (end: "transmitter" | "receiver") => sumOf(ends[end][budget.case[end].feed]!.antenna, "db");
  const onPath = budget.entries.filter(({ stage, id }) => stage === "path" && id !== "path.foliage");
  const marginWithoutPathDb = budget.marginDb - sumOf(onPath, "db");
  const common = {
    ...ground.settings,
    ...airAt((ground.sight.txHeightAmslM + ground.sight.rxHeightAmslM) / 2000),
    frequencyGHz,
    profile: ground.profile,
    polarization: ground.polarization,
    txHeightM: ground.txHeightM,
    rxHeightM: ground.rxHeightM,
    txGainDbi: gain("transmitter"),
    rxGainDbi: gain("receiver"),
    from: path.from,
    to: path.to,
  };
  const days = dayPercents.map((percent): ClearDay => {
    const found = clearAirLoss({ ...common, percent });
    const { lossDb, lineOfSightDb, diffractionDb, troposcatterDb, ductingDb } = found;
    const alongGroundDb = lineOfSightDb + diffractionDb;
    return {
      percent,
      lossDb,
      alongGroundDb,
      troposcatterDb,
      ductingDb,
      marginDb: marginWithoutPathDb - lossDb,
    };
  });
  const warnings = outside(clearAirValidity, { frequencyGHz });
  return { days, warnings: warnings.map(overreachWarning("the normal day and the lift by P.452", "path")) };
}

/** Mean air of the globe at a height. */
function airAt(heightKm: number): { readonly pressureHPa: number; readonly temperatureC: number } {
  const { temperatureK, pressureHPa, vapourDensityGm3 } = referenceAtmosphere({
    heightKm: Math.max(0, heightKm),
  });
  const { vapourPressureHPa } = vapourPressureFromDensity({ vapourDensityGm3, temperatureK });
  return { pressureHPa: pressureHPa - vapourPressureHPa, temperatureC: temperatureK - ZERO_CELSIUS_K };
}
