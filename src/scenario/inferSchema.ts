import * as z from "zod";
import { exactly } from "../cover/bounded.ts";
import { findMaterial } from "../cover/materials.ts";
import { group, named, text } from "./fields.ts";
import { materialHint } from "./materialsMeant.ts";
import { quantity, uncertain } from "./quantityField.ts";
import { shown } from "./wording.ts";

const returnLoss = (about: string) => quantity("levelDb", { about, range: [0.1, 60] });
const insertionLoss = quantity("levelDb", { about: "insertion loss", range: [-10, 60] });
const thickness = uncertain("thicknessMm", { about: "thickness of the sheet", range: [0.001, 1000] });
const gap = quantity("thicknessMm", { about: "distance from the mouth to the sheet", range: [0, 1000] });

const knownSheet = group(
  {
    material: text("a material of `oilskin materials`, or a name of your own with its permittivity"),
    permittivity: uncertain("ratio", { about: "relative permittivity", range: [1.01, 200] }).optional(),
    loss_tangent: quantity("ratio", { about: "loss tangent", range: [0, 10] }).optional(),
    thickness,
    gap: gap.optional(),
    return_loss: returnLoss("return loss with the sheet").optional(),
    insertion_loss: insertionLoss.optional(),
  },
  "a known sheet: material, thickness, gap, return_loss, insertion_loss",
  (has) =>
    has("return_loss") || has("insertion_loss")
      ? undefined
      : "missing return_loss (or insertion_loss): nothing was read with this sheet",
).transform(({ material, permittivity, loss_tangent, thickness, gap = 0, ...read }, context) => {
  const known = findMaterial(material);
  if (known === undefined && permittivity === undefined) {
    const expected = "expected a known material or a permittivity beside it";
    const message = `read ${shown(material)}, ${expected}${materialHint(material)}`;
    context.addIssue({ code: "custom", message, path: ["material"], input: material });
    return z.NEVER;
  }
  const published = known?.permittivity ?? exactly(0);
  return {
    layer: {
      permittivity: permittivity?.value ?? published.nominal,
      lossTangent: loss_tangent ?? known?.lossTangent.nominal ?? 0,
      thicknessMm: thickness.value,
    },
    // Published bounds are taken for limits between which all is as likely.
    permittivityStandard: permittivity
      ? (permittivity.sigma ?? 0)
      : (published.high - published.low) / 2 / Math.sqrt(3),
    thicknessStandardMm: thickness.sigma ?? 0,
    gapMm: gap,
    coveredReturnLossDb: read.return_loss,
    insertionLossDb: read.insertion_loss,
  };
});

const unknownSheet = group(
  {
    thickness,
    gap: gap.optional(),
    return_loss: returnLoss("return loss with the sheet"),
    insertion_loss: insertionLoss.optional(),
    loss_tangent: quantity("ratio", {
      about: "loss tangent, where no loss was read",
      range: [0, 10],
    }).optional(),
    permittivity_up_to: quantity("ratio", {
      about: "largest permittivity to think of",
      range: [1.1, 100],
    }).optional(),
  },
  "an unknown sheet: thickness, gap, return_loss, insertion_loss, loss_tangent, permittivity_up_to",
).transform(({ thickness, gap = 0, return_loss, insertion_loss, loss_tangent, permittivity_up_to = 12 }) => ({
  thicknessMm: thickness.value,
  thicknessStandardMm: thickness.sigma ?? 0,
  gapMm: gap,
  coveredReturnLossDb: return_loss,
  insertionLossDb: insertion_loss,
  lossTangent: loss_tangent,
  permittivityUpTo: permittivity_up_to,
}));

const feed = group(
  {
    return_loss: returnLoss("return loss of the bare feed").optional(),
    phase: uncertain("angleDeg", {
      about: "phase of its reflection seen from outside, at its mouth",
      range: [-360, 360],
    }).optional(),
  },
  "the feed: return_loss, phase",
);

/** A file from which a feed or a sheet is to be inferred. */
export const inferSchema = group(
  {
    title: text("the title of the readings").optional(),
    frequency: quantity("frequencyGHz", { about: "frequency", range: [0.1, 350] }),
    feed: feed.optional(),
    sheets: named(knownSheet, "the known sheets").optional(),
    unknown: named(unknownSheet, "the sheets of unknown material").optional(),
    return_loss_uncertainty: quantity("levelDb", {
      about: "standard uncertainty of a return loss",
      range: [0.001, 10],
    }).optional(),
    loss_uncertainty: quantity("levelDb", {
      about: "standard uncertainty of an insertion loss",
      range: [0.001, 10],
    }).optional(),
  },
  "frequency, feed, sheets (known ones), unknown (sheets of unknown material)",
  (has) =>
    has("sheets") || has("unknown")
      ? undefined
      : "missing sheets (known ones, to find the feed) or unknown (sheets to find)",
);
