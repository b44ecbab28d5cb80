import { type Material, uvClasses } from "../cover/materials.ts";
import { grid } from "./grid.ts";
import { heatWords, spread, sunWords, waterWords } from "./materialWords.ts";
import { type Paint, paragraph, plain } from "./words.ts";

/** All materials in a table, then each one's life outdoors and where its figures come from. */
export async function materialsText(materials: readonly Material[], paint: Paint = plain): Promise<string> {
  const rows = materials.map((material) => [
    material.name,
    spread(material.permittivity),
    spread(material.lossTangent),
    material.uvClass ?? "-",
    material.wetting ?? "-",
  ]);
  const table = await grid(
    [["material", "permittivity", "loss tangent", "sun", "water"], ...rows],
    [
      { align: "left", width: 24 },
      { align: "left", width: 15 },
      { align: "left", width: 22 },
      { align: "left", width: 3 },
      { align: "left", width: 8 },
    ],
  );
  const classes = Object.entries(uvClasses).map(([letter, words]) => `${letter} ${words}`);
  return `${[
    paint("strong", "Cover materials, value (low-high)"),
    table,
    `${paragraph(`sun: ${classes.join("; ")}`)}\n` +
      paragraph("water: how it lies on a clean new surface; dirt and weather take it towards wetting"),
    [paint("strong", "Outdoors, and where the figures come from"), ...materials.map(lifeText)].join("\n"),
    paragraph("`oilskin materials NAME` tells all of one: temperatures, notes, thicknesses, how to fix it."),
  ].join("\n\n")}\n`;
}

function lifeText(material: Material): string {
  const { name, source, confidence, weatherSource } = material;
  const life =
    weatherSource === undefined
      ? ""
      : `${sunWords(material)}; ${waterWords(material)}; ${heatWords(material)} (${weatherSource}). `;
  return paragraph(`${name}: ${life}Figures: ${source} (${confidence}).`, "  ");
}
