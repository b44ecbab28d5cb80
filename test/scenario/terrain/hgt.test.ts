import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { zipSync } from "fflate";
import { describe, expect, it } from "vitest";
import { heightIn } from "../../../src/scenario/terrain/grid.ts";
import { bigEndian, readTile, tileName } from "../../../src/scenario/terrain/hgtTile.ts";
import { openTerrain } from "../../../src/scenario/terrain/openTerrain.ts";
import type { ElevationSource, TerrainFault } from "../../../src/scenario/terrain/types.ts";
import { temporaryFolder } from "../../cli/run.ts";
import { describeReference, num, referenceRows } from "../../reference.ts";
import { tableHeight, tileBytes, writeTile } from "./tiles.ts";

const folder = temporaryFolder();

async function elevationOf(path: string, base = folder): Promise<ElevationSource> {
  const opened = await openTerrain(path, base);
  if (!opened.ok || !opened.elevation) throw new Error(JSON.stringify(opened));
  return opened.elevation;
}

async function heightAt(source: ElevationSource, latitude: number, longitude: number): Promise<number> {
  return (await source.heightsAt([latitude], [longitude])).heightsM[0]!;
}

/** The fault met while a height is asked for. */
async function faultAt(source: ElevationSource, latitude: number, longitude: number): Promise<TerrainFault> {
  const found = await source.heightsAt([latitude], [longitude]).catch((error: unknown) => error);
  return (found as { fault: TerrainFault }).fault;
}

describeReference("terrain/dem-bytes.csv", (row) => {
  const bytes = Uint8Array.from(
    [row["byte0_hex"]!, row["byte1_hex"]!].map((hex) => Number.parseInt(hex, 16)),
  );
  expect([...bigEndian(bytes)]).toEqual([num(row, "value")]);
});

describeReference("terrain/dem-tile-names.csv", (row) => {
  expect(tileName(num(row, "lat"), num(row, "lon"))).toBe(row["tile"]);
});

const tiles = new Map(
  [1201, 3601].map((n) => [n, readTile(tileBytes(n, tableHeight), "N46E007.hgt", 46, 7)]),
);

describeReference("terrain/dem-bilinear.csv", (row) => {
  const height = heightIn(tiles.get(num(row, "n"))!, num(row, "lat"), num(row, "lon"));
  if (row["height_m"] === "NaN") expect(height).toBeNaN();
  else expect(Math.abs(height - num(row, "height_m"))).toBeLessThan(1e-6);
});

describe("profiles over the synthetic tile of terrain/dem-profile.csv", () => {
  // Rows 0, 3 and 10 of path 1: GeographicLib on WGS84, bilinear heights; tolerance of the table 1e-4 m.
  const typed = [
    { path: "1", i: 0, count: 11, km: 0, heightM: 890 },
    { path: "1", i: 3, count: 11, km: 27.198368975, heightM: 1122.717949 },
    { path: "1", i: 10, count: 11, km: 90.661229918, heightM: 869 },
  ];
  const ends: Readonly<Record<string, readonly [number, number, number, number]>> = {
    1: [46.2, 7.1, 46.8, 7.9],
    2: [46.95, 7.05, 46.9, 7.95],
  };
  const tableFolder = join(folder, "table");
  mkdirSync(tableFolder);
  writeTile(tableFolder, "N46E007.hgt", 1201, tableHeight);
  const rows =
    referenceRows("terrain/dem-profile.csv")?.map((row) => ({
      path: row["path"]!,
      i: num(row, "i"),
      count: row["path"] === "1" ? 11 : 9,
      km: num(row, "distance_km"),
      heightM: num(row, "height_m"),
    })) ?? typed;

  it.each([...typed, ...rows])("path $path, point $i", async ({ path, i, count, km, heightM }) => {
    const [latitude, longitude, toLatitude, toLongitude] = ends[path]!;
    const terrain = await openTerrain("table", folder);
    if (!terrain.ok) throw new Error("not opened");
    const to = { latitude: toLatitude, longitude: toLongitude };
    const sampled = await terrain.profileBetween({ latitude, longitude }, to, { points: count });
    if (!sampled.ok) throw new Error(JSON.stringify(sampled));
    expect(sampled.gaps).toEqual([]);
    expect(Math.abs(sampled.profile.distancesKm[i]! - km)).toBeLessThan(1e-6);
    expect(Math.abs(sampled.profile.heightsM[i]! - heightM)).toBeLessThan(1e-4);
  });
});

describe("a folder of tiles", () => {
  const mixed = join(folder, "mixed");
  mkdirSync(mixed);
  // Four tiles about a corner, one height each; one zipped, one west of Greenwich, one south of the equator.
  writeTile(mixed, "N00E000.hgt", 1201, () => 100);
  writeFileSync(
    join(mixed, "N00W001.SRTMGL3.hgt.zip"),
    zipSync({ "readme.txt": Buffer.from("x"), "N00W001.hgt": tileBytes(1201, () => 200) }),
  );
  writeTile(mixed, "s01e000.hgt", 1201, () => 300);
  writeFileSync(join(mixed, "N01E000.hgt"), Buffer.alloc(2_884_801));
  writeFileSync(join(mixed, "N02E000.hgt.zip"), zipSync({ "N02E000.hgt": Buffer.alloc(1000) }));
  writeFileSync(join(mixed, "N03E000.hgt.zip"), Buffer.from("PK no archive"));
  writeTile(mixed, "N04E000.hgt", 1201, (row, column) => (row === 7 && column === 9 ? 9001 : 0));

  it("takes each height from the tile of its place, plain, zipped and of any hemisphere", async () => {
    const source = await elevationOf("mixed");
    expect(await heightAt(source, 0.5, 0.5)).toBe(100);
    expect(await heightAt(source, 0.5, -0.25)).toBe(200);
    expect(await heightAt(source, -0.5, 0.5)).toBe(300);
    expect(await heightAt(source, 0.5, 359.5)).toBe(200); // a turn further is the same place
  });

  it("says which tile is missing and leaves the height unknown", async () => {
    const source = await elevationOf("mixed");
    const { heightsM, unknown } = await source.heightsAt([0.5, 0.5], [0.5, 1.5]);
    expect([...heightsM]).toEqual([100, Number.NaN]);
    expect([...unknown]).toEqual([[1, { reason: "no tile", source: "N00E001" }]]);
  });

  it.each([
    ["N01E000.hgt", 1.5, /tile of 2884801 bytes, expected 2884802 \(1201 x 1201\) or 25934402/],
    ["N02E000.hgt.zip", 2.5, /N02E000\.hgt of 1000 bytes, which is no size of a tile/],
    ["N03E000.hgt.zip", 3.5, /cannot be unpacked/],
    ["N04E000.hgt", 4.5, /height 9001 m at row 7, column 9/],
  ])("refuses the broken tile %s by its name", async (file, latitude, message) => {
    const fault = await faultAt(await elevationOf("mixed"), latitude, 0.5);
    expect(fault.file).toBe(file);
    expect(fault.message).toMatch(message);
  });

  it("hands the fault of a tile to who asked for a profile", async () => {
    const terrain = await openTerrain("mixed", folder);
    if (!terrain.ok) throw new Error("not opened");
    const from = { latitude: 0.5, longitude: 0.5 };
    const sampled = await terrain.profileBetween(from, { latitude: 1.5, longitude: 0.5 });
    expect(sampled).toMatchObject({ ok: false, faults: [{ file: "N01E000.hgt", code: "bad_tile_size" }] });
  });

  it("takes a single tile by its path", async () => {
    expect(await heightAt(await elevationOf(join(mixed, "N00E000.hgt")), 0.5, 0.5)).toBe(100);
  });

  it("goes on over the date line", async () => {
    const far = join(folder, "far");
    mkdirSync(far);
    writeTile(far, "N10E179.hgt", 1201, () => 10);
    writeTile(far, "N10W180.hgt", 1201, () => 20);
    const terrain = await openTerrain("far", folder);
    if (!terrain.ok) throw new Error("not opened");
    const sampled = await terrain.profileBetween(
      { latitude: 10.5, longitude: 179.9 },
      { latitude: 10.5, longitude: -179.9 },
      { points: 3 },
    );
    expect(sampled).toMatchObject({ ok: true, gaps: [], profile: { heightsM: [10, 20, 20] } });
  });

  it("is refused where it holds no tile, or does not exist", async () => {
    mkdirSync(join(folder, "bare"));
    const codes = async (path: string) => {
      const opened = await openTerrain(path, folder);
      return opened.ok ? [] : opened.faults.map(({ code, file }) => `${file} ${code}`);
    };
    writeFileSync(join(folder, "hills.hgt"), "");
    expect(await codes("hills.hgt")).toEqual(["hills.hgt bad_tile_name"]);
    expect(await codes("bare")).toEqual(["bare no_tiles"]);
    expect(await codes("nowhere")).toEqual(["nowhere no_file"]);
    expect(await codes("N10E010.hgt")).toEqual(["N10E010.hgt no_file"]);
  });
});

describe("gaps of a profile", () => {
  const holed = join(folder, "holed");
  mkdirSync(holed);
  // A column of voids five samples wide about longitude 7.5, and no tile east of 8.
  writeTile(holed, "N46E007.hgt", 1201, (_, column) => (Math.abs(column - 600) <= 2 ? -32768 : 500));
  const at = (longitude: number, groundM?: number) => ({ latitude: 46.5, longitude, groundM });
  const between = async (from: ReturnType<typeof at>, to: ReturnType<typeof at>) => {
    const terrain = await openTerrain("holed", folder);
    if (!terrain.ok) throw new Error("not opened");
    return terrain.profileBetween(from, to);
  };

  it("are left out of the ground and told with their place", async () => {
    const sampled = await between(at(7.4), at(7.6));
    if (!sampled.ok) throw new Error(JSON.stringify(sampled));
    expect(sampled.gaps).toHaveLength(1);
    const [gap] = sampled.gaps;
    expect(gap).toMatchObject({ reason: "void", source: "N46E007" });
    expect(gap!.at.longitude).toBeCloseTo(7.5 - 2 / 1200, 2);
    expect(gap!.fromKm).toBeGreaterThan(7);
    expect(gap!.toKm).toBeLessThan(8.5);
    const { distancesKm, heightsM } = sampled.profile;
    expect(Math.min(...Array.from(heightsM))).toBeCloseTo(500, 9); // nothing unknown became sea
    const inGap = Array.from(distancesKm).filter((km) => km >= gap!.fromKm && km <= gap!.toKm);
    expect(inGap).toEqual([]);
  });

  it("at an end are a fault, unless the end knows its own ground", async () => {
    const refused = await between(at(7.4), at(8.1));
    expect(refused.ok ? [] : refused.faults.map(({ message }) => message)).toEqual([
      "no height at the end of the path: no tile N46E008",
    ]);
    const helped = await between(at(7.4), at(8.1, 321));
    if (!helped.ok) throw new Error("refused");
    expect(helped.profile.heightsM[helped.profile.heightsM.length - 1]).toBe(321);
    expect(helped.gaps.map(({ source }) => source)).toEqual(["N46E007", "N46E008"]);
  });

  it("refuses one place twice and a path round the Earth", async () => {
    expect(await between(at(7.4), at(7.4))).toMatchObject({ ok: false, faults: [{ code: "same_place" }] });
    expect(await between(at(7.4), { latitude: -46.5, longitude: -172, groundM: 0 })).toMatchObject({
      ok: false,
      faults: [{ code: "long_path" }],
    });
  });
});
