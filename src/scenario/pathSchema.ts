import * as z from "zod";
import { geodesicPath } from "../path/geodesic.ts";
import { group, text } from "./fields.ts";
import { quantity } from "./quantityField.ts";
import { samePlace, siteSchema } from "./siteSchema.ts";
import { LONGEST_PATH_KM } from "./terrain/sampleProfile.ts";
import type { ScenarioPath } from "./types.ts";

const trees = (end: string) =>
  quantity("lengthM", { about: `length of the ray within trees near ${end}`, range: [0, 400] }).optional();

const toCoast = (end: string) =>
  quantity("distanceKm", {
    about: `distance over land to the coast from ${end}`,
    range: [0, 500],
  }).optional();

/** From where to where, over what ground and in what air. */
export const pathSchema = group(
  {
    from: siteSchema,
    to: siteSchema,
    terrain: text("the path of a terrain file, or of a folder of elevation tiles").optional(),
    k: quantity("ratio", {
      about: "effective Earth radius over the true one on the usual day (default 4/3)",
      range: [0.3, 20],
    }).optional(),
    k_low: quantity("ratio", {
      about: "the same on a day when rays bend least (default 2/3)",
      range: [0.3, 20],
    }).optional(),
    refractivity: group(
      {
        N0: quantity("ratio", {
          about: "median refractivity at sea level in N-units (default 325)",
          range: [200, 500],
        }).optional(),
        dN: quantity("ratio", {
          about: "median fall of refractivity over the lowest kilometre in N-units (default: that of k)",
          range: [-100, 150],
        }).optional(),
      },
      "the refractivity: N0 and dN",
    ).optional(),
    foliage: group({ from: trees("from"), to: trees("to") }, "trees near the ends: from and to").optional(),
    coast: group({ from: toCoast("from"), to: toCoast("to") }, "the coast: from and to").optional(),
  },
  "the path: from (the transmitter) and to (the receiver)",
).transform(
  ({ from, to, terrain, k, k_low: kLow, refractivity = {}, foliage, coast }, context): ScenarioPath => {
    if (samePlace(from, to)) {
      const message = "the same place as from, expected another one";
      context.addIssue({ code: "custom", message, path: ["to"], input: to });
      return z.NEVER;
    }
    const { distanceKm } = geodesicPath(from, to);
    if (distanceKm > LONGEST_PATH_KM) {
      const message =
        `a path of ${distanceKm.toFixed(0)} km, expected at most ${LONGEST_PATH_KM} km ` +
        "(check the sign of the longitudes)";
      context.addIssue({ code: "custom", message, path: ["to"], input: to });
      return z.NEVER;
    }
    if (k !== undefined && kLow !== undefined && kLow > k) {
      const message = `k_low is above k, expected at most ${Number(k.toPrecision(4))}`;
      context.addIssue({ code: "custom", message, path: ["k_low"], input: kLow });
      return z.NEVER;
    }
    const foliageM = foliage && { from: foliage.from ?? 0, to: foliage.to ?? 0 };
    return { from, to, terrain, k, kLow, ...refractivity, foliageM, coastKm: coast };
  },
);
