import { execFileSync, spawnSync } from "node:child_process";
import { mkdirSync, readFileSync, symlinkSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import type * as face from "../../src/index.ts";
import { demo, root, temporaryFolder } from "./run.ts";

/** What users of the library may count on; a name that goes away breaks the type check as well as the test. */
const kept = [
  // Atmosphere
  "specificGasAttenuation",
  "specificRainAttenuation",
  "waterPermittivity",
  "cloudLiquidCoefficient",
  "referenceAtmosphere",
  "refractivity",
  // Covers and feeds
  "layeredSheet",
  "coveredFeed",
  "coverNoise",
  "reflectionFigures",
  "waterFilm",
  "icePermittivity",
  "snowPermittivity",
  "wetAntennaLoss",
  // Antennas
  "feedEfficiency",
  "dishGain",
  "pyramidalHorn",
  "conicalHorn",
  // Path
  "locatorToPoint",
  "pointToLocator",
  "geodesicPath",
  "freeSpaceLoss",
  "fresnelRadius",
  "rainFade",
  // Engine
  "loadScenario",
  "prepare",
  "cases",
  "evaluate",
  "exposure",
] as const satisfies readonly (keyof typeof face)[];

/** A project of someone else that has the package among its own. */
function consumer(): string {
  const folder = temporaryFolder();
  mkdirSync(join(folder, "node_modules"));
  symlinkSync(root, join(folder, "node_modules/oilskin"), "dir");
  writeFileSync(join(folder, "package.json"), JSON.stringify({ type: "module" }));
  return folder;
}

describe("the library as a project outside the checkout has it", () => {
  const folder = consumer();

  it("exports every kept name as a function", () => {
    writeFileSync(
      join(folder, "names.js"),
      'import * as face from "oilskin";\n' +
        "console.log(Object.keys(face).filter((name) => typeof face[name] === 'function').join(' '));\n",
    );
    const names = execFileSync(process.execPath, ["names.js"], { cwd: folder, encoding: "utf8" }).split(/\s/);
    expect(kept.filter((name) => !names.includes(name))).toEqual([]);
  });

  it("works out a sheet and a budget", () => {
    writeFileSync(
      join(folder, "budget.js"),
      `import { layeredSheet, loadScenario, prepare, cases, evaluate } from "oilskin";
const { scenario } = await loadScenario(${JSON.stringify(demo)});
const link = prepare(scenario);
const budgets = cases(link).map((one) => evaluate(link, one));
// Half a wave of a lossless plate at 10 GHz: c / (2 f sqrt 4) = 7.4948 mm lets all through.
const sheet = layeredSheet({ frequencyGHz: 10, incidenceDeg: 0, polarization: "te",
  layers: [{ permittivity: 4, lossTangent: 0, thicknessMm: 7.49481145 }] });
console.log(JSON.stringify({ count: budgets.length, marginDb: budgets[0].marginDb, lossDb: sheet.transmissionLossDb }));
`,
    );
    const out = execFileSync(process.execPath, ["budget.js"], { cwd: folder, encoding: "utf8" });
    const { count, marginDb, lossDb } = JSON.parse(out) as Record<string, number>;
    expect(count).toBe(5 * 4 * 2);
    expect(marginDb).toBeGreaterThan(0);
    expect(lossDb).toBeCloseTo(0, 9);
  });

  it("says nothing on its own", () => {
    writeFileSync(join(folder, "quiet.js"), 'import "oilskin";\n');
    const { status, stdout, stderr } = spawnSync(process.execPath, ["quiet.js"], {
      cwd: folder,
      encoding: "utf8",
    });
    expect({ status, stdout, stderr }).toEqual({ status: 0, stdout: "", stderr: "" });
  });
});

describe("the declarations", () => {
  const folder = consumer();
  const typescript = join(root, "node_modules/typescript/bin/tsc");
  // A copy of the package as it would be installed, with declarations of the sources as they are now.
  const packed = join(folder, "packed/oilskin");
  mkdirSync(packed, { recursive: true });
  writeFileSync(join(packed, "package.json"), readFileSync(join(root, "package.json")));
  symlinkSync(join(root, "node_modules"), join(folder, "packed/node_modules"), "dir");
  // Faults of the sources themselves are the type check's business; declarations are written all the same.
  spawnSync(process.execPath, [
    typescript,
    ...["--project", root, "--emitDeclarationOnly", "--outDir", join(packed, "dist/types")],
  ]);

  it("type-check a strict consumer without the sources, and refuse a field of a wrong name", () => {
    writeFileSync(
      join(folder, "packed/consumer.ts"),
      `import { type Budget, cases, evaluate, freeSpaceLoss, layeredSheet, loadScenario, prepare } from "./oilskin/dist/types/index.js";
export async function margins(file: string): Promise<number[]> {
  const { scenario, diagnostics } = await loadScenario(file);
  if (scenario === undefined) throw new Error(diagnostics.map(({ line, message }) => line + message).join());
  const link = prepare(scenario);
  return cases(link).map((one): Budget => evaluate(link, one)).map(({ marginDb }) => marginDb);
}
const layers = [{ permittivity: 2.05, lossTangent: 0.0007, thicknessMm: 0.127 }];
const sheet = layeredSheet({ frequencyGHz: 10, incidenceDeg: 0, polarization: "te", layers });
export const lossDb: number = sheet.transmissionLossDb;
// @ts-expect-error
export const wrong = freeSpaceLoss({ frequencyMHz: 10_368, distanceKm: 1 });
`,
    );
    const { status, stdout } = spawnSync(
      process.execPath,
      [typescript, "--noEmit", "--strict", "--module", "nodenext", "--target", "es2022", "consumer.ts"],
      { cwd: join(folder, "packed"), encoding: "utf8" },
    );
    expect({ status, stdout }).toEqual({ status: 0, stdout: "" });
  });
});
