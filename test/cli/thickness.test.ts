import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { ThicknessStudy } from "../../src/study/thickness.ts";
import { changedDemo, demo, oilskin, scenarioFile, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const thickness = (...args: readonly string[]) => oilskin(["thickness", demo, ...args]);

function textOf(...args: readonly string[]): string {
  const { status, stdout, stderr } = thickness(...args);
  expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  return stdout;
}

function studyOf(...args: readonly string[]): ThicknessStudy {
  return JSON.parse(textOf(...args, "--json")) as ThicknessStudy;
}

/** Lines joined, so that a sentence may break anywhere. */
const flowing = (text: string) => text.replace(/\s+/g, " ");

describe("oilskin thickness", () => {
  it("answers first: thin limit, half wave and what it needs", () => {
    const text = textOf("--cover", "film");
    const answer = flowing(text.split("\n\n")[1]!);
    // 2.05, 0.0008 and 1.3648 mm lose 0.1 dB by Airy's closed form, evaluated apart from this program.
    expect(answer).toMatch(
      /^FEP film: up to 1\.36 mm costs less than 0\.1 dB on average over the unknown phase, up to 0\.\d+ mm in the worst\./,
    );
    // Half a wave in FEP: 299.792458/10.368/2/sqrt(2.05) mm.
    expect(answer).toContain("The half wave at 10.10 mm must be true to");
    expect(answer).toContain("(common practice, no source)");
  });

  it("fits 80 columns for every layered cover, and a printer: no character beyond ASCII", () => {
    for (const [name, covers] of [
      ["hilltop-contest", ["film", "sheet", "lid"]],
      ["coast-beacon", ["tube", "thin tube", "cap"]],
      ["town-link", ["laminate", "glassed", "bottle"]],
    ] as const) {
      for (const cover of covers) {
        const { status, stdout } = oilskin(["thickness", scenarioFile(name), "--cover", cover]);
        expect(status).toBe(0);
        expect(widest(stdout)).toBeLessThanOrEqual(80);
        expect(stdout).toMatch(/^[\n -~]*$/);
      }
    }
  });

  it("gives two gaps where the scenario knows the feed's phase", () => {
    const file = changedDemo(
      folder,
      "phase.yaml",
      "return_loss: 18 dB",
      "return_loss: 18 dB\n    phase: 60 deg",
    );
    const { stdout } = oilskin(["thickness", file, "--cover", "sheet"]);
    expect(flowing(stdout)).toContain(
      "With the feed's phase as given these gaps match it best at 10.368 GHz",
    );
    expect(stdout).not.toContain("average over the phase");
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });

  it("--csv gives the 2000 points for plotting", () => {
    const rows = csvParse(textOf("--cover", "sheet", "--from", "0", "--to", "10mm", "--csv"));
    expect(rows).toHaveLength(2000);
    expect(Number(rows[0]!["thickness_mm"])).toBe(0);
    expect(Number(rows[1999]!["thickness_mm"])).toBe(10);
    for (const row of rows) {
      const [low, nominal, high, worst] = ["cost_low_db", "cost_db", "cost_high_db", "cost_worst_db"].map(
        (column) => Number(row[column]),
      ) as [number, number, number, number];
      expect(low).toBeLessThanOrEqual(nominal);
      expect(nominal).toBeLessThanOrEqual(high);
      expect(high).toBeLessThanOrEqual(worst + 1e-12);
    }
  });

  it("--json holds all of it, by the options", () => {
    const study = studyOf(
      ...["--cover", "lid", "--from", "1/32in", "--to", "6mm", "--points", "11", "--cost", "0.2dB"],
      ...["--band", "200MHz", "--end", "receiver", "--stock", "1 mm, 1/8 in,5mil"],
    );
    expect(study).toMatchObject({ cover: "lid", end: "receiver", feed: "stub", costLimitDb: 0.2, toMm: 6 });
    expect(study.fromMm).toBeCloseTo(0.79375, 9);
    expect(study.bandGHz).toBeCloseTo(0.2, 12);
    expect(study.points).toHaveLength(11);
    expect(study.stock.map(({ label }) => label).sort()).toEqual(["1 mm", "1/8 in", "5mil"]);
  });

  it("--layer counts from the feed", () => {
    const glassed = (layer: string) =>
      oilskin(["thickness", scenarioFile("town-link"), "--cover", "glassed", "--layer", layer, "--json"]);
    expect((JSON.parse(glassed("1").stdout) as ThicknessStudy).layer).toBe(0);
    expect((JSON.parse(glassed("3").stdout) as ThicknessStudy).layer).toBe(2);
    expect(glassed("7")).toMatchObject({
      status: 2,
      stdout: "",
      stderr: '--layer: read "7", expected a whole number from 1 to 3\n',
    });
  });

  it("warns of a thickness beyond ten wavelengths and computes it all the same", () => {
    const text = textOf("--cover", "film", "--to", "300mm", "--points", "20");
    expect(flowing(text)).toMatch(/Warnings - covers\.film: a thickness of 10 wavelengths/);
  });

  it.each([
    [["--cover", "flm"], /no cover "flm".*did you mean film\?/],
    [["--cover", "bare"], /"bare" is bare: there is no layer to vary/],
    [["--cover", "cloth"], /"cloth" is given by readings alone: there is no layer to vary/],
    [["--cover", "film", "--layer", "7"], /--layer: read "7", expected 1 alone/],
    [["--cover", "film", "--layer", "one"], /--layer: read "one"/],
    [["--cover", "film", "--from", "5mm", "--to", "2mm"], /--to 2mm is not thicker than --from 5mm/],
    [["--cover", "film", "--to", "0"], /--to 0 is not thicker/],
    [["--cover", "film", "--to", "5"], /--to: read "5".*bare number; write 5 mm/],
    [["--cover", "film", "--to", "5 dB"], /--to: read "5 dB", expected a length/],
    [["--cover", "film", "--from", "-1mm"], /--from: read "-1mm", expected 0 to 1000 mm/],
    [["--cover", "film", "--points", "1"], /--points: read "1", expected a whole number from 2 to 20000/],
    [["--cover", "film", "--points", "1e3"], /--points: read "1e3"/],
    [["--cover", "film", "--cost", "0dB"], /--cost: read "0dB", expected 0.001 to 20 dB/],
    [["--cover", "film", "--band", "20 mm"], /--band: read "20 mm", expected a bandwidth/],
    [["--cover", "film", "--band", "11GHz"], /--band: read "11GHz", expected 1 Hz to the frequency/],
    [["--cover", "film", "--stock", "1 mm,"], /--stock: read ""/],
    [["--cover", "film", "--end", "middle"], /transmitter, receiver/],
    [["--cover", "film", "--json", "--csv"], /cannot be used with/],
    [[], /--cover/],
  ])("refuses %j with status 2", (args, message) => {
    const { status, stdout, stderr } = thickness(...args);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toMatch(message);
  });
});

describe("oilskin materials", () => {
  it("lists all with durability, water and source, within 80 columns", () => {
    const { status, stdout } = oilskin(["materials"]);
    expect(status).toBe(0);
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    expect(flowing(stdout)).toContain(
      "ASA: sun: years outdoors, bare (class A); water: mixed, contact angle 85 deg, takes up 0.25 % in a day; " +
        "use: -40 to 85 degC (supplier data). Figures: from memory (memory).",
    );
  });

  it("tells all of one by any of its names, quoted or not", () => {
    const { status, stdout } = oilskin(["materials", "FEP", "film"]);
    expect(status).toBe(0);
    expect(oilskin(["materials", "fep"]).stdout).toBe(stdout);
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    for (const part of [
      "permittivity 2.05 (2.01-2.1), loss tangent 0.0008 (0.0005-0.0012)",
      "at 10 GHz and 25 degC",
      "contact angle 108.5 deg",
      "use: -100 to 205 degC",
      "half wave: 10.10 mm (9.98 to 10.20 over its spread)",
      "Never heat a fluoropolymer film",
      "Switch the transmitter off",
    ])
      expect(flowing(stdout)).toContain(part);
  });

  it("cautions by the material: no etchant for a polyolefin, a dust mask for glass fibre", () => {
    const text = (name: string) => flowing(oilskin(["materials", name]).stdout);
    expect(text("HDPE")).not.toMatch(/fluoropolymer|etch/i);
    expect(text("FR-4")).toContain("dust mask");
    expect(text("HDPE")).not.toContain("dust mask");
    expect(text("ice")).not.toContain("Caution");
  });

  it("names what is near to a name that it does not know, with status 2", () => {
    const asked = (name: string) => oilskin(["materials", name]);
    expect(asked("polycarbonat")).toMatchObject({ status: 2, stdout: "" });
    expect(asked("policarbonate").stderr).toMatch(/did you mean polycarbonate\?/);
    expect(asked("PTF").stderr).toMatch(/did you mean PTFE sheet, .*PTFE-coated glass fabric\?/);
    expect(asked("zinc").stderr).toMatch(/`oilskin materials` lists them/);
  });
});
