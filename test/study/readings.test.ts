import { describe, expect, it } from "vitest";
import { energyFloor } from "../../src/cover/energyFloor.ts";
import { benchReport } from "../../src/study/readings.ts";
import { coversRead, entryOfCover } from "../../src/study/readingsEntry.ts";
import { randomSource } from "../readings/bench.ts";
import { file, readingsIn } from "../scenario/readingsFiles.ts";

const table = (rows: string, head = "state,level dB") => readingsIn(file("bench.csv", `${head}\n${rows}`));

/** Rows of bare and one cover in turn, ending in bare. */
function alternating(bare: readonly string[], covered: readonly string[], cover = "film"): string {
  return bare
    .map((cell, i) => `bare,${cell}\n${covered[i] === undefined ? "" : `${cover},${covered[i]}\n`}`)
    .join("");
}

describe("benchReport", () => {
  it("gives loss and type A of the worked run b01: exact rational arithmetic", async () => {
    const open = "-42.0;-42.05;-42.09;-42.12;-42.17;-42.19".split(";");
    const covered = "-42.22;-42.3;-42.34;-42.31;-42.41".split(";");
    const { covers, runs, confidence } = await benchReport(await table(alternating(open, covered)));
    const { loss } = covers[0]!;
    expect(loss!.valueDb).toBeCloseTo(0.211, 4);
    expect(loss!.typeADb).toBeCloseTo(0.0158, 4);
    expect(loss).toMatchObject({ pairs: 5, verdict: "measured_loss", retake: false });
    // u_c = sqrt(0.0158^2 + 0.05^2/3); v = 4 (u_c/u_A)^4 = 100; t(0.975; 100) = 1.984 (JCGM 100:2008, table G.2: 1.984).
    expect(loss!.combinedDb).toBeCloseTo(0.0329, 4);
    expect(loss!.coverageFactor).toBeCloseTo(1.99, 2);
    expect(confidence).toBe(0.95);
    expect(runs[0]!.driftDb).toBeCloseTo(-0.19, 9);
  });

  it("tells more pairs, or that no number will do", async () => {
    const rows = alternating(["-40", "-40.1", "-39.9", "-40.05"], ["-40.2", "-40.35", "-40.1"]);
    const wanted = async (wantedDb: number) =>
      (await benchReport(await table(rows), { wantedDb })).covers[0]!.loss!;
    // Type B alone leaves 1.95996 x 0.05/sqrt 3 = 0.0566 dB.
    expect((await wanted(0.05)).wanted).toEqual({ db: 0.05, more: undefined });
    expect((await wanted(0.05)).leastDb).toBeCloseTo(0.0566, 4);
    const { wanted: reached, expandedDb } = await wanted(0.08);
    expect(reached!.more).toBeGreaterThan(0);
    expect(expandedDb).toBeGreaterThan(0.08);
    expect((await wanted(5)).wanted!.more).toBe(0);
  });

  it("names the energy floor and the likelier culprit, from return losses of the same table", async () => {
    const { covers } = await benchReport(
      await table(
        alternating(["-40,13", "-40,13", "-40,13"], ["-40.05,9", "-40.05,9"]),
        "state,level dB,return loss dB",
      ),
    );
    const { loss, change } = covers[0]!;
    expect(loss).toMatchObject({ verdict: "below_energy_floor", retake: true });
    expect(loss!.floorDb).toBeCloseTo(
      energyFloor({ bareReturnLossDb: 13, coveredReturnLossDb: 9 }).floorDb,
      9,
    );
    expect(loss!.suspects).toHaveLength(3);
    expect(change).toMatchObject({ verdict: "worse_match" });
    expect(change!.valueDb).toBeCloseTo(4, 9);
    expect(change!.returnLosses).toEqual({ bare: { db: 13 }, covered: { db: 9 } });
  });

  it("takes return losses that the file states for the same check", async () => {
    const rows = [
      "return_losses: { bare: 13 dB, film: 9 dB }",
      "readings:",
      ...["bare", "film", "bare", "film", "bare"].map((state, i) => {
        return `  - { order: ${i}, state: ${state}, level: ${state === "bare" ? "-40" : "-40.05"} dB }`;
      }),
    ].join("\n");
    const { covers } = await benchReport(await readingsIn(file("stated.yaml", `${rows}\n`)));
    expect(covers[0]!.loss).toMatchObject({ verdict: "below_energy_floor" });
  });

  it.each([
    ["-40.01", "indistinguishable_from_zero", false],
    ["-39.5", "implausible_gain", true],
  ])("calls a covered level of %s against -40 %s", async (level, verdict, retake) => {
    const { covers } = await benchReport(await table(alternating(["-40", "-40", "-40"], [level, level])));
    expect(covers[0]!.loss).toMatchObject({ verdict, retake });
  });

  it("calls a gain that tuning the feed could explain so", async () => {
    // A bare return loss of 10 dB has 0.458 dB to give back: 10 log10(1/0.9).
    const rows = [
      "return_losses: { bare: 10 dB }",
      "readings:",
      ...[0, 1, 2, 3, 4].map(
        (i) => `  - { state: ${i % 2 ? "film" : "bare"}, level: ${i % 2 ? "-39.7" : "-40"} dB }`,
      ),
    ].join("\n");
    const { covers } = await benchReport(await readingsIn(file("gain.yaml", `${rows}\n`)));
    expect(covers[0]!.loss).toMatchObject({ verdict: "gain_possible_by_matching", retake: true });
    expect(covers[0]!.loss!.bestPossibleGainDb).toBeCloseTo(0.458, 3);
  });

  it("keeps and names the reading that stands out, by its line", async () => {
    const { normal } = randomSource(11);
    const level = (i: number) => (-40 - 0.2 * (i % 2) + 0.005 * normal() + (i === 9 ? 0.5 : 0)).toFixed(4);
    const rows = Array.from({ length: 21 }, (_, i) => `${i % 2 ? "film" : "bare"},${level(i)}\n`).join("");
    const { runs, covers } = await benchReport(await table(rows));
    expect(runs[0]!.outlier).toMatchObject({ line: 11, state: "film" });
    expect(runs[0]!.outlier!.shiftDb).toBeCloseTo(0.5, 1);
    expect(covers[0]!.loss!.pairs).toBe(10);
  });

  it("finds it in a run too long to keep as well", async () => {
    const { normal } = randomSource(12);
    const level = (i: number) => (-40 - 0.2 * (i % 2) + 0.005 * normal() + (i === 3001 ? 0.5 : 0)).toFixed(4);
    const rows = Array.from({ length: 5001 }, (_, i) => `${i % 2 ? "film" : "bare"},${level(i)}\n`).join("");
    const { runs, covers } = await benchReport(await table(rows));
    expect(runs[0]!.outlier).toMatchObject({ line: 3003 });
    expect(covers[0]!.loss!.valueDb).toBeCloseTo(0.2, 3);
  });

  it("says which covered readings no bare one brackets", async () => {
    const rows = `film,-40.2\n${alternating(["-40", "-40", "-40"], ["-40.2", "-40.2"])}film,-40.2\n`;
    const { runs } = await benchReport(await table(rows));
    expect(runs[0]).toMatchObject({ unbracketedCount: 2, unbracketedLines: [2, 8] });
  });

  it("covers the truth 93 to 97 % of the time where the level drifts straight", async () => {
    const { normal } = randomSource(2024);
    let held = 0;
    const runs = 400;
    for (let run = 0; run < runs; run++) {
      const rows = Array.from({ length: 13 }, (_, i) => {
        const level = -40 + 0.01 * i - (i % 2 ? 0.2 : 0) + 0.05 * normal();
        return `${i % 2 ? "film" : "bare"},${level}\n`;
      }).join("");
      const { covers } = await benchReport(await table(rows), { repeatabilityDb: 0 });
      const { valueDb, expandedDb } = covers[0]!.loss!;
      if (Math.abs(valueDb - 0.2) <= expandedDb) held++;
    }
    // 95 % of 400, three standard deviations of a count of that chance (sqrt(400 x 0.95 x 0.05) = 4.4) either way.
    expect(held).toBeGreaterThan(366);
    expect(held).toBeLessThan(394);
  });

  const coupled = (extra: string, bare = "-25", covered = "-23") =>
    [
      `coupler: { directivity: 40 dB${extra} }`,
      "readings:",
      ...[0, 1, 2, 3, 4].map(
        (i) => `  - { state: ${i % 2 ? "film" : "bare"}, reflected: ${i % 2 ? covered : bare} dBm }`,
      ),
      "",
    ].join("\n");

  it("bounds a return loss by the coupler: 30 dB at 40 dB of directivity is 27.6 to 33.3 dB", async () => {
    // Worked example of Rohde & Schwarz, Fundamentals of Vector Network Analysis, evaluated; one reference widens it by
    // 20 log10(1/(1 - 0.01)) = 0.087 dB each way.
    const { covers } = await benchReport(await readingsIn(file("coupler.yaml", coupled(", open: 5 dB"))));
    const { change } = covers[0]!;
    const { bare, covered } = change!.returnLosses!;
    expect(bare.db).toBeCloseTo(30, 9);
    expect(bare.lowDb).toBeCloseTo(27.613 - 0.087, 2);
    expect(bare.highDb).toBeCloseTo(33.302 + 0.087, 2);
    expect(covered.db).toBeCloseTo(28, 9);
    // 20 log10[(1 + d/g1)/(1 - d/g)], d = 0.01, g = 0.03162, g1 = 0.03981.
    expect(change!.leakLimitDb).toBeCloseTo(5.245, 2);
    expect(change!.verdict).toBe("indistinguishable_from_zero");
  });

  it("knows no bounds of levels without a reference", async () => {
    const { covers } = await benchReport(await readingsIn(file("coupler.yaml", coupled(""))));
    expect(covers[0]!.change!.valueDb).toBeCloseTo(2, 9);
    expect(covers[0]!.change!.returnLosses).toBeUndefined();
  });

  it("refuses a level above the reference by its file", async () => {
    await expect(readingsIn(file("above.yaml", coupled(", open: -24 dB")))).rejects.toThrow(
      "nothing reflects more",
    );
  });
});

describe("sweeps", () => {
  const sweep = (rows: string) => `# GHz S DB R 50\n${rows}`;
  const pair = async (bare: string, covered: string, frequencyGHz?: number) => {
    file("bare.s2p", sweep(bare));
    file("film.s2p", sweep(covered));
    const readings = await readingsIn(file("sweep.yaml", "sweeps: { bare: bare.s2p, film: film.s2p }\n"));
    return benchReport(readings, { frequencyGHz });
  };
  const bare = "10 -15 0 -0.5 0 -0.5 0 -15 0\n11 -15 0 -0.5 0 -0.5 0 -15 0\n";

  it("gives loss and match at the frequency, between its points too", async () => {
    const { sweeps } = await pair(
      bare,
      "10 -12 0 -0.9 0 -0.9 0 -12 0\n11 -12 0 -0.9 0 -0.9 0 -12 0\n",
      10.368,
    );
    const { at } = sweeps[0]!;
    expect(at!.bareReturnLossDb).toBeCloseTo(15, 9);
    expect(at!.coveredReturnLossDb).toBeCloseTo(12, 9);
    expect(at!.insertionLossDb).toBeCloseTo(0.4, 9);
    expect(at).toMatchObject({ frequencyHz: 10.368e9, belowFloor: false, suspects: [] });
  });

  it("names a loss below the floor that the match demands, and who may be wrong", async () => {
    const report = await pair(bare, "10 -6 0 -0.55 0 -0.55 0 -6 0\n11 -6 0 -0.55 0 -0.55 0 -6 0\n", 10.368);
    const [film] = report.sweeps;
    expect(film!.at).toMatchObject({ belowFloor: true });
    expect(film!.worstContradiction!.suspects).toHaveLength(3);
    // 10 log10[(1 - 10^-1.5)/(1 - 10^-0.6)]
    expect(film!.at!.floorDb).toBeCloseTo(1.1165, 3);
    expect(entryOfCover(report, "film")).toMatchObject({ retake: true });
  });

  it("says where the frequency lies outside, and has then nothing to write", async () => {
    const report = await pair(bare, bare, 12);
    expect(report.sweeps[0]!.at).toBeUndefined();
    expect(coversRead(report)).toEqual(["film"]);
    expect(entryOfCover(report, "film")).toBeUndefined();
  });

  it("refuses sweeps without a common frequency", async () => {
    await expect(pair(bare, bare.replace("10 ", "20 ").replace("11 ", "21 "))).rejects.toThrow(
      "holds no frequency",
    );
  });
});
