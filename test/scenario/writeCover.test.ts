import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { loadScenario } from "../../src/scenario/load.ts";
import { withMeasuredCover } from "../../src/scenario/writeCover.ts";
import { sample, scenarioOf, spoiled } from "./sample.ts";

const entry = {
  insertion_loss: "0.21 dB +/- 0.03 dB",
  return_loss_change: "1.8 dB +/- 0.1 dB",
  source: "bench.csv",
};
const written =
  "{ insertion_loss: 0.21 dB +/- 0.03 dB, return_loss_change: 1.8 dB +/- 0.1 dB, source: bench.csv }";

/** Lines that the new text has and the old has not, and the other way round. */
function changes(before: string, after: string): { added: string[]; gone: string[] } {
  const [old, now] = [before.split("\n"), after.split("\n")];
  return {
    added: now.filter((line) => !old.includes(line)),
    gone: old.filter((line) => !now.includes(line)),
  };
}

async function measuredIn(text: string, cover: string) {
  const { covers } = await scenarioOf(text);
  return covers[cover]!.measured;
}

const truth = {
  insertionLossDb: { value: 0.21, sigma: 0.03 },
  returnLossChangeDb: { value: 1.8, sigma: 0.1 },
  source: "bench.csv",
};

describe("withMeasuredCover", () => {
  const demo = (name: string) =>
    readFileSync(new URL(`../../scenarios/${name}.yaml`, import.meta.url), "utf8");

  it.each(["hilltop-contest", "coast-beacon", "town-link"])(
    "adds two lines to %s and touches none",
    async (name) => {
      const text = demo(name);
      const after = withMeasuredCover(text, "old tarpaulin", entry)!;
      expect(changes(text, after)).toEqual({
        added: ["  old tarpaulin:", `    measured: ${written}`],
        gone: [],
      });
      expect(await measuredIn(after, "old tarpaulin")).toEqual(truth);
    },
  );

  it("adds the readings to a cover with layers, and keeps its comments", async () => {
    const text = demo("hilltop-contest");
    const after = withMeasuredCover(text, "film", entry)!;
    expect(changes(text, after)).toEqual({ added: [`    measured: ${written}`], gone: [] });
    expect(after).toContain("  film: # stretched over the mouth, held by a band\n    layers:");
    expect((await scenarioOf(after)).covers["film"]!.layers).toHaveLength(1);
    expect(await measuredIn(after, "film")).toEqual(truth);
  });

  it("replaces what a cover says is measured, and that alone", async () => {
    const text = demo("hilltop-contest");
    const after = withMeasuredCover(text, "cloth", entry)!;
    expect(changes(text, after)).toEqual({
      added: [`    measured: ${written}`],
      gone: ["    measured: { insertion_loss: 0.22 dB +/- 0.04 dB, return_loss_change: 2.7 dB }"],
    });
    expect(after).toContain("  cloth: # measured on the bench, with and without\n");
  });

  const block =
    "  sheet:\n    measured: # by night\n      insertion_loss: 0.22 dB\n      return_loss_change: 2.7 dB\n    surface: beading\n";
  const sheet = "  sheet:\n    measured: { insertion_loss: 0.22 dB, return_loss_change: 2.7 dB }\n";
  const covers = `covers:\n  film:\n    layers: [{ material: FEP film, thickness: 5 mil }]\n${sheet}`;
  it.each<[what: string, text: string, cover: string]>([
    ["a measured group in lines", spoiled([sheet, block]), "sheet"],
    ["a cover in braces", spoiled([sheet, "  sheet: { surface: wetting }\n"]), "sheet"],
    ["a cover in empty braces", spoiled([sheet, "  sheet: {} # later\n"]), "sheet"],
    ["covers in braces", spoiled([covers, "covers: { film: {}, sheet: {} }\n"]), "old"],
    [
      "covers in empty braces",
      spoiled([covers, "covers: {}\n"], ["cover: film", "cover: bare"], ["cover: sheet", "cover: bare"]),
      "old",
    ],
    [
      "no covers",
      spoiled([covers, ""], ["cover: film", "cover: bare"], ["cover: sheet", "cover: bare"]),
      "old",
    ],
    ["covers at the end, without a line end", `${spoiled([covers, ""])}${covers}`.trimEnd(), "old"],
    ["a comment behind the last cover", spoiled([sheet, `${sheet}  # more to come\n`]), "old"],
    ["a name that needs quotes", sample, "a: b, #1"],
  ])("finds its place beside %s", async (_, text, cover) => {
    const after = withMeasuredCover(text, cover, entry)!;
    expect(await measuredIn(after, cover)).toEqual(truth);
    for (const comment of text.match(/#.*$/gm) ?? []) expect(after).toContain(comment);
  });

  it("keeps line ends of Windows and a byte-order mark", async () => {
    const text = `\ufeff${sample.replaceAll("\n", "\r\n")}`;
    const after = withMeasuredCover(text, "old", entry)!;
    expect(after).toBe(`\ufeff${withMeasuredCover(sample, "old", entry)!.replaceAll("\n", "\r\n")}`);
    expect(await measuredIn(after, "old")).toEqual(truth);
  });

  it("gives up on covers that are an alias", () => {
    expect(withMeasuredCover("a: &c { film: {} }\ncovers: *c\n", "film", entry)).toBeUndefined();
  });

  it("writes a sound scenario for any name that a scenario may have", async () => {
    await fc.assert(
      fc.asyncProperty(fc.string({ unit: "grapheme", minLength: 1, maxLength: 30 }), async (name) => {
        // Names that a scenario refuses by itself.
        fc.pre(name.trim() !== "" && !/\p{Cc}/u.test(name) && !["bare", "<<", "__proto__"].includes(name));
        const { scenario } = await loadScenario(withMeasuredCover(sample, name, entry)!);
        expect(scenario?.covers[name]?.measured).toEqual(truth);
      }),
      { numRuns: 60, examples: [["- "], ["null"], ["a: b"], ["# x"], ["é "], ["{"]] },
    );
  });
});
