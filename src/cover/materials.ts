import type { Bounded } from "./bounded.ts";
import { aliasTable, electricalTable, weatherTable } from "./materialTable.ts";

/** How long a bare surface lasts in sunlight; classes of suppliers' guidance, common practice. */
export const uvClasses = {
  A: "years outdoors, bare",
  B: "years only as a stabilised or pigmented grade",
  C: "one or two seasons",
  D: "needs a skin of its own",
} as const;

/** How water lies on a surface. */
export type Wetting = "beading" | "mixed" | "wetting";

/** How much stands behind the electrical figures of a material. */
export type Confidence =
  | "published"
  | "published range"
  | "partly published"
  | "memory"
  | "estimate"
  | "model";

/** A material of covers; undefined stands for a figure that does not apply or is not known. */
export interface Material {
  readonly name: string;
  readonly permittivity: Bounded;
  readonly lossTangent: Bounded;
  /** Where permittivity and loss tangent hold. */
  readonly frequencyGHz: number;
  readonly temperatureC: number;
  readonly confidence: Confidence;
  readonly source: string;
  readonly uvClass: keyof typeof uvClasses | undefined;
  readonly uvWords: string | undefined;
  readonly waterUptakePercent: number | undefined;
  readonly serviceMinC: number | undefined;
  readonly serviceMaxC: number | undefined;
  readonly contactAngleDeg: number | undefined;
  readonly wetting: Wetting | undefined;
  readonly weatherSource: string | undefined;
  readonly notes: string | undefined;
  /** Other words under which `findMaterial` knows it. */
  readonly aliases: readonly string[];
}

/**
 * Materials of covers with the spread of their figures, for a few to some tens of GHz.
 *
 * Source: the `source` and `weatherSource` of each; `confidence` says how much stands behind them
 */
export const materials: readonly Material[] = readMaterials();

const byName = new Map(
  materials.flatMap((material) =>
    [material.name, ...material.aliases].map((name) => [folded(name), material] as const),
  ),
);

/** The material of a name or alias, undefined if none; case, hyphens and spaces do not matter. */
export function findMaterial(name: string): Material | undefined {
  return byName.get(folded(name));
}

/**
 * How water lies on a clean new surface of a given contact angle [deg]: from 95 deg it beads, below 80 deg it
 * wets. Dirt and weather lower the angle.
 *
 * Source: common practice, no source
 */
export function wettingOfContactAngle(contactAngleDeg: number): Wetting {
  if (contactAngleDeg >= 95) return "beading";
  return contactAngleDeg >= 80 ? "mixed" : "wetting";
}

function folded(name: string): string {
  return name.toLowerCase().replace(/[\s-]+/g, "");
}

function readMaterials(): Material[] {
  const weather = new Map(rowsOf(weatherTable).map((row) => [row[0], row]));
  const aliases = new Map(rowsOf(aliasTable).map(([name, words]) => [name, words!.split(", ")]));
  return rowsOf(electricalTable).map((row) => {
    const name = row[0]!;
    const life = weather.get(name);
    if (life === undefined) throw new Error(`${name} has no line in the table of weather`);
    const uvClass = known(life[1]) as keyof typeof uvClasses | undefined;
    return {
      name,
      permittivity: { nominal: Number(row[1]), low: Number(row[2]), high: Number(row[3]) },
      lossTangent: { nominal: Number(row[4]), low: Number(row[5]), high: Number(row[6]) },
      frequencyGHz: Number(row[7]),
      temperatureC: Number(row[8]),
      confidence: row[9] as Confidence,
      source: row[10]!,
      uvClass,
      uvWords: uvClass && uvClasses[uvClass],
      waterUptakePercent: knownNumber(life[2]),
      serviceMinC: knownNumber(life[3]),
      serviceMaxC: knownNumber(life[4]),
      contactAngleDeg: knownNumber(life[5]),
      wetting: known(life[6]) as Wetting | undefined,
      weatherSource: known(life[7]),
      notes: known(life[8]),
      aliases: aliases.get(name) ?? [],
    };
  });
}

/** Cells of a table of `materialTable.ts`, its line of headings left out. */
function rowsOf(table: string): string[][] {
  const lines = table.trim().split("\n").slice(1);
  return lines.map((line) => line.split(" | "));
}

function known(cell: string | undefined): string | undefined {
  return cell === "-" ? undefined : cell;
}

function knownNumber(cell: string | undefined): number | undefined {
  return cell === "-" ? undefined : Number(cell);
}
