import { expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import { pathText } from "../../src/report/pathText.ts";
import { profileDrawing } from "../../src/report/profileDrawing.ts";
import { pathStudy } from "../../src/study/pathStudy.ts";
import { eastOnEquator, scenarioOf, siteOf } from "../budget/scenarios.ts";

const distancesKm = Array.from({ length: 61 }, (_, km) => km);

async function drawn(heightAtKm: (km: number) => number, coverAtKm?: (km: number) => number) {
  const coverM = coverAtKm && distancesKm.map(coverAtKm);
  const profile = { distancesKm, heightsM: distancesKm.map(heightAtKm), coverM };
  const link = prepare(scenarioOf({ path: { from: siteOf(), to: eastOnEquator(60), profile } }));
  const study = await pathStudy(link, "cw", ["dry"], new Date("2026-07-01"));
  return { text: profileDrawing(study), report: pathText(study, link) };
}

const ridge = (km: number) => (km % 60 === 0 ? 500 : km === 45 ? 900 : 0);

it("puts a ridge where it stands, over the ray, with its number on top", async () => {
  const { text } = await drawn(ridge);
  const lines = text.split("\n");
  // Seventy-two columns after a margin of eight: three quarters of the way are column 8 + 0.75 * 71.
  const column = 8 + Math.round(0.75 * 71);
  const numbered = lines.findIndex((line) => line[column] === "1");
  expect(lines[numbered + 1]![column]).toBe("#");
  expect(lines.findIndex((line) => line.includes("*"))).toBeGreaterThan(numbered + 1);
  expect(lines.at(-3)).toMatch(/^ +0 +15 +30 +45 +60$/);
});

it("tells trees from ground, and only where there are some", async () => {
  const wooded = await drawn(ridge, (km) => (km > 20 && km < 30 ? 120 : 0));
  expect(wooded.text.split("\n").filter((line) => line.includes("^^^")).length).toBeGreaterThan(0);
  expect(wooded.text).toContain("trees");
  expect((await drawn(ridge)).text).not.toContain("trees");
});

it("fits 80 columns with the whole report, flat or steep", async () => {
  for (const height of [ridge, () => 500, (km: number) => (km % 7) * 400, (km: number) => -200 + km]) {
    const { report } = await drawn(height, (km) => km % 5);
    const widest = Math.max(...report.split("\n").map((line) => line.length));
    expect(widest).toBeLessThanOrEqual(80);
  }
});
