import * as z from "zod";
import { EARTH_RADIUS_KM, RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { locatorToPoint } from "../path/locator.ts";
import { type Axis, readCoordinate } from "./coordinates.ts";
import { group, text } from "./fields.ts";
import { describeRefusal } from "./quantity.ts";
import { quantity } from "./quantityField.ts";
import { stationFields } from "./stationFields.ts";
import type { Site } from "./types.ts";
import { instead, shown } from "./wording.ts";

function coordinate(axis: Axis) {
  return z
    .union([z.string(), z.number()], { error: ({ input }) => instead(input, `a ${axis}`) })
    .meta({ description: `${axis} on WGS84: 53.43, 53.43 N or 53°25'48" N` })
    .transform((input, context) => {
      const reading = readCoordinate(input, axis);
      if (reading.ok) return reading.degrees;
      context.addIssue({ code: "custom", message: describeRefusal(reading), input });
      return z.NEVER;
    });
}

const LOCATOR = "a locator of 4 to 10 characters, such as IO84wb20";

const locator = text(LOCATOR).transform((written, context) => {
  try {
    if (written.length < 4)
      throw new RangeError(`locator ${shown(written)} is too coarse, expected ${LOCATOR}`);
    return { written, cell: locatorToPoint(written) };
  } catch (error) {
    context.addIssue({ code: "custom", message: (error as RangeError).message, input: written });
    return z.NEVER;
  }
});

/** One end's place: by locator or by latitude and longitude. */
export const siteSchema = group(
  {
    name: text("the name of the place").optional(),
    locator: locator.optional(),
    latitude: coordinate("latitude").optional(),
    longitude: coordinate("longitude").optional(),
    ground: quantity("lengthM", stationFields.ground),
    height: quantity("lengthM", stationFields.height),
  },
  "a place: locator, or latitude and longitude; ground; height",
  (has) => {
    if (has("locator")) {
      const both = has("latitude") || has("longitude");
      return both ? "both a locator and coordinates; write one of them" : undefined;
    }
    if (has("latitude") && has("longitude")) return undefined;
    return has("latitude")
      ? "missing longitude beside the latitude"
      : has("longitude")
        ? "missing latitude beside the longitude"
        : "missing locator, or latitude and longitude";
  },
).transform(({ name, locator, latitude, longitude, ground: groundM, height: heightM }): Site => {
  const common = { name, groundM, heightM };
  if (!locator) return { ...common, latitude: latitude!, longitude: longitude!, positionErrorKm: 0 };
  const { written, cell } = locator;
  return {
    ...common,
    latitude: cell.latitude,
    longitude: cell.longitude,
    locator: written,
    positionErrorKm: cell.halfDiagonalKm,
  };
});

/** Below this two places are one, typed twice [km]. */
const SHORTEST_PATH_KM = 0.001;

/** Whether two sites are one place, be it by a pole or by the date line; such a path has no heading. */
export function samePlace(a: Site, b: Site): boolean {
  const [p, q] = [onSphere(a), onSphere(b)];
  const chord = Math.hypot(...p.map((x, i) => x - q[i]!));
  return chord * EARTH_RADIUS_KM < SHORTEST_PATH_KM;
}

function onSphere({ latitude, longitude }: Site): number[] {
  const [phi, lambda] = [latitude * RADIANS_PER_DEGREE, longitude * RADIANS_PER_DEGREE];
  return [Math.cos(phi) * Math.cos(lambda), Math.cos(phi) * Math.sin(lambda), Math.sin(phi)];
}
