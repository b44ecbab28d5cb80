import { spawnSync } from "node:child_process";
import { afterEach, describe, expect, it, vi } from "vitest";
import { cases } from "../../src/budget/cases.ts";
import { drawingOf } from "../../src/budget/drawing.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { coverOf, layerOf, scenarioOf, weatherOf } from "./scenarios.ts";

vi.mock("../../src/cover/layeredSheet.ts", async (original) => {
  const actual = await original<typeof import("../../src/cover/layeredSheet.ts")>();
  return { ...actual, layeredSheet: vi.fn(actual.layeredSheet) };
});

const library = new URL("../../dist/index.js", import.meta.url).href;
const demo = new URL("../../scenarios/hilltop-contest.yaml", import.meta.url).pathname;

const FUNCTIONS = ["exp", "log", "sqrt", "cos", "sin", "pow", "log10", "hypot"] as const;

const scenario = scenarioOf({
  covers: {
    bare: coverOf(),
    film: coverOf({ layers: [layerOf(0.127, 2.05, 0.0007)], surface: "beading" }),
    plate: coverOf({ layers: [layerOf(2, 2.8, 0.006)] }),
    lid: coverOf({ layers: [layerOf(1.5, 2.9, 0.02)], surface: "wetting" }),
  },
  weather: {
    dry: weatherOf(),
    shower: weatherOf({ rainMmPerH: { value: 10 } }),
    storm: weatherOf({ rainMmPerH: { value: 50 }, extentKm: 6 }),
  },
});

/** Calls that one draw of all cases makes: of as many draws more as of few, so that what comes once falls out. */
function callsADraw(chosen: ReturnType<typeof cases>) {
  const drawing = drawingOf(prepare(scenario), chosen, 1000);
  for (const uniforms of drawing.uniforms) for (let i = 0; i < 1000; i++) uniforms[i] = (i + 0.5) / 1000;
  const spies = FUNCTIONS.map((name) => vi.spyOn(Math, name));
  drawing.work();
  const calls = spies.reduce((sum, spy) => sum + spy.mock.calls.length, 0);
  vi.restoreAllMocks();
  return calls / 1000;
}

afterEach(() => vi.restoreAllMocks());

describe("the work of a draw", () => {
  const all = cases(prepare(scenario));

  it("asks no model: sheets and cascades are all done before", () => {
    const drawing = drawingOf(prepare(scenario), all, 64);
    vi.mocked(layeredSheet).mockClear();
    drawing.work();
    expect(layeredSheet).not.toHaveBeenCalled();
  });

  it("takes three or so logarithms and exponentials a case and a few a weather, beside some forty that all share", () => {
    expect(all.length).toBe(12);
    const one = callsADraw(all.slice(0, 1));
    const many = callsADraw(all);
    expect(one).toBeLessThan(40);
    expect((many - one) / (all.length - 1)).toBeLessThanOrEqual(5);
  });

  it("leaves no garbage: not one collection in 200,000 draws", () => {
    const script = `
      import { cases, drawingOf, loadScenario, prepare } from ${JSON.stringify(library)};
      const { scenario } = await loadScenario(${JSON.stringify(demo)});
      const link = prepare(scenario);
      const drawing = drawingOf(link, cases(link).filter(({ mode }) => mode === "fm"));
      for (const uniforms of drawing.uniforms)
        for (let i = 0; i < uniforms.length; i++) uniforms[i] = ((i * 0.618034) % 0.999) + 0.0005;
      for (let block = 0; block < 60; block++) drawing.work();
      console.log("BEGIN");
      for (let block = 0; block < 200; block++) drawing.work();
      console.log("END");
    `;
    const { stdout } = spawnSync(process.execPath, ["--trace-gc", "--input-type=module", "--eval", script], {
      encoding: "utf8",
    });
    const between = stdout.slice(stdout.indexOf("BEGIN"), stdout.indexOf("END"));
    expect(stdout).toContain("END");
    // Code that is compiled beside may cost one; numbers on the heap cost thirty.
    expect(between.match(/Scavenge/g)?.length ?? 0).toBeLessThanOrEqual(2);
  });
});
