import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { cases } from "../../src/budget/cases.ts";
import { evaluate } from "../../src/budget/evaluate.ts";
import { prepare } from "../../src/budget/prepare.ts";
import { bench, file, folder } from "./readingsFiles.ts";
import { faultsOf, scenarioOf, spoiled } from "./sample.ts";

const figures = "insertion_loss: 0.22 dB, return_loss_change: 2.7 dB";
/** The sample whose cover "sheet" names a table. */
const naming = (name: string, more = "") => spoiled([figures, `readings: ${name}${more}`]);
const sheetBench = bench.replaceAll("film", "sheet");

describe("a cover that names a table of readings", () => {
  it("has the loss of the table, its standard uncertainty, and the table as its source", async () => {
    file("bench.csv", sheetBench);
    const { covers } = await scenarioOf(file("names.yaml", naming("bench.csv")));
    const { insertionLossDb, returnLossChangeDb, source } = covers["sheet"]!.measured!;
    expect(insertionLossDb.value).toBeCloseTo(0.2, 6);
    // A straight drift leaves no scatter: what remains is the bench's 0.05 dB, rectangular.
    expect(insertionLossDb.sigma).toBeCloseTo(0.05 / Math.sqrt(3), 5);
    expect(returnLossChangeDb).toBeUndefined();
    expect(source).toBe("bench.csv");
  });

  it("passes the name of the table on to the budget", async () => {
    file("bench.csv", sheetBench);
    const link = prepare(await scenarioOf(file("names.yaml", naming("bench.csv"))));
    const one = cases(link).find(({ receiver }) => receiver.cover === "sheet")!;
    const sources = evaluate(link, one).entries.map(({ source }) => source);
    expect(sources).toContain("measured, bench.csv");
  });

  it("has the change of return loss where the table holds one, or where it is typed beside", async () => {
    const rows = "bare,-40,15\nsheet,-40.2,13\nbare,-40,15\nsheet,-40.2,13\nbare,-40,15\n";
    file("both.csv", `state,level dB,return loss dB\n${rows}`);
    file("bench.csv", sheetBench);
    const changeIn = async (text: string) =>
      (await scenarioOf(file("names.yaml", text))).covers["sheet"]!.measured!.returnLossChangeDb!.value;
    expect(await changeIn(naming("both.csv"))).toBeCloseTo(2, 6);
    expect(await changeIn(naming("bench.csv", ", return_loss_change: 1 dB"))).toBe(1);
  });

  it("finds it from the folder of the scenario, or by a whole path", async () => {
    mkdirSync(join(folder, "below"), { recursive: true });
    file("below/bench.csv", sheetBench);
    const whole = join(folder, "below/bench.csv");
    for (const text of [naming("below/bench.csv"), naming(whole)]) {
      const { covers } = await scenarioOf(file("names.yaml", text));
      expect(covers["sheet"]!.measured!.insertionLossDb.value).toBeCloseTo(0.2, 6);
    }
    expect((await scenarioOf(naming(whole))).covers["sheet"]!.measured!.source).toBe(whole);
  });

  it.each<[what: string, table: string, ...said: string[]]>([
    ["that is not there", "", "none.csv:1: no such file"],
    ["with a fault", sheetBench.replace("-40.23", "much"), 'bad.csv:6: level: read "much"'],
    [
      "of another cover",
      bench.replaceAll("film", "sheat"),
      'no pairs of the state "sheet"',
      "did you mean sheat?",
    ],
    [
      "of return losses alone",
      "state,return loss dB\nbare,15\nsheet,13\nbare,15\nsheet,13\nbare,15\n",
      "holds no levels",
    ],
  ])("is refused %s, by its own place and that of the table", async (_, table, ...said) => {
    const name = table === "" ? "none.csv" : "bad.csv";
    if (table) file(name, table);
    const faults = await faultsOf(file("names.yaml", naming(name)));
    expect(faults).toHaveLength(1);
    expect(faults[0]).toMatchObject({ code: "bad_readings", line: 12, column: 27 });
    for (const words of said) expect(faults[0]!.message).toContain(words);
  });

  it("tells the faults of the table beside those of the scenario", async () => {
    const faults = await faultsOf(file("names.yaml", naming("none.csv").replace("10.368 GHz", "10.368")));
    expect(faults.map(({ line }) => line)).toEqual([2, 12]);
  });

  it("has either readings or figures", async () => {
    file("bench.csv", sheetBench);
    const twice = naming("bench.csv", ", insertion_loss: 0.2 dB");
    expect((await faultsOf(file("names.yaml", twice)))[0]!.message).toContain(
      "both readings and insertion_loss",
    );
    const neither = spoiled([figures, "source: my bench"]);
    expect((await faultsOf(neither))[0]!.message).toContain("missing insertion_loss (or readings");
  });
});
