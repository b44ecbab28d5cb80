import type { Profile, Zone } from "../../src/path/profile.ts";
import { num, type Row, referenceRows } from "../reference.ts";

const read = new Map<string, Profile>();

/** Profile of the reference folder by its name without extension. */
export function referenceProfile(name: string): Profile {
  const known = read.get(name);
  if (known !== undefined) return known;
  const rows = referenceRows(`terrain/profiles/${name}.csv`);
  if (rows === undefined) throw new Error(`profile ${name} is missing beside its table`);
  const column = (header: string) => rows.map((row: Row) => num(row, header));
  const zoned = rows[0]?.["zone"] !== undefined;
  const profile: Profile = {
    distancesKm: column("distance_km"),
    heightsM: column("height_m"),
    coverM: zoned ? column("cover_m") : undefined,
    zones: zoned ? rows.map((row) => row["zone"] as Zone) : undefined,
  };
  read.set(name, profile);
  return profile;
}

/** Polarization by the letter that the reference tables use. */
export function polarizationOf(row: Row): "horizontal" | "vertical" {
  const letter = row["pol"];
  if (letter !== "H" && letter !== "V") throw new Error(`column pol holds ${letter}`);
  return letter === "H" ? "horizontal" : "vertical";
}
