import * as z from "zod";
import { group, named, text } from "./fields.ts";
import { quantity } from "./quantityField.ts";
import { instead } from "./wording.ts";

const level = (about: string) => quantity("levelDb", { about, range: [-300, 300] }).optional();
const returnLoss = (about: string) => quantity("levelDb", { about, range: [0.1, 100] });

/** A reading as typed: `readingsTable.ts` judges its cells. */
const row = group(
  {
    time: text("a time").optional(),
    order: text("a number").optional(),
    state: text("bare or the name of a cover"),
    level: text("a level in dB or dBm").optional(),
    return_loss: text("a return loss in dB").optional(),
    reflected: text("a level in dB or dBm").optional(),
    averages: text("a number").optional(),
    note: text("a note").optional(),
  },
  "a reading: time or order, state, level (or return_loss, reflected), averages, note",
);
export type TypedRow = z.output<typeof row>;

const coupler = group(
  {
    directivity: quantity("levelDb", { about: "directivity of the coupler", range: [7, 100] }),
    source_match: quantity("levelDb", { about: "return loss of its test port", range: [7, 100] }).optional(),
    open: level("level reflected by an open"),
    short: level("level reflected by a short"),
    pad_mismatch: quantity("levelDb", {
      about: "half-width by the mismatch of an attenuator",
      range: [0, 10],
    }).optional(),
  },
  "a coupler: directivity, source_match, open, short, pad_mismatch",
).transform(({ directivity, source_match, open, short, pad_mismatch }) => ({
  directivityDb: directivity,
  sourceMatchDb: source_match,
  openDb: open,
  shortDb: short,
  padMismatchDb: pad_mismatch,
}));

/** A file of bench readings; the table may stand in it or beside it, and sweeps are files of their own. */
export const readingsSchema = group(
  {
    title: text("the title of the readings").optional(),
    frequency: quantity("frequencyGHz", { about: "frequency", range: [0.1, 350] }).optional(),
    repeatability: quantity("levelDb", {
      about: "half-width to which the bench repeats",
      range: [0, 5],
    }).optional(),
    confidence: quantity("percent", { about: "level of confidence", range: [50, 99.99] }).optional(),
    wanted: quantity("levelDb", { about: "expanded uncertainty wanted", range: [0.001, 10] }).optional(),
    return_losses: named(returnLoss("return loss"), "return losses of bare and of the covers").optional(),
    coupler: coupler.optional(),
    table: text("the path of a CSV of readings").optional(),
    readings: z
      .array(row, { error: ({ input }) => instead(input, "a list of readings") })
      .meta({ description: "readings in order of time" })
      .optional(),
    sweeps: named(text("the path of a .s1p or .s2p file"), "sweeps of bare and of the covers").optional(),
  },
  "readings: frequency, readings (or table), sweeps, return_losses, coupler and more",
  (has) => {
    if (has("table") && has("readings")) return "both table and readings, expected one of them";
    return has("table") || has("readings") || has("sweeps")
      ? undefined
      : "missing readings (or table, sweeps)";
  },
).transform(({ frequency, repeatability, confidence, wanted, return_losses, ...rest }) => ({
  ...rest,
  frequencyGHz: frequency,
  repeatabilityDb: repeatability,
  confidence: confidence === undefined ? undefined : confidence / 100,
  wantedDb: wanted,
  returnLossesDb: return_losses ?? {},
}));
