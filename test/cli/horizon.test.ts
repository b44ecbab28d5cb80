import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { writeArrayBuffer } from "geotiff";
import { describe, expect, it } from "vitest";
import { progressBar } from "../../src/cli/progress.ts";
import { writeTile } from "../scenario/terrain/tiles.ts";
import { changedDemo, oilskin, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
mkdirSync(join(folder, "dem"));
// Heron Scar stands at 53.1563 N, 3.2458 W. A wall of 900 m runs along 53.5 N, 41 km to its north; all else is 100 m.
const WALL_ROW = 600;
writeTile(join(folder, "dem"), "N53W004.hgt", 1201, (row) => (Math.abs(row - WALL_ROW) <= 2 ? 900 : 100));

const withTerrain = (terrain: string, name: string) =>
  changedDemo(folder, name, "\n  from: {", `\n  terrain: ${terrain}\n  from: {`);
const tiles = withTerrain("dem", "tiles.yaml");
const run = (...args: string[]) => oilskin(["horizon", ...args]);
/** Few lines and not far, so that the tests are quick. */
const quick = ["--azimuths", "72", "--reach", "60 km"];

describe("oilskin horizon", () => {
  it("answers first, draws the skyline and says what is unknown, in 80 columns", () => {
    const { status, stdout, stderr } = run(tiles, ...quick);
    expect([status, stderr]).toEqual([0, ""]); // no progress where nobody watches
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    const [title, ground] = stdout.split("\n");
    expect(title).toMatch(/^Horizon from Heron Scar \(53\.15\d\d N, 3\.24\d\d W\)$/);
    expect(ground).toMatch(/^Ground 100 m above sea level, antenna 2 m above that ground; k = 1\.33/);
    expect(stdout).toContain("ground: 100 m by the terrain, 538 m as stated");
    expect(stdout).toMatch(/N52W004: no such tile, on \d+ of 72 azimuths, nearest 17\.\d km off at 180\.0/);
    expect(stdout).toMatch(/^ +N 0 +E 90 +S 180 +W 270$/m);
  });

  it("finds the wall where geometry has it", () => {
    const rows = csvParse(run(tiles, ...quick, "--csv").stdout);
    expect(rows).toHaveLength(72);
    const north = rows[0]!;
    // One degree of latitude there is 111.27 km on WGS84 (from memory); the wall's near edge is two samples south.
    const km = (53.5 - 2 / 1200 - 53.15625) * 111.27;
    const slope = (900 - 102) / (1000 * km) - km / (2 * 8494.667);
    expect(Math.abs(Number(north["distance_km"]) - km)).toBeLessThan(0.5);
    expect(Math.abs(Number(north["elevation_deg"]) - (slope * 180) / Math.PI)).toBeLessThan(0.02);
    expect(Number(north["ground_m"])).toBe(900);
    expect(Number(rows[36]!["ground_m"])).toBe(100);
  });

  it("gives all of it as JSON, for the other end too", () => {
    mkdirSync(join(folder, "both"));
    for (const name of ["N53W004", "N54W004"]) writeTile(join(folder, "both"), `${name}.hgt`, 1201, () => 20);
    const file = withTerrain("both", "both.yaml");
    const found = JSON.parse(run(file, "--from", "Gannet Fell", ...quick, "--json").stdout);
    expect(found).toMatchObject({ name: "Gannet Fell", latitude: 54.27, longitude: -3.3, groundM: 20 });
    expect(found.rows).toHaveLength(72);
    expect(found.towards.name).toBe("Heron Scar");
  });

  it("looks from any place with any height and k", () => {
    const at = (...more: string[]) =>
      JSON.parse(run(tiles, "--at", "53.2 N, 3.5 W", ...quick, "--json", ...more).stdout);
    expect(at()).toMatchObject({ latitude: 53.2, longitude: -3.5, heightM: 2, kFactor: 4 / 3 });
    const [low, high] = [at("--k", "0.7"), at("--k", "4/3")].map(({ rows }) => rows[0].elevationDeg);
    expect(low).toBeLessThan(high);
    expect(at("--height", "30 ft").heightAmslM).toBeCloseTo(100 + 9.144, 6);
  });

  it("reads a GeoTIFF as well", () => {
    const bytes = writeArrayBuffer(new Float32Array(100 * 100).fill(70), {
      ...{
        width: 100,
        height: 100,
        ModelPixelScale: [0.02, 0.02, 0],
        ModelTiepoint: [0, 0, 0, -4.5, 54.5, 0],
      },
      ...{ GTModelTypeGeoKey: 2, GeographicTypeGeoKey: 4326, GTRasterTypeGeoKey: 2 },
    });
    writeFileSync(join(folder, "land.tif"), Buffer.from(bytes));
    const found = JSON.parse(run(withTerrain("land.tif", "tif.yaml"), ...quick, "--json").stdout);
    expect(found).toMatchObject({ groundM: 70, terrain: "land.tif" });
  });

  it.each([
    ["a site it does not know", ["--from", "Heron Scr"], /no site "Heron Scr".*did you mean Heron Scar/],
    ["k of zero", ["--k", "0"], /--k: read "0", expected 0\.2 to 10/],
    ["no line at all", ["--azimuths", "0"], /--azimuths: read "0", expected 4 to 3600/],
    ["half a line", ["--azimuths", "7.5"], /expected a whole number/],
    ["half a place", ["--at", "53.2 N"], /--at: read "53\.2 N", expected a place such as/],
    ["a place off the globe", ["--at", "95 N, 3 W"], /--at: read "95 N"/],
    ["a place without tiles", ["--at", "10 N, 10 E"], /dem holds no height at 10 N, 10 E/],
    ["two places", ["--at", "53.2 N, 3 W", "--from", "receiver"], /cannot be used with/],
  ])("refuses %s", (_, options, message) => {
    const { status, stderr, stdout } = run(tiles, ...options);
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr).toMatch(message);
  });

  it("refuses terrain that shows no horizon, and a broken tile by its name", () => {
    writeFileSync(join(folder, "line.csv"), "distance km,height m\n0,1\n60,2\n123.97,3\n");
    const profile = run(withTerrain("line.csv", "line.yaml"));
    expect(profile.status).toBe(2);
    expect(profile.stderr).toMatch(/line\.csv is a profile of one path, which shows no horizon all round/);
    expect(run(changedDemo(folder, "none.yaml", "title:", "title: x ")).stderr).toMatch(/names no terrain/);
    mkdirSync(join(folder, "cut"));
    writeFileSync(join(folder, "cut/N53W004.hgt"), Buffer.alloc(1000));
    const cut = run(withTerrain("cut", "cut.yaml"));
    expect(cut.status).toBe(2);
    expect(cut.stderr).toMatch(/N53W004\.hgt: tile of 1000 bytes/);
  });
});

describe("the bar of progress", () => {
  const stream = (isTTY: boolean) => {
    const written: string[] = [];
    return { written, isTTY, write: (text: string) => written.push(text) };
  };

  it("is drawn on a terminal alone, and taken away at the end", () => {
    expect(progressBar(stream(false) as unknown as NodeJS.WriteStream, "x")).toBeUndefined();
    const terminal = stream(true);
    const told = progressBar(terminal as unknown as NodeJS.WriteStream, "horizon")!;
    for (let i = 1; i <= 1000; i++) told(i, 1000);
    expect(terminal.written.length).toBeLessThanOrEqual(42); // one a step of the bar
    expect(terminal.written[20]).toMatch(/^\rhorizon \[#{20} {20}\] 50 %$/);
    expect(terminal.written.at(-1)).toBe("\r\u001b[K");
  });
});
