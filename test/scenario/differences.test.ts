import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { typedDifferences } from "../../src/scenario/differences.ts";
import { loadScenario } from "../../src/scenario/load.ts";
import type { ReadScenario } from "../../src/scenario/types.ts";
import { temporaryFolder } from "../cli/run.ts";

const base = `title: invented path
frequency: 10.368 GHz
transmitter: { power: 3 W, dish: tripod, feed: stub, cover: film }
receiver: { noise_figure: 1.1 dB, mode: [cw, ssb], dish: tripod, feed: stub, cover: film }
feeds: { stub: { return_loss: 14 dB, edge_taper: 10 dB, aperture: 46 mm } }
covers:
  film: { layers: [{ material: FEP film, thickness: 5 mil }, { material: PC, thickness: 1 mm }] }
dish: { tripod: { diameter: 60 cm, focal_ratio: 0.4 } }
path:
  from: { latitude: 54.10 N, longitude: 2.55 W, ground: 305 m, height: 3 m }
  to: { latitude: 53.60 N, longitude: 1.75 W, ground: 262 m, height: 4 m }
weather: { dry: {}, shower: { rain: 16 mm/h } }
`;

async function read(text: string): Promise<ReadScenario> {
  const { scenario, typed, diagnostics } = await loadScenario(text);
  expect(diagnostics).toBeUndefined();
  return { scenario: scenario!, typed };
}

/** What the base says differently with a piece replaced: `path: a -> b`. */
async function changed(...pieces: readonly (readonly [string, string])[]): Promise<string[]> {
  const other = pieces.reduce((text, [piece, by]) => {
    expect(text).toContain(piece);
    return text.replace(piece, by);
  }, base);
  const found = typedDifferences(await read(base), await read(other));
  return found.map(({ path, a, b }) => `${path.join(".")}: ${a} -> ${b}`);
}

describe("two files", () => {
  it("say nothing differently where they are one", async () => {
    expect(await changed()).toEqual([]);
  });

  it("differ in their own words", async () => {
    expect(await changed(["3 W", "10 W"], ["5 mil", "0.25 mm"])).toEqual([
      "transmitter.power: 3 W -> 10 W",
      "covers.film.layers.0.thickness: 5 mil -> 0.25 mm",
    ]);
  });

  it("do not differ by other units of the same quantity, nor by spaces and order", async () => {
    expect(
      await changed(["3 W", "3000 mW"], ["5 mil", "0.127 mm"], ["60 cm", "0.6 m"], ["0.4 ", "2/5 "]),
    ).toEqual([]);
    expect(await changed(["power: 3 W, dish: tripod", "dish: tripod, power:  3 W"])).toEqual([]);
  });

  it("differ where one of them states a spread", async () => {
    expect(await changed(["3 W", "3 W +/- 0.5 dB"])).toEqual(["transmitter.power: 3 W -> 3 W +/- 0.5 dB"]);
  });

  it("take names for names, though they look like quantities", async () => {
    const named = base.replaceAll(/film(?=[:,} ])(?<!FEP film)/g, "1 in");
    const other = base.replaceAll(/film(?=[:,} ])(?<!FEP film)/g, "25.4 mm");
    const found = typedDifferences(await read(named), await read(other));
    expect(found.map(({ path }) => path.join("."))).toContain("transmitter.cover");
  });

  it("tell what one of them lacks: keys, layers, members of a group and whole groups", async () => {
    expect(await changed([", { material: PC, thickness: 1 mm }", ""])).toEqual([
      "covers.film.layers.1: { material: PC, thickness: 1 mm } -> undefined",
    ]);
    expect(await changed(["shower: { rain: 16 mm/h }", "fog: { fog: 0.1 g/m3 }"])).toEqual([
      "weather.shower: { rain: 16 mm/h } -> undefined",
      "weather.fog: undefined -> { fog: 0.1 g/m3 }",
    ]);
    expect(await changed(["weather: { dry: {}, shower: { rain: 16 mm/h } }", ""])).toEqual([
      "weather.dry: {} -> undefined",
      "weather.shower: { rain: 16 mm/h } -> undefined",
    ]);
    expect(await changed(["mode: [cw, ssb]", "mode: cw"])).toEqual(["receiver.mode: cw, ssb -> cw"]);
  });

  it("read an alias as what it stands for", async () => {
    const aliased = ["{ rain: 16 mm/h }", "{ rain: &rate 16 mm/h }, later: { rain: *rate }"] as const;
    expect(await changed(aliased)).toEqual(["weather.later: undefined -> { rain: 16 mm/h }"]);
  });
});

describe("files that a scenario names", () => {
  const folder = temporaryFolder();

  /** A scenario beside its own ground and readings, in a folder of its own. */
  async function beside(name: string, heights: readonly number[], covered: number): Promise<ReadScenario> {
    mkdirSync(join(folder, name));
    const rows = heights.map((height, i) => `${(i * 76.6) / (heights.length - 1)},${height}`);
    writeFileSync(join(folder, name, "ground.csv"), `distance_km,height_m\n${rows.join("\n")}\n`);
    const levels = [0, covered, 0, covered, 0].map(
      (loss, i) => `${i + 1},${i % 2 ? "film" : "bare"},${-loss}`,
    );
    const bench = `order,state,level dB\n${levels.join("\n")}\n`;
    writeFileSync(join(folder, name, "bench.csv"), bench);
    const file = join(folder, name, "scenario.yaml");
    const layers = /film: \{ layers.*\n/;
    writeFileSync(
      file,
      base
        .replace(layers, "film: { measured: { readings: bench.csv } }\n")
        .replace("path:\n", "path:\n  terrain: ground.csv\n"),
    );
    return read(file);
  }

  it("differ by what they hold, though their names are the same", async () => {
    const one = await beside("one", [300, 200, 260], 0.2);
    const same = await beside("same", [300, 200, 260], 0.2);
    const other = await beside("other", [300, 410, 260], 0.3);
    expect(typedDifferences(one, same)).toEqual([]);
    const found = typedDifferences(one, other).map(({ path, a, b }) => `${path.join(".")}: ${a} -> ${b}`);
    expect(found).toHaveLength(2);
    expect(found[0]).toMatch(
      /^covers\.film\.measured\.readings: bench\.csv \(0\.2\d* dB\) -> bench\.csv \(0\.3\d* dB\)$/,
    );
    expect(found[1]).toBe(
      "path.terrain: ground.csv (3 points, 200 to 300 m) -> ground.csv (3 points, 260 to 410 m)",
    );
  });
});
