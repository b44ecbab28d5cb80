import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { changedDemo, demo, oilskin, scenarioFile, scenarioNames, temporaryFolder, widest } from "./run.ts";

/** What the scenario files say, read off by eye. */
const expected = {
  "hilltop-contest": {
    title: "Heron Scar to Gannet Fell",
    facts: "10.368 GHz, horizontal",
    covers: ["film *", "bare", "sheet", "lid", "cloth"],
    weathers: ["dry", "shower", "thunderstorm", "after the shower"],
  },
  "coast-beacon": {
    title: "Cormorant Head beacon to Sallow Hill",
    facts: "10.3689 GHz, horizontal",
    covers: ["tube / cap *", "bare", "tube", "thin tube", "cap"],
    weathers: ["dry", "drizzle at the cliff", "rain", "sea fog"],
  },
  "town-link": {
    title: "Millrace Court to Signal House",
    facts: "24.125 GHz, vertical",
    covers: ["laminate *", "bare", "glassed", "bottle"],
    weathers: ["dry", "steady rain", "cloudburst", "fog"],
  },
} as const;

/** Rows that every budget has, in the order in which the signal meets them. */
const chain = [
  "TRANSMITTER",
  "  transmitter power",
  "  line and joints",
  "  feed alone, mismatch",
  "  cover, mismatch",
  "  cover, heat",
  "PATH",
  "  free space",
  "  oxygen and water vapour",
  "RECEIVER",
  "  cover, heat",
  "  cover, mismatch",
  "  feed alone, mismatch",
  "  line and joints",
  "NOISE",
  "  290 K in the bandwidth",
  "  receiver's noise",
  "  sky and ground, ",
  "  line's noise",
  "  noise of feed and cover",
  "RESULT",
  "  signal to noise",
  "  needed",
  "  margin",
  "  one standard deviation",
  "  holds with",
  "  verdict",
];

/** A report as one paragraph, so that a sentence is found wherever its lines break. */
const unwrapped = (text: string) => text.replace(/\s+/g, " ");

/** Cuts of a report, by its headings. */
function between(text: string, from: string, to: string): string {
  const start = text.indexOf(from);
  return text.slice(start, text.indexOf(to, start));
}

describe.each(scenarioNames)("the margin report of %s", (name) => {
  const file = scenarioFile(name);
  const { status, stdout, stderr } = oilskin(["budget", file]);
  const report = JSON.parse(oilskin(["budget", file, "--json"]).stdout) as MarginReport;
  const { title, facts, covers, weathers } = expected[name];
  const matrices = between(stdout, "Margin in dB", "\ncloses: ");
  const table = between(stdout, "How it comes about", "\nWarnings");

  it("ends well and says nothing beside", () => {
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
  });

  it("fits 80 columns and ends every line without blanks", () => {
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    expect(stdout).not.toMatch(/[ \t]\n/);
  });

  it("begins with the title, then distance, frequency and headings", () => {
    const lines = stdout.split("\n");
    expect(lines[0]).toBe(title);
    expect(lines[1]).toBe(`${report.path.distanceKm.toFixed(1)} km at ${facts}`);
    expect(lines[2]).toContain(`heading ${report.path.headingDeg.toFixed(1)} deg`);
  });

  it("answers for each weather, with the margin of the scenario's own covers", () => {
    const sentence = unwrapped(between(stdout, "\n\n", "Margin in dB"));
    const { transmitter, receiver, mode } = report.budgets[0]!.case;
    for (const weather of weathers) {
      const own = report.budgets.find(
        ({ case: one }) =>
          one.weather === weather &&
          one.mode === mode &&
          one.transmitter.cover === transmitter.cover &&
          one.receiver.cover === receiver.cover,
      )!;
      const group = { closes: "closes in", thin: "is thin in", fails: "fails in" }[own.verdict];
      expect(sentence).toContain(group);
      const all = report.budgets.filter(
        ({ case: one }) =>
          one.mode === mode &&
          one.transmitter.cover === transmitter.cover &&
          one.receiver.cover === receiver.cover,
      );
      const alike = all.every(({ verdict }) => verdict === own.verdict);
      const least = Math.min(...all.map(({ marginDb }) => marginDb));
      expect(sentence).toContain(
        alike ? `${least.toFixed(1)} dB at the least` : `${weather} (${own.marginDb.toFixed(1)} dB`,
      );
    }
  });

  it("says what the scenario's own cover takes against the bare mouth, in each weather", () => {
    const sentence = unwrapped(between(stdout, "\n\n", "Margin in dB"));
    const own = covers[0].replace(" *", "");
    const costs = sentence.slice(sentence.indexOf(`The cover (${own}) takes`));
    for (const weather of weathers) {
      expect(costs).toMatch(new RegExp(`(\\d+\\.\\d dB|nothing that a bench could show) in ${weather}`));
    }
  });

  it("gives every cover a row in the matrix of every mode, the scenario's own first and starred", () => {
    const perMode = matrices.split("Margin in dB").slice(1);
    expect(perMode).toHaveLength(new Set(report.budgets.map(({ case: { mode } }) => mode)).size);
    for (const matrix of perMode) {
      const firstBlock = matrix.split("\n\n")[0]!.trimEnd();
      const rows = firstBlock.split("\n").slice(3);
      expect(rows.map((row) => row.split(/ {2,}/)[0])).toEqual(covers);
    }
  });

  it("prints in the matrices the margins, deviations and verdicts of the data, rounded", () => {
    for (const { marginDb, marginSigmaDb, verdict } of report.budgets) {
      expect(matrices).toContain(`${marginDb.toFixed(1)} ±${marginSigmaDb.toFixed(1)} ${verdict}`);
    }
  });

  it("says in the legend when a margin closes", () => {
    expect(unwrapped(stdout)).toMatch(/closes: \d+\.\d dB or more left, and holds with \d+ %/);
  });

  it("lists what happens on the way in order, from transmitter power to verdict", () => {
    for (const block of table.split("\n\n")) {
      let place = 0;
      for (const row of chain) {
        const found = block.indexOf(`\n${row}`, place);
        expect(found, `${row} after ${block.slice(place, place + 40)}`).toBeGreaterThanOrEqual(place);
        place = found + 1;
      }
    }
  });

  it("gives each weather its column in the table", () => {
    for (const weather of weathers) expect(table).toContain(`  ${weather}`);
  });

  it("prints the doubts of the data", () => {
    const warnings = unwrapped(between(stdout, "\nWarnings", "\nCaution"));
    expect(report.warnings.length).toBeGreaterThan(0);
    for (const { where, message } of report.warnings) expect(warnings).toContain(`${where}: ${message}`);
  });

  it("cautions against radio-frequency power, heights and lightning", () => {
    const cautions = unwrapped(between(stdout, "\nCaution", "\nNot in these figures"));
    for (const word of ["public limit", "Never look into a feed", "masts", "thunder"]) {
      expect(cautions).toContain(word);
    }
  });

  it("ends with what its figures leave out", () => {
    const last = unwrapped(stdout.slice(stdout.lastIndexOf("\n\n")));
    expect(last).toMatch(/^ Not in these figures: .*hills, trees and buildings.*multipath fading.*\. $/);
  });
});

describe("the table of a budget", () => {
  const { stdout } = oilskin(["budget", demo, "--weather", "shower", "--mode", "ssb"]);
  const report = JSON.parse(
    oilskin(["budget", demo, "--weather", "shower", "--mode", "ssb", "--json"]).stdout,
  ) as MarginReport;
  const rows = between(stdout, "How it comes about", "\nWarnings").split("\n");
  const figuresOf = (label: string) => {
    const row = rows.find((line) => line.startsWith(`  ${label}  `))!;
    return row
      .slice(label.length + 2)
      .trim()
      .split(/\s+/);
  };

  it("gives each entry its decibels and the level that it leaves", () => {
    const { entries } = report.budgets[0]!;
    const upTo = entries.findIndex(({ id }) => id === "path.free_space");
    const level = entries.slice(0, upTo + 1).reduce((sum, { db }) => sum + db, 0);
    expect(figuresOf("free space")).toEqual([entries[upTo]!.db.toFixed(1), level.toFixed(1)]);
  });

  it("leaves the received level after the receiver's line", () => {
    const lines = rows.filter((line) => line.startsWith("  line and joints"));
    expect(lines[1]!.trim().split(/\s+/).at(-1)).toBe(report.budgets[0]!.receivedDbm.toFixed(1));
  });

  it("leaves the system's noise after feed and cover", () => {
    const last = rows[rows.indexOf("RESULT") - 1]!;
    expect(last).toMatch(/^ {2}noise of feed and cover/);
    expect(last.split(/\s+/).at(-1)).toBe(report.budgets[0]!.noiseDbm.toFixed(1));
  });

  it("ends with the results of the data", () => {
    const { snrDb, requiredSnrDb, marginDb, verdict } = report.budgets[0]!;
    expect(figuresOf("signal to noise")).toEqual([snrDb.toFixed(1)]);
    expect(figuresOf("needed")).toEqual([requiredSnrDb.toFixed(1)]);
    expect(figuresOf("margin")).toEqual([marginDb.toFixed(1)]);
    expect(figuresOf("verdict")).toEqual([verdict]);
  });
});

describe("budget --detail", () => {
  const { status, stdout, stderr } = oilskin(["budget", demo, "--detail", "--weather", "shower"]);
  const detail = between(stdout, "Every entry in shower", "\nWarnings");
  const { budgets } = JSON.parse(oilskin(["budget", demo, "--json"]).stdout) as MarginReport;
  const budget = budgets.find(({ case: { weather } }) => weather === "shower")!;

  it("ends well within 80 columns", () => {
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });

  it("prints value and deviation of every entry, and the first word of its source", () => {
    for (const { id, db, sigma, source } of [...budget.entries, ...budget.noiseEntries, budget.requirement]) {
      const row = detail.split("\n").find((line) => line.startsWith(`${id} `))!;
      expect(row, id).toContain(db.toFixed(2).replace("-0.00", "0.00"));
      if (sigma !== 0) expect(row, id).toContain(sigma.toFixed(2));
      expect(row, id).toContain(source.split(" ")[0]);
    }
  });

  it("prints low and high where they differ", () => {
    const bounded = budget.entries.find(({ id }) => id === "tx.water_loss")!;
    const row = detail.split("\n").find((line) => line.startsWith("tx.water_loss "))!;
    expect(bounded.low).toBeLessThan(bounded.high);
    expect(row).toContain(` ${bounded.low.toFixed(2)} `);
  });

  it("names the Recommendations that the path stands on", () => {
    for (const source of ["P.525-4", "P.676-13", "P.838-3"]) expect(detail).toContain(source);
  });
});

describe("long names", () => {
  const folder = temporaryFolder();

  it("a weather of a long name stays within 80 columns", () => {
    const file = changedDemo(
      folder,
      "weather.yaml",
      "after the shower:",
      "long after the shower at the scar:",
    );
    const { stdout } = oilskin(["budget", file]);
    expect(stdout).toContain("long after the shower at the scar");
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });

  it("a weather's name stands flush with the end of its figures", () => {
    const file = changedDemo(folder, "flush.yaml", "after the shower:", "long after the shower at the scar:");
    const table = between(oilskin(["budget", file]).stdout, "How it comes about", "\nWarnings");
    const rows = table.split("\n");
    const heading = rows.find((row) => row.includes("long after the shower"))!;
    const units = rows[rows.indexOf(heading) + 1]!;
    const end = heading.indexOf("at the scar") + "at the scar".length;
    expect(units.slice(end - 3, end)).toBe("dBm");
  });

  it("a cover of a long name stays within 80 columns", () => {
    const file = changedDemo(folder, "cover.yaml", "  cloth:", "  cloth of an old tent, twice folded:");
    expect(widest(oilskin(["budget", file]).stdout)).toBeLessThanOrEqual(80);
  });

  it("a long title is broken at a word", () => {
    const title =
      "Heron Scar to Gannet Fell, as tried in the wet October contest with the small set and horn";
    const file = changedDemo(folder, "title.yaml", "Heron Scar to Gannet Fell", title);
    const { stdout } = oilskin(["budget", file]);
    expect(unwrapped(stdout)).toContain(title);
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });
});

describe("a path that fails", () => {
  const folder = temporaryFolder();
  const file = changedDemo(folder, "weak.yaml", "power: 10 mW", "power: -60 dBm");
  const { status, stdout } = oilskin(["budget", file]);

  it("is a finding and no fault of the program", () => {
    expect(status).toBe(0);
  });

  it("says so in the answer and in the matrix", () => {
    expect(unwrapped(stdout)).toContain("Narrow FM voice fails in every weather (-");
    expect(stdout).toMatch(/bare .*-\d+\.\d ±\d\.\d fails/);
  });
});

describe("a scenario without rain", () => {
  const folder = temporaryFolder();
  const text = readFileSync(demo, "utf8");
  const weather = text.slice(text.indexOf("weather:"), text.indexOf("decision:"));
  const { stdout } = oilskin(["budget", changedDemo(folder, "dry.yaml", weather, "")]);

  it("is judged in dry weather", () => {
    expect(unwrapped(stdout)).toMatch(/Narrow FM voice closes in dry \(\d+\.\d dB\)\./);
  });

  it("has no row of water, and no word on the statistics of rain", () => {
    expect(stdout).not.toContain("water on it");
    expect(unwrapped(stdout)).not.toContain("long-term statistics of rain");
  });

  it("says what a cover over a dish takes, the sum of its rows", () => {
    const file = changedDemo(folder, "roofed.yaml", "dish: tripod,", "dish: tripod, dish_cover: sheet,");
    const report = JSON.parse(oilskin(["budget", file, "--mode", "fm", "--json"]).stdout) as MarginReport;
    const [first] = report.budgets;
    const taken = first!.entries
      .filter(({ id }) => id.startsWith("rx.dish_cover"))
      .reduce((sum, { db }) => sum - db, 0);
    expect(taken).toBeGreaterThan(0.2);
    const text = oilskin(["budget", file]).stdout.replace(/\s+/g, " ");
    expect(text).toContain(
      `The cover over the receiver's dish (sheet) takes ${taken.toFixed(1)} dB in ${first!.case.weather}`,
    );
    expect(text).toContain("beside the noise that it adds");
  });
});
