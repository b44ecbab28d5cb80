import { z } from "zod";
import { locatorToPoint } from "../path/locator.ts";
import { type Axis, readCoordinate } from "./coordinates.ts";
import { group, text } from "./fields.ts";
import { describeRefusal } from "./quantity.ts";
import { quantity, shown } from "./quantityField.ts";
import type { Site } from "./types.ts";

function coordinate(axis: Axis) {
  return z
    .union([z.string(), z.number()], { error: ({ input }) => `read ${shown(input)}; expected a ${axis}` })
    .meta({ description: `${axis} on WGS84: 53.43, 53.43 N or 53°25'48" N` })
    .transform((input, context) => {
      const reading = readCoordinate(input, axis);
      if (reading.ok) return reading.degrees;
      context.addIssue({ code: "custom", message: describeRefusal(reading), input });
      return z.NEVER;
    });
}

const locator = text("a locator of 4 to 10 characters, such as IO84wb20").transform((written, context) => {
  try {
    if (written.length < 4) throw new RangeError(`locator "${written}" must have 4 to 10 characters`);
    return { written, cell: locatorToPoint(written) };
  } catch (error) {
    context.addIssue({ code: "custom", message: (error as RangeError).message, input: written });
    return z.NEVER;
  }
});

/** One end's place: by locator or by latitude and longitude. */
export const siteSchema = group(
  {
    name: text("name of the place").optional(),
    locator: locator.optional(),
    latitude: coordinate("latitude").optional(),
    longitude: coordinate("longitude").optional(),
    ground: quantity("lengthM", { about: "ground above sea level", range: [-450, 9000] }),
    height: quantity("lengthM", { about: "antenna above ground", range: [0, 1000] }),
  },
  "a place: locator, or latitude and longitude; ground; height",
).transform((site, context): Site => {
  const { name, latitude, longitude, ground: groundM, height: heightM } = site;
  const common = { name, groundM, heightM };
  const hasPoint = latitude !== undefined && longitude !== undefined;
  if (site.locator && (latitude ?? longitude) === undefined) {
    const { written, cell } = site.locator;
    return {
      ...common,
      latitude: cell.latitude,
      longitude: cell.longitude,
      locator: written,
      positionErrorKm: cell.halfDiagonalKm,
    };
  }
  if (!site.locator && hasPoint) return { ...common, latitude, longitude, positionErrorKm: 0 };
  const message = site.locator
    ? "both a locator and coordinates; write one of them"
    : "expected a locator, or latitude and longitude";
  context.addIssue({ code: "custom", message, input: site });
  return z.NEVER;
});
