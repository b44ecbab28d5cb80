import type { GeoTIFF, GeoTIFFImage } from "geotiff";
import { HIGHEST_M, LOWEST_M, TerrainError, unreadable } from "./faults.ts";
import { degreesEast, type Grid } from "./grid.ts";
import { gridSource } from "./gridSource.ts";
import { METRES_PER_DEGREE } from "./hgtTile.ts";
import type { ElevationSource } from "./types.ts";

/** Steps along one side of a block; it shares its edge samples with its neighbours. */
const BLOCK = 1024;

/** A place this far beyond the last sample lies on it, rounded [steps]. */
const EDGE = 1e-6;

/** Blocks kept in memory, 4.2 MB each, 101 MB together. */
const MOST_BLOCKS = 24;

/** Codes of the GeoTIFF standard, OGC 19-008r4 (from memory). */
const GEOGRAPHIC_MODEL = 2;
const PIXEL_IS_POINT = 2;
const METRE = 9001;
/** WGS 84 by latitude and longitude, flat and with an ellipsoidal height axis, in the EPSG registry. */
const WGS84_CODES = [4326, 4979];

/**
 * Elevation from a GeoTIFF file: one band of heights in metres over latitude and longitude on WGS84.
 *
 * Read in blocks when first needed; memory is bounded at 101 MB. The file's own no-data value, NaN and heights that
 * no place has are unknown.
 *
 * @param path  of the file
 * @param name  as the user named it
 * @throws TerrainError on a file that is no GeoTIFF, is cut, or has another projection
 */
export async function geotiffSource(path: string, name: string): Promise<ElevationSource> {
  const found = await withImage(path, name, async (image) => ({
    raster: rasterOf(image),
    rows: image.getHeight(),
    columns: image.getWidth(),
    noData: image.getGDALNoData(),
  }));
  const { raster, rows, columns, noData } = found;
  if (typeof raster === "string") throw new TerrainError(name, "bad_geotiff", raster);
  const { north, west, degreesPerRow, degreesPerColumn } = raster;
  const blocksAcross = Math.ceil((columns - 1) / BLOCK);

  return gridSource({
    name,
    stepM: METRES_PER_DEGREE * degreesPerRow,
    mostGrids: MOST_BLOCKS,
    keyAt: (latitude, longitude) => {
      const row = (north - latitude) / degreesPerRow;
      const column = degreesEast(west, longitude) / degreesPerColumn;
      if (!(row > -EDGE && row < rows - 1 + EDGE && column < columns - 1 + EDGE)) return -1;
      const blockOf = (index: number, last: number) =>
        Math.floor(Math.min(Math.max(index, 0), last - 1) / BLOCK);
      return blockOf(row, rows - 1) * blocksAcross + blockOf(column, columns - 1);
    },
    nameOf: () => name,
    read: async (key): Promise<Grid> => {
      const top = BLOCK * Math.floor(key / blocksAcross);
      const left = BLOCK * (key % blocksAcross);
      const [bottom, right] = [Math.min(top + BLOCK + 1, rows), Math.min(left + BLOCK + 1, columns)];
      const heights = await withImage(path, name, (image) =>
        image.readRasters({ window: [left, top, right, bottom], samples: [0], interleave: true }),
      );
      const possible = (heightM: number) =>
        heightM !== noData && heightM >= LOWEST_M && heightM <= HIGHEST_M ? heightM : UNKNOWN_M;
      return {
        heightsM: Float32Array.from(heights as ArrayLike<number>, possible),
        rows: bottom - top,
        columns: right - left,
        north: north - top * degreesPerRow,
        west: west + left * degreesPerColumn,
        rowsPerDegree: 1 / degreesPerRow,
        columnsPerDegree: 1 / degreesPerColumn,
        voidM: UNKNOWN_M,
      };
    },
  });
}

/** Opens the file, hands its first image over and closes the file again, whatever comes of it. */
async function withImage<T>(
  path: string,
  name: string,
  use: (image: GeoTIFFImage) => Promise<T>,
): Promise<T> {
  const { fromFile } = await import("geotiff");
  let file: GeoTIFF | undefined;
  try {
    file = await fromFile(path);
    return await use(await file.getImage());
  } catch (error) {
    if (typeof (error as NodeJS.ErrnoException).code === "string") throw unreadable(name, error);
    throw new TerrainError(
      name,
      "bad_geotiff",
      `is no GeoTIFF that can be read (${(error as Error).message})`,
    );
  } finally {
    file?.close();
  }
}

/** Stands in a block where the file knows no height. */
const UNKNOWN_M = -32768;

/** Where the samples of an image lie, latitude and longitude of the first one and steps [deg]. */
interface Raster {
  readonly north: number;
  readonly west: number;
  readonly degreesPerRow: number;
  readonly degreesPerColumn: number;
}

/** The raster of an image, or why its heights cannot be placed on the map. */
function rasterOf(image: GeoTIFFImage): Raster | string {
  const keys = image.getGeoKeys() ?? {};
  const expected = "expected latitude and longitude on WGS84 (EPSG:4326)";
  const model = keys.GTModelTypeGeoKey;
  if (model === undefined) return `does not say where on the Earth it lies, ${expected}`;
  if (model !== GEOGRAPHIC_MODEL) {
    const code = keys.ProjectedCSTypeGeoKey;
    return `is in another projection${code === undefined ? "" : ` (EPSG:${code})`}, ${expected}`;
  }
  const datum = keys.GeographicTypeGeoKey;
  if (!WGS84_CODES.includes(datum)) return `is on another datum (EPSG:${datum ?? "not stated"}), ${expected}`;
  const unit = keys.VerticalUnitsGeoKey ?? METRE;
  if (unit !== METRE) return `has heights in another unit (EPSG:${unit}), expected metres`;
  const bands = image.getSamplesPerPixel();
  if (bands !== 1) return `has ${bands} bands, expected one of heights; is it a picture?`;
  if (image.getWidth() < 2 || image.getHeight() < 2) return "is less than two pixels wide or high";

  const corner = cornerOf(image);
  if (corner === undefined) return "does not say where its corner lies and how large its pixels are";
  if (corner.turned || !(corner.degreesPerRow > 0 && corner.degreesPerColumn > 0)) {
    return "is turned, expected rows from west to east and the northern one first";
  }
  // The height of a pixel that is an area stands for its middle.
  const half = keys.GTRasterTypeGeoKey === PIXEL_IS_POINT ? 0 : 0.5;
  const { degreesPerRow, degreesPerColumn } = corner;
  const north = corner.north - half * degreesPerRow;
  const west = corner.west + half * degreesPerColumn;
  return { north, west, degreesPerRow, degreesPerColumn };
}

/** Corner and steps by either of the two ways in which a file may state them. */
function cornerOf(image: GeoTIFFImage): (Raster & { readonly turned: boolean }) | undefined {
  const numbers = (tag: "ModelPixelScale" | "ModelTiepoint" | "ModelTransformation") =>
    image.fileDirectory.getValue(tag) as ArrayLike<number> | undefined;
  const scale = numbers("ModelPixelScale");
  const tie = numbers("ModelTiepoint");
  if (scale && tie?.length === 6) {
    const [degreesPerColumn, degreesPerRow] = [scale[0]!, scale[1]!];
    const north = tie[4]! + tie[1]! * degreesPerRow;
    return {
      north,
      west: tie[3]! - tie[0]! * degreesPerColumn,
      degreesPerRow,
      degreesPerColumn,
      turned: false,
    };
  }
  const matrix = numbers("ModelTransformation");
  if (matrix === undefined) return undefined;
  return {
    north: matrix[7]!,
    west: matrix[3]!,
    degreesPerRow: -matrix[5]!,
    degreesPerColumn: matrix[0]!,
    turned: matrix[1] !== 0 || matrix[4] !== 0,
  };
}
