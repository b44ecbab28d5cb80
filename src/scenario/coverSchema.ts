import * as z from "zod";
import { type Bounded, exactly } from "../cover/bounded.ts";
import { findMaterial } from "../cover/materials.ts";
import { mixture } from "../cover/mixture.ts";
import { wetModels } from "../cover/wetModels.ts";
import { group, oneOf, text } from "./fields.ts";
import { materialHint } from "./materialsMeant.ts";
import { quantity, uncertain } from "./quantityField.ts";
import type { Cover, CoverLayer, Uncertain } from "./types.ts";
import { instead, shown } from "./wording.ts";

/** A figure typed by the user: its spread, where one was typed, bounds it. */
function spreadOf({ value, sigma = 0 }: Uncertain, lowest: number): Bounded {
  return { nominal: value, low: Math.max(lowest, value - sigma), high: value + sigma };
}

const layer = group(
  {
    material: text("a material of `oilskin materials`, air, or a name of your own with its permittivity"),
    thickness: uncertain("thicknessMm", {
      about: "thickness of the layer",
      range: [0, 1000],
      normalOnly: true,
    }),
    fill: quantity("percent", {
      about: "share of solid material, the rest being air",
      range: [0.1, 100],
    }).optional(),
    permittivity: uncertain("ratio", { about: "relative permittivity", range: [1, 200] }).optional(),
    loss_tangent: uncertain("ratio", { about: "loss tangent", range: [0, 10] }).optional(),
  },
  "a layer: material and thickness",
).transform(({ material, thickness, fill, permittivity, loss_tangent }, context): CoverLayer => {
  const known = material === "air" ? undefined : findMaterial(material);
  // As likely anywhere between two ends is how a published range is taken too; beside figures with a sigma it has one.
  const range =
    thickness.sigma === undefined && loss_tangent?.sigma === undefined ? permittivity?.scatter : undefined;
  const eps =
    permittivity &&
    (range?.kind === "flat"
      ? { nominal: permittivity.value, low: range.low, high: range.high }
      : spreadOf(permittivity, 1));
  const loss = loss_tangent && spreadOf(loss_tangent, 0);
  const spreads = [thickness, permittivity, loss_tangent].map((figure) => figure?.sigma);
  const common = {
    thicknessMm: thickness.value,
    thicknessSigmaMm: thickness.sigma,
    statedSpread: (range?.kind !== "flat" && spreads.some((sigma) => sigma !== undefined)) || undefined,
    statedLossTangent: loss_tangent?.sigma !== undefined || undefined,
  };
  if (material === "air") {
    return { material, ...common, permittivity: eps ?? exactly(1), lossTangent: loss ?? exactly(0) };
  }
  if (known === undefined && eps === undefined) {
    const expected = "expected a known material or a permittivity beside it";
    const message = `read ${shown(material)}, ${expected}${materialHint(material)}`;
    context.addIssue({ code: "custom", message, path: ["material"], input: material });
    return z.NEVER;
  }
  const solid = {
    permittivity: eps ?? known!.permittivity,
    lossTangent: loss ?? known?.lossTangent ?? exactly(0),
  };
  return {
    material: known?.name ?? material,
    ...common,
    ...(fill === undefined ? solid : filled(solid, fill / 100)),
  };
});

/** Foam, cloth or printed infill: the solid and the air in it, bound by bound. */
function filled(solid: Pick<CoverLayer, "permittivity" | "lossTangent">, solidShare: number) {
  const at = (figure: keyof Bounded) =>
    mixture({ permittivity: solid.permittivity[figure], lossTangent: solid.lossTangent[figure], solidShare });
  const [low, nominal, high] = [at("low"), at("nominal"), at("high")];
  const of = (part: "permittivity" | "lossTangent"): Bounded => ({
    low: low[part],
    nominal: nominal[part],
    high: high[part],
  });
  return { permittivity: of("permittivity"), lossTangent: of("lossTangent") };
}

const measured = group(
  {
    insertion_loss: uncertain("levelDb", { about: "measured insertion loss", range: [-10, 60] }).optional(),
    return_loss_change: uncertain("levelDb", {
      about: "bare return loss less covered return loss, positive where the cover spoils the match",
      range: [-60, 60],
    }).optional(),
    source: text("where the figures come from, such as the file of the readings").optional(),
    // `coverReadings.ts` has put figures in its place before this schema sees it.
    readings: text(
      "the path of a table of readings, from this file's folder, in place of figures",
    ).optional(),
  },
  "a measured cover: insertion_loss, return_loss_change, source, or readings",
  (has) =>
    has("insertion_loss") || has("readings")
      ? undefined
      : "missing insertion_loss (or readings, a table of them), expected a ratio with a unit, such as 0.25 dB",
);

/** A cover of a feed's mouth; with neither layers nor readings it is bare. */
export const coverSchema = group(
  {
    layers: z
      .array(layer, { error: ({ input }) => instead(input, "a list of layers, feed side first") })
      .min(1, "an empty list, expected one layer or more; {} is a bare mouth")
      .meta({ description: "layers of the cover, feed side first" })
      .optional(),
    measured: measured.optional(),
    surface: oneOf(["wetting", "beading", "mixed"], "how water lies on the outside").optional(),
    state: oneOf(["new", "weathered", "treated"], "state of the surface").optional(),
    wet_model: oneOf(wetModels, "model of the water on it").optional(),
    gap: quantity("thicknessMm", {
      about: "distance from the mouth to the cover",
      range: [0, 1000],
    }).optional(),
    dome_radius: quantity("thicknessMm", {
      about: "radius of a dome bulging outwards",
      range: [5, 10000],
    }).optional(),
    slope_length: quantity("thicknessMm", {
      about: "length down which water runs",
      range: [1, 10000],
    }).optional(),
  },
  "a cover: layers or measured, and its surface; {} is a bare mouth",
).transform(
  ({
    layers = [],
    measured,
    surface,
    state = "new",
    wet_model: wetModel,
    gap: gapMm = 0,
    slope_length: slopeMm,
    dome_radius: domeRadiusMm,
  }): Cover => {
    const outermost = layers.at(-1);
    return {
      layers,
      measured: measured?.insertion_loss && {
        insertionLossDb: measured.insertion_loss,
        returnLossChangeDb: measured.return_loss_change,
        source: measured.source,
      },
      surface: surface ?? (outermost && findMaterial(outermost.material)?.wetting) ?? "mixed",
      state,
      wetModel,
      gapMm,
      slopeMm,
      domeRadiusMm,
    };
  },
);
