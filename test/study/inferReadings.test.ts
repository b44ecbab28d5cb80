import { describe, expect, it } from "vitest";
import { coveredFeed } from "../../src/cover/coveredFeed.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { loadInferReadings } from "../../src/scenario/infer.ts";
import { inferReport } from "../../src/study/inferReadings.ts";
import { file } from "../scenario/readingsFiles.ts";

async function reportOf(text: string) {
  const { readings, faults } = await loadInferReadings(file("infer.yaml", text));
  if (!readings) throw new Error(JSON.stringify(faults));
  return inferReport(readings);
}

const frequencyGHz = 10.4;

/** What a bench without error would read of a sheet before a feed of 15 dB and 60 degrees. */
function read(permittivity: number, lossTangent: number, thicknessMm: number, gapMm = 0): string {
  const layers = [{ permittivity, lossTangent, thicknessMm }];
  const sheet = layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers });
  const covered = coveredFeed({ feedReturnLossDb: 15, sheet, phaseDeg: 60, gapMm, frequencyGHz });
  const db = (name: "returnLossDb" | "insertionLossDb") => `${covered[name].nominal.toFixed(6)} dB`;
  return `return_loss: ${db("returnLossDb")}, insertion_loss: ${db("insertionLossDb")}`;
}

const known = (
  name: string,
  eps: number,
  tan: number,
  mm: number,
  gap = 0,
  readings = read(eps, tan, mm, gap),
) =>
  `  ${name}: { material: mine, permittivity: ${eps}, loss_tangent: ${tan}, thickness: ${mm} mm, gap: ${gap} mm, ${readings} }\n`;
const head = "frequency: 10.4 GHz\nreturn_loss_uncertainty: 0.2 dB\nloss_uncertainty: 0.03 dB\n";
const three =
  "sheets:\n" +
  known("thin", 2.08, 0.0004, 1) +
  known("middle", 2.77, 0.0055, 2) +
  known("far", 2.26, 0.0003, 3, 3.6);

describe("inferReport", () => {
  it("finds the feed behind three known sheets, within its own interval", async () => {
    const { feed } = await reportOf(`${head}feed: { return_loss: 15 dB }\n${three}`);
    expect(feed!.outcome).toBe("decided");
    const [one] = feed!.feeds;
    expect(one!.returnLossDb).toBeCloseTo(15, 2);
    expect(one!.phaseDeg).toBeCloseTo(60, 1);
    expect(one!.phaseLowDeg).toBeLessThan(60);
    expect(one!.phaseHighDeg).toBeGreaterThan(60);
  });

  it("and with it a sheet of unknown material", async () => {
    const unknown = `unknown:\n  grey: { thickness: 2.4 mm, ${read(2.6, 0.02, 2.4)} }\n`;
    const { sheets, phaseFrom } = await reportOf(`${head}feed: { return_loss: 15 dB }\n${three}${unknown}`);
    expect(phaseFrom).toBe("sheets");
    const { solutions, outcome } = sheets[0]!.byFeed[0]!.result;
    expect(outcome).toBe("decided");
    expect(solutions[0]!.permittivity).toBeCloseTo(2.6, 2);
    expect(solutions[0]!.lossTangent).toBeCloseTo(0.02, 3);
  });

  // Rows of the reference table: computed forward with a general-purpose network library, at 10.4 GHz in contact.
  it("finds the sheets of published rows k02 and k04 from a phase of the file", async () => {
    const { sheets, phaseFrom } = await reportOf(
      "frequency: 10.4 GHz\nfeed: { return_loss: 14 dB, phase: -30 deg }\n" +
        "unknown:\n  k02: { thickness: 2.4 mm, return_loss: 5.854417 dB, insertion_loss: 1.165777 dB }\n",
    );
    expect(phaseFrom).toBe("file");
    const near = sheets[0]!.byFeed[0]!.result.solutions.find(({ permittivity }) => permittivity < 3);
    expect(near!.permittivity).toBeCloseTo(2.6, 2);
    expect(near!.lossTangent).toBeCloseTo(0.007, 3);
  });

  it("lists both feeds that one sheet leaves, and the reading that decides", async () => {
    // Row i03: cos S = -0.413773 of a sheet of 2.75/0.006, 2.5 mm.
    const { feed, sheets } = await reportOf(
      "frequency: 10.4 GHz\nfeed: { return_loss: 15.2 dB }\nreturn_loss_uncertainty: 0.1 dB\n" +
        "sheets:\n  one: { material: mine, permittivity: 2.75, loss_tangent: 0.006, thickness: 2.5 mm, return_loss: 6.618280 dB }\n" +
        "unknown:\n  grey: { thickness: 2 mm, return_loss: 9 dB }\n",
    );
    expect(feed).toMatchObject({ outcome: "ambiguous" });
    expect(feed!.cosSum).toBeCloseTo(-0.413773, 3);
    expect(feed!.feeds).toHaveLength(2);
    expect(feed!.advice[0]!.decides).toBe(true);
    expect(sheets[0]!.byFeed).toHaveLength(2);
  });

  it("says that readings contradict the sheet that they are said to be of", async () => {
    const { feed } = await reportOf(
      "frequency: 10.4 GHz\nfeed: { return_loss: 20 dB }\nreturn_loss_uncertainty: 0.1 dB\n" +
        "sheets:\n  one: { material: mine, permittivity: 2.1, thickness: 0.1 mm, return_loss: 6 dB }\n",
    );
    expect(feed).toMatchObject({ outcome: "contradictory", feeds: [] });
    expect(Math.abs(feed!.cosSum!)).toBeGreaterThan(1);
  });

  it("leaves only a range without a phase", async () => {
    const { sheets, phaseFrom } = await reportOf(
      `${head}feed: { return_loss: 15 dB }\nunknown:\n  grey: { thickness: 2.4 mm, ${read(2.6, 0.007, 2.4)} }\n`,
    );
    expect(phaseFrom).toBe("nowhere");
    const { outcome, permittivityIntervals } = sheets[0]!.byFeed[0]!.result;
    expect(outcome).toBe("undetermined");
    expect(permittivityIntervals.some(([low, high]) => low < 2.6 && high > 2.6)).toBe(true);
  });

  it("names the sheet whose reading stands out, and the loss below its floor", async () => {
    const bad = three.replace(/(middle.*insertion_loss: )\S+/, "$10.02");
    const { feed, contradictions } = await reportOf(
      `${head}feed: { return_loss: 15 dB }\n${bad}${known("fourth", 2.6, 0.007, 1.5).replace("sheets:\n", "")}`,
    );
    expect(feed!.outlier!.name).toBe("middle");
    expect(contradictions).toMatchObject([{ sheet: "middle", insertionLossDb: 0.02 }]);
    expect(contradictions[0]!.suspects).toHaveLength(3);
  });
});

describe("a spoiled file of oilskin infer", () => {
  const good = `${head}feed: { return_loss: 15 dB }\n${three}`;
  it.each<[what: string, text: string, ...said: string[]]>([
    ["an unknown key", good.replace("gap: 3.6", "gape: 3.6"), '8: unknown key "gape"', "did you mean gap?"],
    ["no frequency", good.replace("frequency: 10.4 GHz\n", ""), "missing key"],
    ["an unknown material", good.replace("mine, permittivity: 2.08,", "plastik,"), '6: read "plastik"'],
    [
      "nothing read with a sheet",
      "frequency: 10 GHz\nfeed: { return_loss: 15 dB }\nsheets:\n  a: { material: PTFE sheet, thickness: 1 mm }\n",
      "4: missing return_loss (or insertion_loss)",
    ],
    [
      "a single reading",
      "frequency: 10 GHz\nsheets:\n  a: { material: PTFE sheet, thickness: 1 mm, return_loss: 12 dB }\n",
      "2: a feed has magnitude and phase",
    ],
    [
      "no bare return loss for an unknown sheet",
      "frequency: 10 GHz\nunknown:\n  a: { thickness: 1 mm, return_loss: 12 dB }\n",
      "2: missing return_loss of the feed",
    ],
    [
      "a sheet that reflects nothing",
      "frequency: 10 GHz\nfeed: { return_loss: 15 dB }\nsheets:\n  a: { material: m, permittivity: 4, thickness: 7.4948 mm, return_loss: 12 dB }\n",
      "4: this sheet reflects next to nothing",
    ],
    ["neither kind of sheet", "frequency: 10 GHz\n", "1: missing sheets"],
    ["groups without a sheet", "frequency: 10 GHz\nsheets: {}\n", "2: no sheet"],
    ["nothing", "", "1: the file is empty"],
  ])("with %s is refused by line", async (_, text, ...said) => {
    const { faults } = await loadInferReadings(file("bad.yaml", text));
    const told = (faults ?? []).map(({ line, message }) => `${line}: ${message}`).join("\n");
    for (const words of said) expect(told).toContain(words);
  });
});
