import type { Bounded } from "../cover/bounded.ts";
import type { Material } from "../cover/materials.ts";
import { grid } from "./grid.ts";
import { type Paint, paragraph, plain } from "./words.ts";

/** Permittivity or loss tangent with its published spread. */
function spread({ nominal, low, high }: Bounded): string {
  return low === high ? String(nominal) : `${nominal} (${low}-${high})`;
}

/** All materials in a table, then where their figures come from. */
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
  const sources = materials.map(({ name, source, confidence }) =>
    paragraph(`${name}: ${source} (${confidence})`, "  "),
  );
  return `${[
    paint("strong", "Cover materials, value (low-high)"),
    table,
    [
      paragraph(
        "A years bare; B years if stabilised or pigmented; C one or two seasons; D needs a skin",
        "sun:   ",
      ),
      paragraph("how it lies on a clean new surface; dirt and weather take it towards wetting", "water: "),
    ].join("\n"),
    [paint("strong", "Sources"), ...sources].join("\n"),
  ].join("\n\n")}\n`;
}
