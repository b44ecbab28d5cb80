import { describe, expect, it } from "vitest";
import {
  findMaterial,
  type Material,
  materials,
  uvClasses,
  wettingOfContactAngle,
} from "../../src/cover/materials.ts";
import { describeReference, num, type Row } from "../reference.ts";

describe("table of materials", () => {
  // Riddle, Baker-Jarvis, Krupka 2003, IEEE Trans. MTT 51, 727: figures near 10 GHz.
  it.each([
    ["PTFE sheet", 2.05, 0.0002],
    ["acrylic (PMMA)", 2.61, 0.01],
    ["polypropylene", 2.27, 0.0001],
    ["HDPE", 2.37, 0.0002],
    ["ABS (moulded)", 2.7, 0.008],
    ["rigid PVC (uPVC)", 2.71, 0.006],
    ["polystyrene (rigid, crosslinked)", 2.54, 0.0005],
  ])("%s spans the published %d / %d", (name, permittivity, lossTangent) => {
    const material = findMaterial(name)!;
    expect(material.permittivity.low).toBeLessThanOrEqual(permittivity);
    expect(material.permittivity.high).toBeGreaterThanOrEqual(permittivity);
    expect(material.lossTangent.low).toBeLessThanOrEqual(lossTangent);
    expect(material.lossTangent.high).toBeGreaterThanOrEqual(lossTangent);
  });

  it.each(materials.map((material) => [material.name, material] as const))("%s is whole", (_, material) => {
    for (const { low, nominal, high } of [material.permittivity, material.lossTangent]) {
      expect(low).toBeGreaterThanOrEqual(0);
      expect(nominal).toBeGreaterThanOrEqual(low);
      expect(high).toBeGreaterThanOrEqual(nominal);
    }
    expect(material.permittivity.low).toBeGreaterThanOrEqual(1);
    expect(material.frequencyGHz).toBeGreaterThan(0);
    expect(Number.isFinite(material.temperatureC)).toBe(true);
    expect(["published", "published range", "partly published", "memory", "estimate", "model"]).toContain(
      material.confidence,
    );
    expect(material.source).not.toBe("");
    expect(material.wetting ?? "mixed").toMatch(/^(beading|mixed|wetting)$/);
    expect(material.uvWords).toBe(material.uvClass && uvClasses[material.uvClass]);
    const figures = [
      material.waterUptakePercent,
      material.serviceMinC,
      material.serviceMaxC,
      material.contactAngleDeg,
    ];
    for (const figure of figures) expect(figure ?? 0).not.toBeNaN();
    expect(material.serviceMaxC ?? 1).toBeGreaterThan(material.serviceMinC ?? 0);
  });

  it("wets as its contact angle says, but for two that stand on the border", () => {
    const odd = materials.filter(
      ({ contactAngleDeg, wetting }) =>
        contactAngleDeg !== undefined &&
        wetting !== undefined &&
        wetting !== wettingOfContactAngle(contactAngleDeg),
    );
    expect(odd.map(({ name, contactAngleDeg }) => [name, contactAngleDeg])).toEqual([
      ["plasticised PVC (vinyl sheet or tape)", 80],
      ["UHMWPE", 94],
    ]);
  });

  it("gives no word to two materials", () => {
    const words = materials.flatMap(({ name, aliases }) => [name, ...aliases]);
    const folded = words.map((word) => word.toLowerCase().replace(/[\s-]+/g, ""));
    // An alias may differ from its own name by case or hyphens only; two materials must not share one.
    for (const material of materials) {
      for (const word of [material.name, ...material.aliases]) expect(findMaterial(word)).toBe(material);
    }
    expect(new Set(folded).size).toBe(folded.length);
  });

  it.each([
    ["fep", "FEP film"],
    ["FEP  Film", "FEP film"],
    ["pmma", "acrylic (PMMA)"],
    ["FR4", "epoxy/glass FR-4 or G10"],
    ["petg", "PETG"],
    ["window glass", "soda-lime window glass"],
  ])("knows %s as %s", (typed, name) => expect(findMaterial(typed)?.name).toBe(name));

  it("knows no material of an unknown name", () => expect(findMaterial("unobtainium")).toBeUndefined());
});

describeReference("covers/materials.csv", (row: Row) => {
  const material = findMaterial(row["material"]!)!;
  expect(material?.name).toBe(row["material"]);
  const columns: [string, (material: Material) => number | undefined][] = [
    ["eps_r", (it) => it.permittivity.nominal],
    ["eps_low", (it) => it.permittivity.low],
    ["eps_high", (it) => it.permittivity.high],
    ["tan_d", (it) => it.lossTangent.nominal],
    ["tan_low", (it) => it.lossTangent.low],
    ["tan_high", (it) => it.lossTangent.high],
    ["f_ghz", (it) => it.frequencyGHz],
    ["t_c", (it) => it.temperatureC],
    ["water_24h_pct", (it) => it.waterUptakePercent],
    ["service_min_c", (it) => it.serviceMinC],
    ["service_max_c", (it) => it.serviceMaxC],
    ["contact_angle_deg", (it) => it.contactAngleDeg],
  ];
  for (const [column, value] of columns) {
    const expected = row[column] === "" ? undefined : num(row, column);
    expect(value(material), `${material.name} ${column}`).toBe(expected);
  }
  expect(material.uvClass ?? "-").toBe(row["uv_class"]);
});
