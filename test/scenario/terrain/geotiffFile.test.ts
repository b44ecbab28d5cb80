import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { writeArrayBuffer } from "geotiff";
import { describe, expect, it } from "vitest";
import { openTerrain } from "../../../src/scenario/terrain/openTerrain.ts";
import { temporaryFolder } from "../../cli/run.ts";

const folder = temporaryFolder();
const file = "ground.tif";

const wgs84 = {
  width: 4,
  height: 3,
  ModelPixelScale: [0.1, 0.1, 0],
  ModelTiepoint: [0, 0, 0, 7, 47, 0],
  GTModelTypeGeoKey: 2,
  GeographicTypeGeoKey: 4326,
  GTRasterTypeGeoKey: 2,
};

/** Heights 100 row + 10 column, one of them unknown where asked. */
function write(metadata: object = {}, unknown?: number): void {
  const values = Array.from({ length: 12 }, (_, i) => 100 * Math.floor(i / 4) + 10 * (i % 4));
  if (unknown !== undefined) values[5] = unknown;
  const bytes = writeArrayBuffer(Float32Array.from(values), { ...wgs84, ...metadata });
  writeFileSync(join(folder, file), Buffer.from(bytes));
}

async function heights(latitudes: number[], longitudes: number[]) {
  const terrain = await openTerrain(file, folder);
  if (!terrain.ok) throw new Error(JSON.stringify(terrain.faults));
  return terrain.elevation!.heightsAt(latitudes, longitudes);
}

async function refusal(): Promise<string> {
  const terrain = await openTerrain(file, folder);
  return terrain.ok ? "taken" : `${terrain.faults[0]!.file}: ${terrain.faults[0]!.message}`;
}

describe("a GeoTIFF file", () => {
  it("gives the height of a sample where samples are points, and bilinear between", async () => {
    write();
    const { heightsM } = await heights([47, 46.9, 46.95, 46.85], [7, 7.2, 7.05, 7.15]);
    // Linear in both directions: 100 a row and 10 a column.
    for (const [i, heightM] of [0, 120, 55, 165].entries()) expect(heightsM[i]).toBeCloseTo(heightM, 6);
  });

  it("takes an area by its middle, half a step off", async () => {
    write({ GTRasterTypeGeoKey: 1 });
    const { heightsM } = await heights([46.95, 46.85], [7.05, 7.25]);
    expect(heightsM[0]).toBeCloseTo(0, 6);
    expect(heightsM[1]).toBeCloseTo(120, 6);
  });

  it("reads its place from a matrix just as from a scale and a corner", async () => {
    const { ModelPixelScale: _, ModelTiepoint: __, ...rest } = wgs84;
    const ModelTransformation = [0.1, 0, 0, 7, 0, -0.1, 0, 47, 0, 0, 0, 0, 0, 0, 0, 1];
    const values = Float32Array.from({ length: 12 }, (___, i) => 100 * Math.floor(i / 4) + 10 * (i % 4));
    writeFileSync(
      join(folder, file),
      Buffer.from(writeArrayBuffer(values, { ...rest, ModelTransformation })),
    );
    const { heightsM } = await heights([46.9], [7.2]);
    expect(heightsM[0]).toBeCloseTo(120, 6);
  });

  it("is one surface over the borders of the blocks in which it is read", async () => {
    const side = 1100; // a block and a bit
    const values = Float32Array.from({ length: side * side }, (_, i) => Math.floor(i / side) + (i % side));
    const metadata = { ...wgs84, width: side, height: side, ModelPixelScale: [0.001, 0.001, 0] };
    writeFileSync(join(folder, file), Buffer.from(writeArrayBuffer(values, metadata)));
    const rows = [0, 1023.5, 1024, 1024.5, 1099];
    const places = rows.flatMap((row) => rows.map((column) => ({ row, column })));
    const { heightsM } = await heights(
      places.map(({ row }) => 47 - 0.001 * row),
      places.map(({ column }) => 7 + 0.001 * column),
    );
    for (const [i, { row, column }] of places.entries()) expect(heightsM[i]).toBeCloseTo(row + column, 4);
  });

  it.each([
    ["its own no-data value", 1234, { GDAL_NODATA: "1234\0" }],
    ["a height that no place has", -9999, {}],
    ["not a number", Number.NaN, {}],
  ])("holds no height where it has %s", async (_, unknown, metadata) => {
    write(metadata, unknown);
    const { heightsM, unknown: why } = await heights([46.9, 46.9], [7.1, 7.2]);
    expect([...heightsM]).toEqual([Number.NaN, expect.closeTo(120, 4)]);
    expect(why.get(0)).toEqual({ reason: "void", source: file });
  });

  it("knows where it ends", async () => {
    write();
    const { unknown } = await heights([46.9, 48, 46.9], [6.99, 7.1, 7.31]);
    expect([...unknown.values()].map(({ reason }) => reason)).toEqual(["outside", "outside", "outside"]);
  });

  it.each([
    [
      { GTModelTypeGeoKey: 1, ProjectedCSTypeGeoKey: 32632 },
      /in another projection \(EPSG:32632\), expected latitude/,
    ],
    [{ GeographicTypeGeoKey: 4277 }, /on another datum \(EPSG:4277\)/],
    [{ ModelPixelScale: [0.1, -0.1, 0] }, /is turned/],
  ])("is refused with %j, with the reason", async (metadata, message) => {
    write(metadata);
    expect(await refusal()).toMatch(message);
  });

  it("is refused where it is a picture, cut or something else", async () => {
    const rgb = writeArrayBuffer(new Uint8Array(36), { ...wgs84, SamplesPerPixel: 3 });
    writeFileSync(join(folder, file), Buffer.from(rgb));
    expect(await refusal()).toMatch(/3 bands/);
    writeFileSync(join(folder, file), "no picture");
    expect(await refusal()).toMatch(/^ground\.tif: is no GeoTIFF that can be read/);
    expect(await openTerrain("none.tif", folder)).toMatchObject({ ok: false, faults: [{ code: "no_file" }] });
  });
});
