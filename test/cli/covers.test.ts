import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { CoverVerdict } from "../../src/study/coverVerdict.ts";
import { changedDemo, demo, oilskin, scenarioFile, scenarioNames, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();

function textOf(file: string, ...args: readonly string[]): string {
  const { status, stdout, stderr } = oilskin(["covers", file, ...args]);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return stdout;
}

const verdictOf = (file: string, ...args: readonly string[]) =>
  JSON.parse(textOf(file, ...args, "--json")) as CoverVerdict;
const flowing = (text: string) => text.replace(/\s+/g, " ");

describe("oilskin covers", () => {
  it.each(scenarioNames)("judges the covers of %s on a page of 80 columns", (name) => {
    const text = textOf(scenarioFile(name));
    expect(widest(text)).toBeLessThanOrEqual(80);
    expect(text).toMatch(/^[\n -~]*$/);
    expect(text).not.toMatch(/NaN|undefined|Infinity|-0\.0\b/);
    expect(text).not.toMatch(/\bsafe/i);
    for (const part of ["Match at the feed", "Rain that uses the margin up", "Outdoors", "Caution"]) {
      expect(text).toContain(part);
    }
  });

  it("answers first, a sentence for each cover, in words that follow from the figures", () => {
    const text = textOf(demo);
    const { covers, worstWeather } = verdictOf(demo);
    expect(worstWeather).toBe("thunderstorm");
    const sentences = flowing(text.split("\n\n")[2]!);
    for (const [i, { cover, rows }] of covers.entries()) {
      const { marginDb, verdict, bareVerdict } = rows.find(
        ({ weather, placing }) => weather === worstWeather && placing === "both",
      )!;
      expect(sentences).toContain(`${i + 1} ${cover}: `);
      expect(sentences).toContain(`${marginDb.toFixed(1)} dB left in thunderstorm`);
      if (cover !== "bare" && verdict !== bareVerdict) {
        expect(sentences).toContain(`and that turns \`${bareVerdict}\` into \`${verdict}\``);
      }
    }
    // A film of a twentieth of an inch by ten is below what a bench can show; the measured cloth is not.
    expect(sentences).toMatch(
      /film: costs 0\.0 dB dry, indistinguishable from bare at a bench's repeatability/,
    );
    expect(sentences).toContain("cloth: costs 0.4 dB dry;");
  });

  it("knows only the weathers asked for", () => {
    const verdict = verdictOf(demo, "--weather", "dry", "--weather", "shower");
    expect(verdict.weathers).toEqual(["dry", "shower"]);
    expect(verdict.worstWeather).toBe("shower");
    const text = textOf(demo, "--weather", "dry");
    expect(text).not.toContain("thunderstorm");
    expect(flowing(text)).toContain("best first by the margin left in dry");
    expect(text).not.toMatch(/wet at/);
  });

  it("--mode judges by another mode, the costs unchanged", () => {
    const [fm, ssb] = [verdictOf(demo, "--mode", "fm"), verdictOf(demo, "--mode", "ssb")];
    expect(verdictOf(demo).mode).toBe("fm");
    expect(ssb.mode).toBe("ssb");
    const costs = ({ covers }: CoverVerdict) =>
      Object.fromEntries(
        covers.map(({ cover, rows }) => [cover, rows.map(({ costDb }) => costDb.toFixed(9))]),
      );
    expect(costs(ssb)).toEqual(costs(fm));
    expect(ssb.covers[0]!.rows[0]!.marginDb).toBeGreaterThan(fm.covers[0]!.rows[0]!.marginDb + 3);
    expect(ssb.covers[0]!.breakEven.zeroMmPerH).toBeGreaterThan(fm.covers[0]!.breakEven.zeroMmPerH!);
  });

  it("--band widens the ripple and is told", () => {
    const ripple = (...args: readonly string[]) =>
      verdictOf(demo, ...args).covers.find(({ cover }) => cover === "lid")!.rippleDb!.receiver;
    expect(ripple("--band", "800 MHz")).toBeGreaterThan(ripple("--band", "0.1 GHz"));
    expect(textOf(demo, "--band", "500MHz")).toContain("Ripple over a band of 500 MHz");
    expect(verdictOf(demo).bandGHz).toBeCloseTo(0.02 * 10.368, 9);
  });

  it("--csv holds the figures of --json, best cover first", () => {
    const rows = csvParse(textOf(demo, "--csv"));
    const { covers } = verdictOf(demo);
    const flat = covers.flatMap(({ cover, rows }) => rows.map((row) => ({ cover, ...row })));
    expect(rows).toHaveLength(flat.length);
    for (const [i, row] of rows.entries()) {
      const { cover, weather, placing, marginDb, costDb, noiseAddedK } = flat[i]!;
      expect([row["cover"], row["weather"], row["covered_at"]]).toEqual([cover, weather, placing]);
      expect([row["margin_db"], row["cost_db"], row["noise_added_k"]].map(Number)).toEqual([
        marginDb,
        costDb,
        noiseAddedK,
      ]);
    }
  });

  it("refuses what it does not know and names the nearest", () => {
    const refused = (...args: readonly string[]) => {
      const { status, stdout, stderr } = oilskin(["covers", demo, ...args]);
      expect(stdout).toBe("");
      expect(status).not.toBe(0);
      return flowing(stderr);
    };
    expect(refused("--weather", "showr")).toContain('no weather "showr"');
    expect(refused("--weather", "showr")).toContain("did you mean shower?");
    expect(refused("--mode", "sbs")).toContain('no mode "sbs"');
    expect(refused("--band", "wide")).toContain("--band");
    expect(refused("--band", "30 GHz")).toContain("--band");
    expect(refused("--band", "-1 GHz")).toContain("--band");
    expect(refused("--json", "--csv")).toMatch(/cannot be used with/);
  });

  it("says plainly what no passive sheet could read, and keeps the reading", () => {
    const file = changedDemo(
      folder,
      "gain.yaml",
      "insertion_loss: 0.22 dB +/- 0.04 dB, return_loss_change: 2.7 dB",
      "insertion_loss: -0.9 dB",
    );
    const text = flowing(textOf(file));
    expect(text).toContain("a gain of 0.9 dB is more than any cover can give this feed");
    expect(text).toMatch(/cloth: wins 1\.8 dB dry/);
    const forbidden = changedDemo(
      folder,
      "floor.yaml",
      "insertion_loss: 0.22 dB +/- 0.04 dB, return_loss_change: 2.7 dB",
      "insertion_loss: 0.02 dB +/- 0.01 dB, return_loss_change: 9 dB",
    );
    expect(flowing(textOf(forbidden))).toMatch(/energy balance asks for at least \d\.\d\d dB/);
  });

  it("warns of a layer of nothing, of one too thick and of a gap too wide, and still judges", () => {
    const file = changedDemo(
      folder,
      "extremes.yaml",
      "layers: [{ material: polycarbonate, thickness: 2 mm }]",
      "layers: [{ material: polycarbonate, thickness: 0 mm }, { material: PETG, thickness: 300 mm }]\n    gap: 400 mm",
    );
    const text = flowing(textOf(file, "--weather", "dry"));
    expect(text).toContain("the layer of polycarbonate has no thickness and does nothing");
    expect(text).toContain("the layer of PETG is more than ten wavelengths thick");
    expect(text).toContain("a gap of 400 mm is more than ten wavelengths");
  });

  it("judges a scenario that covers a dish, the feed behind it dry", () => {
    const file = changedDemo(
      folder,
      "shell.yaml",
      "feed: stub, cover: film }",
      "feed: stub, cover: film, dish_cover: cloth }",
    );
    expect(flowing(textOf(file))).toContain("Over the dish: cloth (receiver).");
    const sheet = verdictOf(file).covers.find(({ cover }) => cover === "sheet")!;
    for (const { placing, waterCostDb } of sheet.rows) {
      if (placing === "receiver") expect(waterCostDb.nominal).toBe(0);
    }
  });
});
