import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { describe, expect, it } from "vitest";

const source = new URL("../src", import.meta.url).pathname;

/** The floors, lowest first; a folder may import its own floor's permitted folders and everything below. */
const floors: readonly (readonly string[])[] = [
  ["numeric"],
  ["cover", "antenna", "atmosphere", "path", "receiver", "readings", "safety"],
  ["scenario"],
  ["budget"],
  ["study"],
  ["report"],
  ["cli"],
];

/** Imports between models of floor 2 that physics asks for: importer to imported, with the reason. */
const crossings: Readonly<Record<string, readonly string[]>> = {
  "cover/waterFilm.ts": ["atmosphere/waterPermittivity.ts"], // the film on a cover is liquid water
  "path/rainFade.ts": ["atmosphere/rainAttenuation.ts"], // P.530 starts from the P.838 coefficients
  // P.452 adds gases by P.676 to every mechanism
  "path/clearAir.ts": ["atmosphere/gasAttenuation.ts", "atmosphere/humidity.ts"],
};

/** Folders of floor 2 that read another folder whole: importer to imported, with the reason. */
const folderCrossings: Readonly<Record<string, string>> = {
  readings: "cover", // what a bench reads is held against what the cover models foretell
};

const floorOf = (folder: string) => floors.findIndex((names) => names.includes(folder));
const files = readdirSync(source, { recursive: true, encoding: "utf8" }).filter((name) =>
  name.endsWith(".ts"),
);

/** Every relative import of a file, static or dynamic, as paths below src/. */
function importsOf(file: string): string[] {
  const text = readFileSync(join(source, file), "utf8");
  return [...text.matchAll(/(?:from|import\()\s*"(\.[^"]+)"/g)].map((match) =>
    relative(source, resolve(source, dirname(file), match[1]!)),
  );
}

describe("the floors of the house", () => {
  it("knows every folder", () => {
    const folders = new Set(files.filter((file) => file.includes("/")).map((file) => file.split("/")[0]!));
    expect([...folders].filter((folder) => floorOf(folder) < 0)).toEqual([]);
  });

  it("lets no import climb", () => {
    const climbing: string[] = [];
    for (const file of files.filter((name) => name.includes("/"))) {
      const folder = file.split("/")[0]!;
      for (const target of importsOf(file)) {
        const other = target.split("/")[0]!;
        const face = target === "index.ts" && folder === "cli";
        const below = floorOf(other) >= 0 && floorOf(other) < floorOf(folder);
        const permitted = crossings[file]?.includes(target) || folderCrossings[folder] === other;
        if (!(face || other === folder || below || permitted)) {
          climbing.push(`${file} -> ${target}`);
        }
      }
    }
    expect(climbing).toEqual([]);
  });

  it("keeps packages and the system out of models and arithmetic", () => {
    const onLibrary = [
      "path/geodesic.ts", // geodesics on WGS84
      "path/declination.ts", // World Magnetic Model
      "readings/leastSquares.ts", // Levenberg-Marquardt
      "numeric/uniformStream.ts", // random numbers
      "numeric/ranking.ts", // quantiles and ranks
    ];
    const offenders = files
      .filter((file) => floorOf(file.split("/")[0]!) <= 1 && file.includes("/") && !onLibrary.includes(file))
      .filter((file) => /(?:from|import\()\s*"[^."]/.test(readFileSync(join(source, file), "utf8")));
    expect(offenders).toEqual([]);
  });

  it("states the radius of the Earth once", () => {
    const stating = files.filter((file) =>
      readFileSync(join(source, file), "utf8")
        .split("\n")
        .some((line) => /\b6371\b/.test(line.replace(/^\s*(\/?\*|\/\/).*/, ""))),
    );
    expect(stating).toEqual(["numeric/constants.ts"]);
  });

  it("keeps every file short enough to read in one sitting", () => {
    const long = files.filter((file) => readFileSync(join(source, file), "utf8").split("\n").length > 400);
    expect(long).toEqual([]);
  });
});
