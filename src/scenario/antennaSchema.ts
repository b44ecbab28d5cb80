import * as z from "zod";
import { reflectionFigures } from "../cover/reflectionFigures.ts";
import { group } from "./fields.ts";
import { describeRefusal, readQuantity } from "./quantity.ts";
import { quantity, uncertain } from "./quantityField.ts";
import { stationFields } from "./stationFields.ts";
import type { Dish, Feed } from "./types.ts";
import { instead } from "./wording.ts";

/** A mouth that looks up to an offset reflector, or down to one (common practice, no source). */
const facingWords = new Map([
  ["level", 0],
  ["up", 45],
  ["down", -45],
]);

const facing = z
  .union([z.string(), z.number()], {
    error: ({ input }) => instead(input, "level, up, down or an elevation in degrees"),
  })
  .meta({ description: "where the mouth looks: level, up, down, or an elevation such as 30 deg" })
  .transform((input, context) => {
    const word = facingWords.get(String(input));
    if (word !== undefined) return word;
    const reading = readQuantity(input, "angleDeg");
    if (reading.ok && Math.abs(reading.value) <= 90) return reading.value;
    const fault = reading.ok
      ? `read "${input}", expected an elevation from -90 to 90 deg`
      : describeRefusal(reading);
    context.addIssue({
      code: "custom",
      message: `${fault}; the words level, up and down are read too`,
      input,
    });
    return z.NEVER;
  });

const metres = (about: string) => quantity("lengthM", { about, range: [0.0005, 5] });

const pyramidalHorn = group(
  {
    guide_width: metres("broad side of the waveguide"),
    guide_height: metres("narrow side of the waveguide"),
    mouth_width: metres("side of the mouth along the guide's broad side"),
    mouth_height: metres("side of the mouth along the guide's narrow side"),
    slant_e: metres("apex to mouth in the E plane"),
    slant_h: metres("apex to mouth in the H plane"),
  },
  "a pyramidal horn by its measures",
).transform((horn) => ({
  guideAM: horn.guide_width,
  guideBM: horn.guide_height,
  apertureAM: horn.mouth_width,
  apertureBM: horn.mouth_height,
  slantEM: horn.slant_e,
  slantHM: horn.slant_h,
}));

const conicalHorn = group(
  { mouth: metres("diameter of the mouth"), slant: metres("apex to rim") },
  "a conical horn by its measures",
).transform(({ mouth, slant }) => ({ diameterM: mouth, slantM: slant }));

/** A feed, horn or other radiator whose mouth can be covered. */
export const feedSchema = group(
  {
    return_loss: uncertain("levelDb", { about: "return loss of the bare feed", range: [0.1, 80] }).optional(),
    vswr: quantity("ratio", {
      about: "voltage standing wave ratio of the bare feed",
      range: [1.001, 100],
    }).optional(),
    phase: quantity("angleDeg", {
      about: "phase of the feed's reflection seen from outside at its mouth",
      range: [-360, 360],
    }).optional(),
    edge_taper: quantity("levelDb", {
      about: "feed pattern down at the dish's rim",
      range: [0.1, 40],
    }).optional(),
    beamwidth_10db: quantity("angleDeg", {
      about: "full width of the pattern at -10 dB",
      range: [5, 179],
    }).optional(),
    gain: uncertain("gainDbi", { about: "gain of the feed by itself", range: [-3, 45] }).optional(),
    pyramidal_horn: pyramidalHorn.optional(),
    conical_horn: conicalHorn.optional(),
    aperture: quantity("thicknessMm", { about: "width of the mouth", range: [1, 5000] }).optional(),
    facing: facing.optional(),
  },
  "a feed: return_loss, and edge_taper for a dish or gain for use by itself",
  (has) => {
    if (!has("return_loss") && !has("vswr")) return "missing return_loss (or vswr) of the bare feed";
    if (has("return_loss") && has("vswr")) return "both return_loss and vswr; write one";
    if (has("edge_taper") && has("beamwidth_10db")) return "both edge_taper and beamwidth_10db; write one";
    const gains = (["gain", "pyramidal_horn", "conical_horn"] as const).filter(has);
    return gains.length > 1 ? "more than one of gain, pyramidal_horn and conical_horn; write one" : undefined;
  },
).transform((feed): Feed => {
  const { return_loss, vswr } = feed;
  return {
    returnLossDb: return_loss?.value ?? reflectionFigures({ vswr: vswr! }).returnLossDb,
    returnLossSpread: return_loss?.sigma === undefined ? undefined : return_loss,
    phaseDeg: feed.phase,
    edgeTaperDb: feed.edge_taper,
    tenDbWidthDeg: feed.beamwidth_10db,
    gainDbi: feed.gain,
    pyramidalHorn: feed.pyramidal_horn,
    conicalHorn: feed.conical_horn,
    apertureMm: feed.aperture,
    facingDeg: feed.facing ?? 0,
  };
});

/** A dish by its diameter, or by a gain that its user states. */
export const dishSchema = group(
  {
    diameter: quantity("lengthM", stationFields.diameter).optional(),
    focal_ratio: quantity("ratio", { about: "focal length over diameter", range: [0.251, 3] }).optional(),
    efficiency: quantity("percent", { about: "aperture efficiency", range: [1, 100] }).optional(),
    gain: uncertain("gainDbi", { about: "gain of dish and feed together", range: [5, 75] }).optional(),
    surface_rms: quantity("thicknessMm", { about: "rms error of the surface", range: [0, 50] }).optional(),
    other_losses: uncertain("levelDb", {
      about: "what a real dish loses beside: phase of the feed, struts, ohmic loss",
      range: [0, 10],
    }).optional(),
    blockage: quantity("lengthM", {
      about: "diameter of what stands before the dish",
      range: [0, 10],
    }).optional(),
    pointing_error: quantity("angleDeg", {
      about: "rms error of the aim in each axis",
      range: [0, 20],
    }).optional(),
    pointing_offset: quantity("angleDeg", {
      about: "known standing offset of the aim",
      range: [0, 20],
    }).optional(),
  },
  "a dish: diameter and focal_ratio, or diameter and efficiency, or gain",
  (has) => {
    if (!has("gain") && !has("diameter")) return "missing diameter (or gain) of the dish";
    const ways = (["focal_ratio", "efficiency", "gain"] as const).filter(has);
    if (ways.length === 0) return "missing focal_ratio, efficiency or gain of the dish";
    return ways.length > 1 ? "more than one of focal_ratio, efficiency and gain; write one" : undefined;
  },
).transform((dish, context): Dish => {
  const { diameter, focal_ratio, efficiency, gain } = dish;
  if (diameter !== undefined && (dish.blockage ?? 0) >= diameter) {
    const message = "read a blockage as wide as the dish, expected a smaller one";
    context.addIssue({ code: "custom", message, path: ["blockage"], input: dish.blockage });
    return z.NEVER;
  }
  return {
    diameterM: diameter,
    focalRatio: focal_ratio,
    efficiency: efficiency && efficiency / 100,
    gainDbi: gain,
    surfaceRmsMm: dish.surface_rms ?? 0,
    otherLossesDb: dish.other_losses ?? { value: 0 },
    blockageM: dish.blockage ?? 0,
    pointingErrorDeg: dish.pointing_error ?? 0,
    pointingOffsetDeg: dish.pointing_offset ?? 0,
  };
});
