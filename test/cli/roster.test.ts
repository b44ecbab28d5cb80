import { spawn } from "node:child_process";
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { csvParse } from "d3-dsv";
import { describe, expect, it } from "vitest";
import type { MarginReport } from "../../src/study/marginReport.ts";
import { writeTile } from "../scenario/terrain/tiles.ts";
import { changedDemo, demo, oilskin, programFile, root, shell, temporaryFolder, widest } from "./run.ts";

const folder = temporaryFolder();
const stations = join(root, "scenarios/roster.csv");
const onTheDay = ["--date", "2026-07-01"];
const flowing = (text: string) => text.replace(/\s+/g, " ");

const roster = (...args: readonly string[]) => oilskin(["roster", demo, ...args]);

function fileOf(name: string, text: string): string {
  const file = join(folder, name);
  writeFileSync(file, text);
  return file;
}

/** Stations round about, by a plain sequence of numbers that look random. */
function manyRows(count: number): string {
  let state = 1;
  const random = () => {
    state = (Math.imul(state, 1_103_515_245) + 12_345) >>> 0;
    return state / 2 ** 32;
  };
  const lines = Array.from({ length: count }, (_, i) => {
    const [latitude, longitude] = [51 + 5 * random(), -6 + 6 * random()].map((deg) => deg.toFixed(4));
    return `S${i},${latitude},${longitude},${Math.floor(600 * random())} m`;
  });
  return `name,latitude,longitude,ground\n${lines.join("\n")}\n`;
}

const some = fileOf("some.csv", manyRows(1500));

describe("oilskin roster", () => {
  it("prints the demo's stations in 80 columns, by heading, and says what it took for granted", () => {
    const { status, stdout, stderr } = roster(stations, ...onTheDay);
    expect([status, stderr]).toEqual([0, ""]);
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    const headings = [...stdout.matchAll(/^\S.*? {2,}\d+ {2,}~?(\d+\.\d) /gm)].map((match) =>
      Number(match[1]),
    );
    expect(headings).toHaveLength(10);
    expect(headings).toEqual(headings.toSorted((a, b) => a - b));
    expect(flowing(stdout)).toContain("1 station without a ground height: taken to stand at sea level, 0 m");
    expect(flowing(stdout)).toContain("no terrain: hills, trees and buildings in the way are not counted");
  });

  it("gives the scenario's own far end the margins of oilskin budget", () => {
    const { budgets } = JSON.parse(oilskin(["budget", demo, "--json"]).stdout) as MarginReport;
    const rows = csvParse(roster(stations, "--csv").stdout).filter(({ name }) => name === "Gannet Fell");
    for (const [prefix, weather] of [
      ["dry", "dry"],
      ["wet", "thunderstorm"],
    ] as const) {
      for (const mode of ["fm", "ssb"]) {
        const row = rows.find((one) => one["cover"] === "film" && one["mode"] === mode)!;
        const { marginDb } = budgets.find(
          ({ case: one }) => one.weather === weather && one.mode === mode && one.transmitter.cover === "film",
        )!;
        expect(Number(row[`${prefix}_out_db`])).toBeCloseTo(marginDb, 2);
        expect(row[`${prefix}_weather`]).toBe(weather);
      }
    }
  });

  it("has a row a station, own cover and mode as CSV, and a line a station as JSON", () => {
    const csv = csvParse(roster(stations, "--csv").stdout);
    // Two of the ten name their own mode; five covers with bare, two modes.
    expect(csv).toHaveLength(8 * 5 * 2 + 2 * 5);
    const lines = roster(stations, "--jsonl").stdout.trimEnd().split("\n");
    expect(lines.map((line) => JSON.parse(line).name)).toEqual([...new Set(csv.map(({ name }) => name))]);
  });

  it("is the same for any number of threads, and for several sites", () => {
    const sites = fileOf("sites.csv", "name,locator,ground,height\nSecond Hill,IO83lm,300 m,3 m\n");
    for (const args of [
      [some, "--csv"],
      [some, "--jsonl", "--sites", sites, "--within", "150 km"],
      [some, "--sort", "margin", "--top", "40", "--sites", sites],
    ]) {
      const alone = roster(...args, ...onTheDay, "--workers", "1");
      expect(alone.status).toBe(0);
      expect(alone.stdout.length).toBeGreaterThan(2000);
      expect(roster(...args, ...onTheDay, "--workers", "2")).toEqual(alone);
      expect(roster(...args, ...onTheDay, "--workers", "4")).toEqual(alone);
    }
  });

  it("works each station out from each site", () => {
    const sites = fileOf("hills.csv", "name,locator\nGannet side,IO84ig\nFar side,IO70aa\n");
    const { stdout, status } = roster(
      stations,
      "--csv",
      "--sites",
      sites,
      "--cover",
      "film",
      "--mode",
      "ssb",
    );
    expect(status).toBe(0);
    const rows = csvParse(stdout).filter(({ cover, name }) => cover === "film" && name === "Plover Edge");
    expect(rows.map(({ from }) => from)).toEqual(["Heron Scar", "Gannet side", "Far side"]);
    expect(new Set(rows.map((row) => row["distance_km"])).size).toBe(3);
    expect(flowing(roster(stations, "--sites", sites, "--top", "4").stdout)).toContain(
      "the table holds the 4 stations of each site with the most margin, 18 more are left out",
    );
  });

  it("keeps what its filters ask for", () => {
    const names = (...args: string[]) => [
      ...new Set(csvParse(roster(stations, "--csv", ...args).stdout).map(({ name }) => name)),
    ];
    const all = csvParse(roster(stations, "--csv").stdout);
    const wanted = (keep: (row: Record<string, string>) => boolean) => [
      ...new Set(all.filter((row) => keep(row as Record<string, string>)).map(({ name }) => name)),
    ];
    expect(names("--within", "150 km")).toEqual(wanted((row) => Number(row["distance_km"]) <= 150));
    expect(names("--beyond", "150 km")).toEqual(wanted((row) => Number(row["distance_km"]) >= 150));
    expect(names("--towards", "300..30")).toEqual(
      wanted((row) => Number(row["heading_true_deg"]) >= 300 || Number(row["heading_true_deg"]) <= 30),
    );
    const closing = names("--closes", "wet");
    expect(closing.length).toBeGreaterThan(0);
    expect(closing.length).toBeLessThan(all.length);
    expect(names("--closes")).toEqual(expect.arrayContaining(closing));
  });

  it("sorts, and keeps the best", () => {
    const of = (column: string, ...args: string[]) =>
      csvParse(roster(some, "--csv", "--cover", "film", "--mode", "ssb", ...args).stdout)
        .filter(({ cover }) => cover === "film")
        .map((row) => row[column]!);
    const all = of("wet_margin_db").map(Number);
    const best = of("wet_margin_db", "--top", "7", "--sort", "margin").map(Number);
    expect(best).toEqual(all.toSorted((a, b) => b - a).slice(0, 7));
    const near = of("distance_km", "--sort", "distance").map(Number);
    expect(near).toEqual(near.toSorted((a, b) => a - b));
    expect(near).toHaveLength(1500);
    expect(of("row", "--top", "5").map(Number)).toEqual(
      of("row", "--top", "5")
        .map(Number)
        .toSorted((a, b) => a - b),
    );
  });

  it("leaves the way back out for a beacon", () => {
    const beacon = join(root, "scenarios/coast-beacon.yaml");
    const { status, stdout } = oilskin(["roster", beacon, some, "--one-way", "--csv"]);
    expect(status).toBe(0);
    const rows = csvParse(stdout);
    expect(rows.every((row) => row["dry_back_db"] === "" && row["dry_out_db"] === row["dry_margin_db"])).toBe(
      true,
    );
  });

  it("tells true headings alone on a day that no magnetic model covers", () => {
    const { status, stdout } = roster(stations, "--date", "1990-01-01");
    expect(status).toBe(0);
    expect(flowing(stdout)).toContain("no magnetic headings");
    expect(flowing(stdout)).toContain("headings are true ones alone");
  });

  it("says that a profile of one path serves no roster", () => {
    const ridge = join(root, "scenarios/over-the-ridge.yaml");
    const { status, stdout } = oilskin(["roster", ridge, stations]);
    expect(status).toBe(0);
    expect(flowing(stdout)).toContain("over-the-ridge.csv is the profile of one path and serves no roster");
    expect(flowing(stdout)).toContain("trees of the scenario's path are left out");
  });

  it("sees the bulge of the Earth under a gap of the tiles", () => {
    mkdirSync(join(folder, "shore"));
    writeTile(join(folder, "shore"), "N53W004.hgt", 1201, () => 0);
    const shore = changedDemo(folder, "shore.yaml", "\n  from: {", "\n  terrain: shore\n  from: {");
    // A smooth Earth with no tiles and the same Earth with a gap of 300 km are the same path.
    const far = fileOf("far.csv", "name,locator,ground\nFar,JO02pp11,0 m\n");
    const [whole, holed] = [demo, shore].map(
      (own) =>
        csvParse(oilskin(["roster", own, far, "--csv", "--cover", "film", "--mode", "ssb"]).stdout)[0]!,
    );
    expect(holed!["terrain"]).toBe("gaps");
    expect([holed!["dry_way"], whole!["dry_way"]]).toEqual(["troposcatter", "troposcatter"]);
    expect(Math.abs(Number(holed!["dry_margin_db"]) - Number(whole!["dry_margin_db"]))).toBeLessThan(1);
  });

  it("counts the terrain of tiles, the same in every thread", () => {
    mkdirSync(join(folder, "dem"));
    writeTile(join(folder, "dem"), "N53W004.hgt", 1201, (row) => (Math.abs(row - 600) <= 2 ? 900 : 100));
    writeTile(join(folder, "dem"), "N54W004.hgt", 1201, () => 120);
    const hilly = changedDemo(folder, "hilly.yaml", "\n  from: {", "\n  terrain: dem\n  from: {");
    const args = ["roster", hilly, stations, "--csv", ...onTheDay];
    const alone = oilskin([...args, "--workers", "1"]);
    expect(oilskin([...args, "--workers", "2"])).toEqual(alone);
    const { budgets } = JSON.parse(oilskin(["budget", hilly, "--json"]).stdout) as MarginReport;
    const row = csvParse(alone.stdout).find(
      ({ name, cover, mode }) => name === "Gannet Fell" && cover === "film" && mode === "ssb",
    )!;
    const { marginDb, mechanisms } = budgets.find(
      ({ case: one }) => one.weather === "dry" && one.mode === "ssb",
    )!;
    expect(row["terrain"]).toBe("whole");
    expect(row["dry_way"]).toBe(mechanisms[0]!.name);
    expect(Number(row["dry_out_db"])).toBeCloseTo(marginDb, 2);
    expect(alone.stderr).toMatch(
      /the terrain does not reach 1 station \(dem: no height at the end of the path/,
    );
  });
});

describe("a faulty roster", () => {
  it("has its rows told with their places, and the rest done", () => {
    const file = fileOf(
      "faulty.csv",
      'name,locator,ground,mode\nGood,IO84aa,5 m,ssb\nBad,IO84aa,412,cww\n"Open,IO84ab,,\nTwo,IO85,,\nGOOD,io84AA,,\nHere,IO83jd07,,\n',
    );
    const { status, stdout, stderr } = roster(file, "--csv");
    expect(status).toBe(2);
    expect([...new Set(csvParse(stdout).map(({ name }) => name))]).toEqual(["Good", "Two"]);
    const faults = stderr.split("\n").filter((line) => line.startsWith(file));
    expect(faults).toEqual([
      expect.stringMatching(/faulty\.csv:3:12: ground: read "412", expected a length/),
      expect.stringMatching(/faulty\.csv:3:16: mode: no mode "cww", .*did you mean cw/),
      expect.stringMatching(/faulty\.csv:4:1: a quote that is opened and not closed/),
      expect.stringMatching(/faulty\.csv:6:1: the same station as in line 2, which stands/),
      expect.stringMatching(/faulty\.csv:7:1: the same place as Heron Scar/),
    ]);
    expect(stderr).toContain("5 faults; 4 rows left out, 2 rows done");
  });

  it.each([",", ";", "\t"])("passes over rows without anything in them, between %j", (separator) => {
    const rows = ["name,locator,note", "A,IO84aa,", ",,", "  , ,", "B,IO84ab,", ",,"];
    const text = rows.join("\r\n").replaceAll(",", separator);
    const { status, stdout } = roster(fileOf("blank.csv", text), "--jsonl");
    expect([status, stdout.trimEnd().split("\n").length]).toEqual([0, 2]);
    const sites = fileOf("blank-sites.csv", text);
    expect(roster(stations, "--sites", sites, "--jsonl").status).toBe(0);
  });

  it("finds a station written twice wherever it stands, and the first stands", () => {
    const rows = manyRows(1000);
    const file = fileOf("twice.csv", rows + rows.split("\n")[1]!.replace("S0", "s0"));
    const { status, stderr } = roster(file, "--csv", "--workers", "2");
    expect(status).toBe(2);
    expect(stderr).toContain(`${file}:1002:1: the same station as in line 2, which stands`);
    expect(stderr).toContain("1 fault; 1 row left out, 1000 rows done");
  });

  it("has so many faults listed, and the others counted", () => {
    const file = fileOf("all-bad.csv", `name,locator\n${"Bad,XX\n".repeat(500)}`);
    const { status, stderr } = roster(file, "--csv");
    expect(status).toBe(2);
    expect(stderr.split("\n").filter((line) => line.startsWith(file))).toHaveLength(20);
    expect(stderr).toContain("and 480 more");
    expect(stderr).toContain("500 faults; 500 rows left out, 0 rows done");
  });

  it.each([
    ["", /:1:1: the file is empty/],
    ["A,IO84aa\nB,IO84ab\n", /:1:1: no header: the first row reads "A,IO84aa"/],
    ["name,locator\n", /:1:1: a header and no stations below it/],
    ["name,locator,hight\nA,IO84aa,3 m\n", /:1:14: unknown column "hight".*did you mean height/],
    ["name\0", /binary/],
  ])("%j", (text, message) => {
    const { status, stderr } = roster(fileOf("odd.csv", text));
    expect(status).toBe(2);
    expect(stderr).toMatch(message);
    expect(stderr).not.toMatch(/\bat .*:\d+:\d+\)/); // no stack
  });

  it.each([
    [["nowhere.csv"], /nowhere\.csv:1:1: no such file/],
    [[root], /is a folder, expected a CSV file of stations/],
    [[stations, "--towards", "40-90"], /--towards: read "40-90", expected two true headings/],
    [[stations, "--within", "300"], /--within: read "300".*write 300 km/],
    [[stations, "--top", "0"], /--top: read "0", expected a whole number/],
    [
      [stations, "--within", "200km", "--beyond", "300km"],
      /--within 200km and --beyond 300km leave no distance/,
    ],
    [
      [stations, "--closes", "wet", "--wet", "dry"],
      /--closes wet: there is no wet weather beside the dry one/,
    ],
    [[stations, "--workers", "many"], /--workers: read "many"/],
    [[stations, "--dry", "drj"], /no weather "drj".*did you mean dry/],
    [[stations, "--mode", "cww"], /no mode "cww"/],
    [[stations, "--cover", "flim"], /no cover "flim".*did you mean film/],
    [[stations, "--csv", "--jsonl"], /cannot be used with/],
    [[stations, "--force"], /--force goes with --output/],
    [[stations, "--sites", "nowhere.csv"], /nowhere\.csv:1:1: no such file/],
  ])("%j is refused", (args, message) => {
    const { status, stdout, stderr } = roster(...args);
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr).toMatch(message);
  });

  it("of own sites stops everything, and says where", () => {
    const sites = fileOf("bad-sites.csv", "name,locator\nHill,IO8\n");
    const { status, stdout, stderr } = roster(stations, "--sites", sites);
    expect([status, stdout]).toEqual([2, ""]);
    expect(stderr).toMatch(/bad-sites\.csv:2:6: locator: read "IO8"/);
  });
});

describe("where a roster goes", () => {
  it("is a file, whole, and an old one is kept unless forced", () => {
    const file = join(folder, "out.csv");
    expect(roster(stations, "--csv", "--output", file).status).toBe(0);
    const text = readFileSync(file, "utf8");
    expect(text).toBe(roster(stations, "--csv").stdout);
    writeFileSync(file, "mine");
    const refused = roster(stations, "--csv", "--output", file);
    expect([refused.status, refused.stderr]).toEqual([2, `${file} exists already; --force replaces it\n`]);
    expect(readFileSync(file, "utf8")).toBe("mine");
    expect(roster(stations, "--csv", "--output", file, "--force").status).toBe(0);
    expect(readFileSync(file, "utf8")).toBe(text);
    expect(readdirSync(folder).filter((name) => name.includes(".part"))).toEqual([]);
  });

  it.each([0, 1, 2])("is never one of the files read, forced or not: %i", (which) => {
    const inputs = [
      fileOf("own.yaml", readFileSync(demo, "utf8")),
      fileOf("club.csv", "name,locator\nA,IO84aa\n"),
      fileOf("hills.csv", "name,locator\nHill,IO83aa\n"),
    ] as const;
    const [own, club, hills] = inputs;
    const before = readFileSync(inputs[which]!, "utf8");
    const output = `${folder}/.${inputs[which]!.slice(folder.length)}`; // another spelling of it
    const { status, stderr } = oilskin([
      "roster",
      own,
      club,
      "--sites",
      hills,
      "--output",
      output,
      "--force",
    ]);
    expect([status, stderr]).toEqual([2, `${output} is one of the files read; it is not replaced\n`]);
    expect(readFileSync(inputs[which]!, "utf8")).toBe(before);
  });

  it("may be a pipe that closes early", () => {
    const { status, stdout, stderr } = shell(
      `"$NODE" "$OILSKIN" roster ${demo} ${some} --csv --workers 2 | head -2 | wc -l; exit "\${PIPESTATUS[0]}"`,
    );
    expect([status, stdout.trim(), stderr]).toEqual([0, "2", ""]);
  });

  const long = fileOf("long.csv", manyRows(60_000));

  /** Starts a long roster, and interrupts it once it has something to show. */
  function interrupted(args: readonly string[], begun: () => boolean, signal: NodeJS.Signals = "SIGINT") {
    const child = spawn(process.execPath, [programFile, "roster", demo, long, ...args]);
    let [stdout, stderr] = ["", ""];
    child.stdout.on("data", (data) => {
      stdout += data;
    });
    child.stderr.on("data", (data) => {
      stderr += data;
    });
    const timer = setInterval(() => {
      if (!begun() && stdout.length < 100_000) return;
      clearInterval(timer);
      child.kill(signal);
    }, 20);
    return new Promise<{ status: number | null; stdout: string; stderr: string }>((resolve) => {
      child.on("close", (status) => {
        clearInterval(timer);
        resolve({ status, stdout, stderr });
      });
    });
  }

  it.each(["1", "2"])("keeps the finished rows of an interrupted run, %s threads", async (workers) => {
    const { status, stdout, stderr } = await interrupted(["--csv", "--workers", workers], () => false);
    expect(status).toBe(130);
    const done = Number(/interrupted after (\d+) stations; what is written stands/.exec(stderr)![1]);
    expect(done).toBeGreaterThan(0);
    expect(done).toBeLessThan(60_000);
    expect(stdout.endsWith("\n")).toBe(true);
    const rows = csvParse(stdout);
    expect(rows.map(({ row }) => Number(row))).toEqual(
      Array.from({ length: done }, (_, i) => Array.from({ length: 10 }, () => i + 2)).flat(),
    );
  });

  it.each([
    ["SIGINT", 130],
    ["SIGTERM", 143],
  ] as const)("leaves no file of a run that %s ends", async (signal, wanted) => {
    const file = join(folder, "cut.csv");
    const begun = () => readdirSync(folder).some((name) => name.startsWith("cut.csv"));
    const { status, stderr } = await interrupted(["--csv", "--output", file], begun, signal);
    expect(status).toBe(wanted);
    expect(stderr).toContain(`${file} is not written`);
    expect(readdirSync(folder).filter((name) => name.startsWith("cut.csv"))).toEqual([]);
    expect(existsSync(file)).toBe(false);
  });
});
