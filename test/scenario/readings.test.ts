import { describe, expect, it } from "vitest";
import { bench, faultsIn, file, folder, readingsIn } from "./readingsFiles.ts";

async function lossOf(content: string | Uint8Array, name = "bench.csv"): Promise<number> {
  const { table } = await readingsIn(file(name, content));
  return table!.series[0]!.running.covers[0]!.lossDb;
}

/** The bench with a text replaced. */
function spoiled(from: string | RegExp, to: string): string {
  const text = bench.replace(from, to);
  if (text === bench) throw new Error(`the bench holds no ${from}`);
  return text;
}

describe("a CSV of readings", () => {
  it("is read with its lines, states and unit", async () => {
    const { table } = await readingsIn(file("bench.csv", bench));
    expect(table).toMatchObject({ rows: 5, timeInSeconds: true, covers: ["film"], notes: [], doubts: [] });
    const [level] = table!.series;
    expect(level).toMatchObject({ figure: "level", unit: "dB", count: 5 });
    expect(level!.readings!.map(({ line }) => line)).toEqual([3, 4, 5, 6, 7]);
    expect(level!.readings!.map(({ state }) => state)).toEqual(["open", "film", "open", "film", "open"]);
    expect(level!.running.covers[0]!.lossDb).toBeCloseTo(0.2, 9);
  });

  it.each<[what: string, content: string | Uint8Array]>([
    ["line ends of Windows", bench.replaceAll("\n", "\r\n")],
    ["line ends of old", bench.replaceAll("\n", "\r")],
    ["a byte-order mark", `\ufeff${bench}`],
    ["no line end at its end", bench.trimEnd()],
    ["semicolons", bench.replaceAll(",", ";")],
    ["tabs", bench.replaceAll(",", "\t")],
    ["quoted cells", bench.replaceAll("film", '"film"').replaceAll("-40.00", '" -40.00"')],
    ["comments and empty lines", bench.replace("20,", "\n# the wind got up, then fell\n\n20,")],
    ["minutes", bench.replace("time s", "time [min]")],
    [
      "time of day",
      bench.replace("time s", "time").replace(/^(\d+),/gm, (_, s) => `09:59:${s.padStart(2, "0")},`),
    ],
    [
      "dates",
      bench
        .replace("time s", "time")
        .replace(/^(\d+),/gm, (_, s) => `2031-05-01 23:59:${s.padStart(2, "0")},`),
    ],
    ["an order", bench.replace("time s", "order")],
    ["no time at all", bench.replace("time s,", "").replace(/^\d+,/gm, "")],
    ["the unit in its cells", bench.replace("level dB", "level").replace(/(-40.\d\d)/g, "$1 dBm")],
    ["another way to write a unit", bench.replace("level dB", "Level (dBm)")],
    ["and another", bench.replace("level dB", "level_db")],
    ["columns in another order", bench.replace(/^(.*?),(.*?),(.*)$/gm, "$3,$1,$2")],
    ["a separator at the end of each line", bench.replace(/^([^#\n].*)$/gm, "$1,")],
    ["a typographic minus", bench.replaceAll("-", "−")],
    ["a name in quotes with a comma and a quote", bench.replaceAll("film", '"film, ""thin"""')],
    ["bare in capitals", bench.replaceAll("bare", "BARE")],
  ])("may have %s", async (_, content) => {
    expect(await lossOf(content)).toBeCloseTo(0.2, 9);
  });

  it("keeps counts of averages and notes, with the line on which a row begins", async () => {
    const { table } = await readingsIn(
      file(
        "notes.csv",
        'state,level dB,averages,note\nbare,-40,16,\nfilm,-40.2,16,"a gust\nshook it"\nbare,-40,64,still\nfilm,-40.2,,\nbare,-40,16,\n',
      ),
    );
    expect(table).toMatchObject({
      timeInSeconds: false,
      averages: { least: 16, most: 64 },
      notes: [
        { line: 3, text: "a gust\nshook it" },
        { line: 5, text: "still" },
      ],
    });
    expect(table!.doubts).toMatchObject([{ message: expect.stringContaining("16 to 64 averages") }]);
  });

  it("may hold levels and return losses side by side, a cell left empty", async () => {
    const rows = "bare,-40,15\nfilm,-40.2,\nfilm,,13\nbare,-40,15\nfilm,-40.2,13\nbare,-40,15\n";
    const { table } = await readingsIn(file("both.csv", `state,level dBm,return loss dB\n${rows}`));
    expect(table!.series.map(({ figure, count }) => [figure, count])).toEqual([
      ["level", 5],
      ["return loss", 5],
    ]);
    expect(table!.series[1]!.running.covers[0]!.lossDb).toBeCloseTo(2, 9);
  });

  it("takes a level reflected for a return loss with the sign turned", async () => {
    const rows = "bare,-15\nfilm,-13\nbare,-15\nfilm,-13\nbare,-15\n";
    expect(await lossOf(`state,reflected dBm\n${rows}`)).toBeCloseTo(2, 9);
  });

  it("doubts a state that occurs once beside one of nearly its name", async () => {
    const { table } = await readingsIn(file("once.csv", `${bench}50,flim,-40.2\n60,bare,-40.06\n`));
    expect(table!.doubts).toEqual([
      { line: 8, message: 'the state "flim" occurs once (did you mean film?)' },
    ]);
  });
});

describe("a spoiled CSV of readings", () => {
  it.each<[what: string, content: string | Uint8Array, ...said: string[]]>([
    ["an empty file", "", "1: no readings"],
    ["comments alone", "# later\n", "1: no readings"],
    ["a header alone", "time s,state,level dB\n", "1: a header and no readings"],
    ["an unknown column", spoiled("level dB", "level dB,colour"), '2: unknown column "colour"'],
    ["a column twice", spoiled("level dB", "level dB,level dB"), "2: the column level twice"],
    ["no state", spoiled("state", "note"), "2: no column state"],
    ["no level", spoiled("level dB", "note"), "2: no column level, return loss or reflected"],
    ["time and order", spoiled("level dB", "level dB,order"), "2: both time and order"],
    ["a unit that is none of a level", spoiled("level dB", "level [mW]"), '2: the unit "mw"'],
    ["no unit anywhere", spoiled("level dB", "level"), '3: level: read "-40.00", a number without a unit'],
    ["units mixed in a column", spoiled("-40.23", "-40.23 dBm"), "6: level: read", "the header says dB"],
    [
      "units mixed in the cells",
      spoiled("level dB", "level").replace("-40.00", "-40.00 dB").replace("-40.21", "-40.21 dBm"),
      "4: level: read",
      "line 3 has dB",
    ],
    ["a word for a number", spoiled("-40.23", "much"), '6: level: read "much", expected a number in dB'],
    ["not a number", spoiled("-40.23", "NaN"), '6: level: read "NaN"'],
    ["an endless number", spoiled("-40.23", "1e999"), "6: level"],
    ["a stop-gap for no reading", spoiled("-40.23", "-9999"), "6: level", "-300 to 300"],
    [
      "a decimal comma among commas",
      spoiled("-40.23", "-40,23"),
      "6: 4 cells under 3 headings",
      "decimal comma",
    ],
    [
      "a decimal comma among semicolons",
      "state;level dB\nbare;-40,00\n",
      '2: level: read "-40,00"',
      "write -40.00 with a point",
    ],
    ["an unsorted time", spoiled("20,bare", "5,bare"), '5: time: read "5", an earlier time than line 4'],
    ["the same time twice", spoiled("20,bare", "10,bare"), '5: time: read "10", the same time as line 4'],
    ["a time that is none", spoiled("20,bare", "noon,bare"), '5: time: read "noon"'],
    [
      "times of two kinds",
      spoiled("20,bare", "10:00,bare"),
      "5: time",
      "a time of day, where the column began with a plain number",
    ],
    ["no state in a row", spoiled("20,bare", "20,"), "5: state: read an empty text"],
    ["open for bare", spoiled("20,bare", "20,open"), '5: state: read "open"; write bare'],
    ["bare alone", bench.replaceAll("film", "bare"), "7: every reading is bare"],
    ["no bare", bench.replaceAll("bare", "film"), "7: no reading of state bare"],
    ["a missing pair", bench.replace(/40,bare.*\n/, ""), "6: too few pairs"],
    ["a last line cut off", bench.replace(",-40.04\n", ""), "7: no level in this row; is the file cut off?"],
    ["a last cell cut off", bench.replace("-40.04\n", "-"), '7: level: read "-"'],
    ["a quote left open", spoiled("30,film", '30,"film'), "6: a quote"],
    ["a quote inside a cell", spoiled("30,film", '30,fi"lm'), "6: a quote inside a cell"],
    ["a binary file", Buffer.from([0x50, 0x4b, 3, 4, 0, 0]), "1: is a binary file"],
    ["Latin-1", Buffer.from(spoiled("film", "H\u00f6he"), "latin1"), "1: is no text in UTF-8"],
    ["UTF-16", Buffer.from(`\ufeff${bench}`, "utf16le"), "1: is"],
    ["an endless row", `state,level dB\n${"x".repeat(20_000)}\n`, "2: a row longer than"],
    ["averages that are none", "state,level dB,averages\nbare,-40,many\n", '2: averages: read "many"'],
    [
      "a return loss with the sign of S11",
      "state,return loss dB\nbare,-15\n",
      "2: return loss",
      "is a return loss of 15 dB",
    ],
  ])("%s is refused by line", async (_, content, start, ...said) => {
    const faults = await faultsIn(file("spoiled.csv", content));
    const fault = faults.find((one) => one.startsWith(start!));
    expect(faults.join("\n")).toContain(start);
    for (const words of said) expect(fault).toContain(words);
  });

  it("has all its faults told at once", async () => {
    const faults = await faultsIn(
      file("many.csv", spoiled("-40.00", "x").replace("20,bare", "2,bare").replace("-40.23", "")),
    );
    expect(faults.map((one) => one.split(":")[0])).toEqual(["3", "5", "6"]);
  });

  it("of a heap of faults shows the first hundred and counts the rest", async () => {
    const faults = await faultsIn(file("heap.csv", `state,level dB\n${"bare,x\nfilm,x\n".repeat(2500)}`));
    expect(faults).toHaveLength(101);
    expect(faults.at(-1)).toBe("5001: 4900 more like these, the last of them here");
  });

  it("that is none at all is refused", async () => {
    expect(await faultsIn(`${folder}/none.csv`)).toEqual(["1: no such file"]);
    expect((await faultsIn(folder))[0]).toContain("is a folder");
    expect((await faultsIn("/dev/null"))[0]).toContain("no plain file");
  });
});

const yaml = `# invented
title: film on the horn
frequency: 10.4 GHz
repeatability: 0.02 dB
confidence: 90 %
wanted: 0.05 dB
return_losses: { bare: 15 dB, film: 14 dB }
coupler: { directivity: 35 dB, source_match: 25 dB, open: -10 dB }
readings:
  - { order: 1, state: bare, level: -40.00 dBm }
  - { order: 2, state: film, level: -40.21 dBm, note: windy }
  - { order: 3, state: bare, level: -40.02 dBm, averages: 16 }
  - { order: 4, state: film, level: -40.23 dBm }
  - { order: 5, state: bare, level: -40.04 dBm }
`;

describe("a YAML of readings", () => {
  it("holds the same and more", async () => {
    const readings = await readingsIn(file("bench.yaml", yaml));
    expect(readings).toMatchObject({
      title: "film on the horn",
      frequencyGHz: 10.4,
      repeatabilityDb: 0.02,
      confidence: 0.9,
      wantedDb: 0.05,
      returnLossesDb: { bare: 15, film: 14 },
      coupler: { directivityDb: 35, sourceMatchDb: 25, openDb: -10 },
      table: { rows: 5, notes: [{ line: 11, text: "windy" }], averages: { least: 16, most: 16 } },
    });
    expect(readings.table!.series[0]!.running.covers[0]!.lossDb).toBeCloseTo(0.2, 9);
    expect(readings.table!.series[0]!.unit).toBe("dBm");
  });

  it("names a CSV beside it, and sweeps", async () => {
    file("beside.csv", bench);
    file("bare.s1p", "# GHz S DB R 50\n10 -15 0\n11 -15 0\n");
    file("film.s1p", "# GHz S DB R 50\n10 -13 0\n11 -13 0\n");
    const readings = await readingsIn(
      file("names.yaml", "table: beside.csv\nsweeps: { bare: bare.s1p, film: film.s1p }\n"),
    );
    expect(readings.table!.covers).toEqual(["film"]);
    expect(Object.keys(readings.sweeps)).toEqual(["bare", "film"]);
    expect(readings.sweeps["film"]!.points[1]!.frequencyHz).toBe(11e9);
  });

  it.each<[what: string, content: string, ...said: string[]]>([
    ["an unknown key", yaml.replace("wanted", "wnated"), '6: unknown key "wnated"', "did you mean wanted?"],
    ["an unknown key of a row", yaml.replace("note", "remark"), '11: unknown key "remark"'],
    ["a bare number", yaml.replace("10.4 GHz", "10.4"), "3: ", "bare number"],
    ["a reading that is no number", yaml.replace("-40.23 dBm", "loud"), '13: level: read "loud"'],
    ["units mixed", yaml.replace("-40.23 dBm", "-40.23 dB"), "13: level", "line 10 has dBm"],
    ["an unsorted order", yaml.replace("order: 3", "order: 1"), "12: time: read"],
    [
      "a return loss of a state that never occurs",
      yaml.replace("film: 14 dB", "flim: 14 dB"),
      '7: no reading of "flim", expected bare, film (did you mean film?)',
    ],
    ["nothing to reduce", "frequency: 10 GHz\n", "1: missing readings (or table, sweeps)"],
    ["both kinds of table", `${yaml}table: bench.csv\n`, "both table and readings"],
    ["a table that is not there", "table: none.csv\n", "1: no such file"],
    ["a sweep that is not there", "sweeps: { bare: none.s1p, film: none2.s1p }\n", "1: no such file"],
    ["a sweep by another name", "sweeps: { bare: a.txt, film: b.txt }\n", "1: read", ".s1p or .s2p"],
    ["no bare sweep", "# x\nsweeps: { film: none.s1p }\n", "2: sweeps of bare and of one cover"],
    ["an empty file", "", "1: the file is empty"],
    ["a broken file", "readings: [\n", "1:"],
  ])("with %s is refused by line", async (_, content, start, ...said) => {
    const faults = await faultsIn(file("spoiled.yaml", content));
    expect(faults.join("\n")).toContain(start);
    for (const words of said) expect(faults.join("\n")).toContain(words);
  });

  it.each<[what: string, content: string, said: string]>([
    ["cut off", "# GHz S DB R 50\n10 -15 0\n11 -15\n", "3: the last record is not complete"],
    ["without data", "# GHz S DB R 50\n", "no data"],
    ["unsorted", "# GHz S DB R 50\n10 -15 0\n9 -15 0\n", "3: frequency 9 does not rise"],
    ["of more than total reflection", "# GHz S MA R 50\n10 1.2 0\n", "|S11| of 1.2 at 10000000000 Hz"],
    ["with a word for a number", "# GHz S MA R 50\n10 x 0\n", "2: x stands where a number must stand"],
  ])("names the line of a sweep that is %s", async (_, content, said) => {
    file("bad.s1p", content);
    file("good.s1p", "# GHz S DB R 50\n10 -15 0\n");
    const faults = await faultsIn(file("sweeps.yaml", "sweeps: { bare: good.s1p, film: bad.s1p }\n"));
    expect(faults).toHaveLength(1);
    expect(faults[0]).toContain(said);
  });
});
