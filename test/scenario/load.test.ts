import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, it, vi } from "vitest";
import { loadScenario } from "../../src/scenario/load.ts";
import type { Diagnostic } from "../../src/scenario/types.ts";
import { faultsOf, sample, scenarioOf, spoiled, withoutMark } from "./sample.ts";

/** Counts how often the arithmetic, and with it mathjs, is taken into memory. */
const arithmetic = vi.hoisted(() => ({ loaded: 0 }));
vi.mock("../../src/scenario/mathUnits.ts", async (original) => {
  arithmetic.loaded += 1;
  return original();
});

const demo = readFileSync(new URL("../../scenarios/hilltop-contest.yaml", import.meta.url), "utf8");

describe("a sound scenario", () => {
  it("is read in canonical units, without the arithmetic in memory", async () => {
    const { transmitter, receiver, feeds, covers, dish, path, weather, decision } = await scenarioOf(sample);
    expect(transmitter.powerDbm.value).toBeCloseTo(10 * Math.log10(3000), 9);
    expect(receiver.modes).toEqual(["cw", "ssb"]);
    expect(feeds["horn"]?.returnLossDb).toBeCloseTo(-20 * Math.log10(0.2 / 2.2), 9);
    expect(covers["film"]?.layers[0]?.thicknessMm).toBeCloseTo(0.127, 12);
    expect(covers["bare"]?.layers).toEqual([]);
    expect(dish["tripod"]?.diameterM).toBe(0.6);
    expect(path.to.longitude).toBe(-3.3);
    expect(weather["shower"]?.extentKm).toBe(8);
    expect(decision).toEqual({ reserveDb: 3, confidence: 0.9 });
    await scenarioOf(demo);
    expect(arithmetic.loaded).toBe(0);
  });

  it("may hold arithmetic, which is then loaded", async () => {
    const { covers, path } = await scenarioOf(
      spoiled(["5 mil", "2 * 3/32 in"], ["height: 3 m", "height: 3 ft + 2 in"]),
    );
    expect(covers["film"]?.layers[0]?.thicknessMm).toBeCloseTo(4.7625, 12); // 3/16 in of 25.4 mm
    expect(path.to.heightM).toBeCloseTo(0.9652, 12); // 38 in
    expect(arithmetic.loaded).toBe(1);
  });

  it("keeps weathers in their order, whatever has arithmetic or a distribution in it", async () => {
    for (const rain of ["2 * 8 mm/h", "{ normal: 2 * 8 mm/h, sigma: 3 mm/h }"]) {
      const { weather } = await scenarioOf(
        spoiled(["  dry: {}\n", ""], ["rain: 16 mm/h", `rain: ${rain}`], ["decision", "  dry: {}\ndecision"]),
      );
      expect(Object.keys(weather)).toEqual(["shower", "dry"]);
    }
  });

  it.each<[what: string, text: string]>([
    ["line ends of Windows", sample.replaceAll("\n", "\r\n")],
    ["line ends of old", sample.replaceAll("\n", "\r")],
    ["a byte-order mark", `\ufeff${sample}`],
    ["a mark of the document's start", `---\n${sample}`],
    ["no line end at the end", sample.trimEnd()],
  ])("may have %s", async (_, text) => {
    expect(await scenarioOf(text)).toEqual(await scenarioOf(sample));
  });

  it.each([
    "Höhe über dem Fjord ☂",
    "мачта",
    "24",
    "007",
    "1.0",
    "true",
    "no",
    "0x10",
    "constructor",
    "toString",
  ])("may call a cover %s, as typed", async (name) => {
    const text = spoiled(["  film:", `  ${name}:`], ["cover: film", `cover: ${name}`]);
    const { covers, transmitter } = await scenarioOf(text);
    expect(transmitter.cover).toBe(name);
    expect(Object.keys(covers)).toEqual(expect.arrayContaining(["bare", name, "sheet"]));
    expect(covers[name]?.layers).toHaveLength(1);
  });

  it("keeps a title as typed", async () => {
    expect((await scenarioOf(spoiled(["Heron Scar to Marrow Sands", "2024-06-01"]))).title).toBe(
      "2024-06-01",
    );
  });

  it("may repeat a value by an anchor", async () => {
    const { path } = await scenarioOf(spoiled(["538 m", "&up 538 m"], ["592 m", "*up"]));
    expect(path.to.groundM).toBe(538);
  });

  it("may have both antennas below sea level: shores of the Dead Sea", async () => {
    const { path } = await scenarioOf(spoiled(["538 m", "-425 m"], ["592 m", "-420 m"]));
    expect([path.from.groundM, path.to.groundM]).toEqual([-425, -420]);
  });

  it("gets the defaults of what it leaves out", async () => {
    const text = spoiled(
      ["weather:\n  dry: {}\n  shower: { rain: 16 mm/h, extent: 8 km }\n", ""],
      ["decision: { reserve: 3 dB, confidence: 90 % }\n", ""],
      [", mode: [cw, ssb]", ""],
    );
    const { weather, decision, receiver, polarization } = await scenarioOf(text);
    expect(Object.keys(weather)).toEqual(["dry"]);
    expect(decision).toEqual({ reserveDb: 3, confidence: 0.9 });
    expect(receiver.modes).toEqual(["cw"]);
    expect(polarization).toBe("horizontal");
  });
});

/** What is changed in the sample, with the mark; then the code and words of the one fault. */
type Row = [what: string, from: string, to: string, code: string, ...words: string[]];

const keysAndNames: Row[] = [
  ["an unknown key", "decision", "¶decisions", "unknown_key", "did you mean decision?"],
  ["an unknown key far from any", "decision", "¶horoscope", "unknown_key", '"horoscope"', "polarization"],
  [
    "an unknown key in a layer",
    "thickness: 5 mil",
    "thickness: 5 mil, ¶colour: red",
    "unknown_key",
    "loss_tangent",
  ],
  ["an unknown key in a weather", "extent: 8", "¶extend: 8", "unknown_key", "did you mean extent?"],
  ["a key of every object", "decision", "¶constructor", "unknown_key", '"constructor"'],
  ["a missing key at the top", "title: Heron Scar to Marrow Sands\n", "¶", "missing_key", '"title"'],
  ["a missing quantity", "transmitter: { power: 3 W, ", "¶transmitter: { ", "missing_key", '"power"', "3 W"],
  [
    "a missing thickness",
    "[{ material: FEP film, thickness: 5 mil }]",
    "[¶{ material: FEP film }]",
    "missing_key",
    '"thickness"',
  ],
  [
    "no return loss",
    "stub: { return_loss: 14 dB, ",
    "¶stub: { ",
    "bad_value",
    "missing return_loss (or vswr)",
  ],
  ["two return losses", "horn: { vswr: 1.2", "¶horn: { vswr: 1.2, return_loss: 20 dB", "bad_value", "both"],
  ["two tapers", "stub: {", "¶stub: { beamwidth_10db: 90 deg,", "bad_value", "both"],
  [
    "a dish without a way to its gain",
    "tripod: { diameter: 60 cm, focal_ratio: 0.4",
    "¶tripod: { diameter: 60 cm",
    "bad_value",
    "missing focal_ratio",
  ],
  ["a dish with two", "tripod: {", "¶tripod: { efficiency: 55 %,", "bad_value", "more than one"],
  ["covers that dry in the rain", "shower: {", "¶shower: { dried_for: 5 min,", "bad_value", "while it rains"],
  ["a place without one", "from: { locator: IO83jd07, ", "¶from: { ", "bad_value", "missing locator"],
  ["half a place", "to: { latitude: 54.27, ", "¶to: { ", "bad_value", "missing latitude"],
  ["a place twice over", "to: {", "¶to: { locator: IO84jd07,", "bad_value", "both a locator"],
  ["an unknown feed", "feed: stub", "feed: ¶stob", "unknown_name", 'no feed "stob"', "mean stub?"],
  [
    "an unknown dish",
    "0.5 dB, dish: tripod",
    "0.5 dB, dish: ¶mast",
    "unknown_name",
    'no dish "mast"',
    "tripod",
  ],
  ["an unknown cover", "cover: film", "cover: ¶flim", "unknown_name", "bare, film, sheet", "mean film?"],
  ["an unknown mode in a list", "[cw, ssb]", "[cw, ¶sbs]", "unknown_name", 'no mode "sbs"', "mean ssb?"],
  ["an unknown mode", "[cw, ssb]", "¶cww", "unknown_name", "mean cw?"],
  [
    "a feed named like a part of any object",
    "feed: stub",
    "feed: ¶constructor",
    "unknown_name",
    "stub, horn",
  ],
  ["a cover __proto__ that nobody defined", "cover: film", "cover: ¶__proto__", "unknown_name", "bare"],
  ["a cover called __proto__", "  sheet:", "  ¶__proto__: {}\n  sheet:", "bad_key", "__proto__"],
  [
    "a key __proto__ at the top",
    "decision",
    "¶__proto__: { reserve: 1 dB }\ndecision",
    "bad_key",
    "__proto__",
  ],
  ["a cover without a name", "  sheet:", '  ¶"": {}\n  sheet:', "bad_key", "without a name"],
  ["a cover named by nothing", "  sheet:", "  ¶~: {}\n  sheet:", "bad_key", "without a name"],
  ["a cover named by a list", "  sheet:", "  ? ¶[a, b]\n  : {}\n  sheet:", "bad_key", "plain word"],
  [
    "a cover with a very long name",
    "  sheet:",
    `  ¶${"x".repeat(300)}: {}\n  sheet:`,
    "bad_key",
    "longer than",
  ],
  [
    "a name with a control character",
    "  sheet:",
    '  ¶"a\\e[2J": {}\n  sheet:',
    "bad_key",
    "control character",
  ],
  [
    "a covered bare",
    "  sheet:",
    "  ¶bare: { layers: [{ material: air, thickness: 1 mm }] }\n  sheet:",
    "bare_covered",
  ],
  [
    "a feed without taper in a dish",
    "horn: { vswr: 1.2, beamwidth_10db: 90 deg",
    "¶horn: { vswr: 1.2",
    "missing_taper",
    "edge_taper",
    "receiver",
  ],
];

const values: Row[] = [
  ["a bare frequency", "10.368 GHz", "¶10.368", "bad_value", "bare number", "10.368 GHz"],
  ["a bare power", "3 W", "¶3", "bad_value", "3 W"],
  ["a unit of another quantity", "5 mil", "¶5 dB", "bad_value", "5 dB is a ratio"],
  ["a unit that is none", "60 cm", "¶60 cn", "bad_value", "did you mean"],
  ["a sum of unlike things", "height: 3 m", "height: ¶3 ft + 2", "bad_value", "both sides"],
  ["GHz for MHz", "10.368 GHz", "¶10368 GHz", "bad_value", "10368 MHz"],
  ["MHz for GHz", "10.368 GHz", "¶10.368 MHz", "bad_value", "10.368 GHz"],
  ["miles for mil", "5 mil", "¶5 mi", "bad_value", "5 mil"],
  ["metres for centimetres", "60 cm", "¶60 m", "bad_value", "60 cm"],
  ["kilowatts for watts", "3 W", "¶30 kW", "bad_value", "30 W"],
  ["a share for a percentage", "90 %", "¶0.9", "bad_value", "write 90 %"],
  ["a thickness below zero", "5 mil", "¶-5 mil", "bad_value", "-5 mil", "from 0"],
  ["a permittivity below one", "5 mil", "5 mil, permittivity: ¶0.9", "bad_value", "from 1"],
  ["a loss tangent below zero", "5 mil", "5 mil, loss_tangent: ¶-0.1", "bad_value", "from 0"],
  ["a noise figure below zero", "1.1 dB", "¶-0.1 dB", "bad_value", "from 0"],
  ["a focal ratio of zero", "0.4", "¶0", "bad_value", "from 0.251"],
  ["a rim beside the focus", "0.4", "¶0.25", "bad_value", "from 0.251"],
  ["a perfect match", "vswr: 1.2", "vswr: ¶1", "bad_value", "from 1.001"],
  ["a blockage as wide as the dish", "blockage: 6 cm", "blockage: ¶60 cm", "bad_value", "as wide"],
  ["no number", "0.4", "¶.nan", "bad_value", '".nan"'],
  ["infinity", "0.4", "¶.inf", "bad_value", '".inf"'],
  ["a number too large for any", "0.4", "¶1e400", "bad_value", '"1e400"', "too large"],
  ["a division by zero", "0.4", "¶1/0", "bad_value", "divided by zero"],
  ["a spread wider than sense", "3 W", "¶3 W +/- 1e300 dB", "bad_value", "spread"],
  ["nothing for a feed", "feed: stub", "feed: ¶", "bad_value", "read nothing", "name of a feed"],
  ["nothing for a quantity", "10.368 GHz", "¶", "bad_value", "read nothing", "GHz"],
  ["nothing for a weather", "dry: {}", "dry:¶", "bad_value", "read nothing", "{} is dry"],
  [
    "nothing for the weathers",
    "weather:\n  dry: {}\n  shower: { rain: 16 mm/h, extent: 8 km }",
    "weather:¶",
    "bad_value",
    "weathers",
  ],
  ["nothing for layers", "[{ material: FEP film, thickness: 5 mil }]", "¶", "bad_value", "list of layers"],
  [
    "a group for a text",
    "title: Heron Scar to Marrow Sands",
    "¶title: { a: b }",
    "bad_value",
    "a group of keys",
  ],
  ["a list for a text", "feed: stub", "¶feed: [stub]", "bad_value", "a list"],
  ["a text for a group", "dry: {}", "dry: ¶yes", "bad_value", '"yes"', "a weather"],
  ["a text for a layer", "{ material: FEP film, thickness: 5 mil }", "¶FEP film", "bad_value", "a layer"],
  [
    "a list for a group",
    "decision: { reserve: 3 dB, confidence: 90 % }",
    "¶decision: [3 dB]",
    "bad_value",
    "a list",
  ],
  [
    "a group for a list",
    "layers: [{ material: FEP film, thickness: 5 mil }]",
    "¶layers: { material: FEP film }",
    "bad_value",
    "a list of layers",
  ],
  [
    "a list of layers without any",
    "layers: [{ material: FEP film, thickness: 5 mil }]",
    "¶layers: []",
    "bad_value",
    "an empty list",
  ],
  ["a list of modes without any", "mode: [cw, ssb]", "¶mode: []", "bad_value", "an empty list"],
  [
    "a decimal comma between braces",
    "power: 3 W",
    "power: ¶2,5 W",
    "decimal_comma",
    'read "2,5 W"',
    "a decimal comma? write 2.5 W)",
  ],
  [
    "a decimal comma between braces, in the last item and without a unit",
    "beamwidth_10db: 90 deg",
    "beamwidth_10db: 90 deg, phase: ¶-12,5 deg",
    "decimal_comma",
    "write -12.5 deg)",
  ],
  [
    "a comma between braces that may part thousands",
    "ground: 538 m",
    "ground: ¶1,305 m",
    "decimal_comma",
    "write 1.305 m, or 1305 m",
  ],
  ["a decimal comma without a unit", "focal_ratio: 0.4", "focal_ratio: ¶0,4", "decimal_comma", "write 0.4)"],
  ["an unknown material", "FEP film", "¶FEP flim", "bad_value", "did you mean FEP film?"],
  [
    "an end that is none",
    "rain: 16",
    "wets: [transmitter, ¶reciever], rain: 16",
    "bad_value",
    "did you mean receiver?",
  ],
  ["an end out of its list", "rain: 16", "wets: ¶receiver, rain: 16", "bad_value", "[transmitter, receiver]"],
  [
    "a word that is none of the choice",
    "decision",
    "polarization: ¶horizontel\ndecision",
    "bad_value",
    "did you mean horizontal?",
  ],
  ["a mouth that faces nowhere", "facing: level", "facing: ¶toString", "bad_value", "level, up"],
  ["a locator with a wrong letter", "IO83jd07", "¶IO83zd07", "bad_value", "character 5", '"z"'],
  ["a locator of odd length", "IO83jd07", "¶IO83jd0", "bad_value", "7 characters"],
  ["a locator too coarse for a path", "IO83jd07", "¶IO", "bad_value", "4 to 10"],
  ["a latitude beyond the pole", "54.27", "¶154.27", "bad_value", "swapped"],
  ["an empty title", "Heron Scar to Marrow Sands", '¶""', "bad_value", "empty text"],
  [
    "a title without end",
    "Heron Scar to Marrow Sands",
    `¶${"long ".repeat(200)}`,
    "bad_value",
    "longer than",
  ],
  [
    "a title that would drive a terminal",
    "Heron Scar to Marrow Sands",
    '¶"\\e[2J"',
    "bad_value",
    "control character",
  ],
  [
    "both ends at one place",
    "to: { latitude: 54.27, longitude: 3.30 W,",
    "¶to: { locator: IO83jd07,",
    "bad_value",
    "the same place",
  ],
  [
    "two moods of humidity",
    "dry: {}",
    "¶dry: { humidity: 50 %, dew_point: 3 degC }",
    "bad_value",
    "more than one",
  ],
];

const yaml: Row[] = [
  [
    "the same key twice",
    "decision",
    "polarization: vertical\n¶polarization: circular\ndecision",
    "yaml_duplicate_key",
  ],
  ["a merge key", "  sheet:\n", "  sheet:\n    ¶<<: { surface: wetting }\n", "bad_key", "merge keys"],
  ["an alias of nothing", "538 m", "¶*up", "aliases", "&up"],
  ["a quote left open", "90 % }", '"90 % }¶', "yaml_missing_char", "quote"],
  ["a bracket left open", "90 % }", "90 %¶", "yaml_bad_indent", "bracket"],
  ["a colon left out", "10.368 GHz", "10.368 GHz\n¶polarization", "yaml_multiline_implicit_key", "colon"],
  ["two colons on a line", "10.368 GHz", "¶10.368: GHz", "yaml_block_as_implicit_key", "quotes"],
  ["a reserved sign", "10.368 GHz", "¶@10.368 GHz", "yaml_bad_scalar_start", "quotes"],
  ["a tag", "10.368 GHz", "¶!speed 10.368 GHz", "yaml_tag_resolve_failed", "!speed"],
  ["a group made a set", "dry: {}", "dry: ¶!!set {}", "yaml_tag_resolve_failed", "!!set"],
];

describe("a bad scenario", () => {
  const rows = [...keysAndNames, ...values, ...yaml].map(
    ([what, from, to, code, ...words]) => [what, { from, to, code, words }] as const,
  );
  it.each(rows)("tells the place of %s", async (_, { from, to, code, words }) => {
    const marked = spoiled([from, to]);
    const { text, line, column } = withoutMark(marked);
    const [fault, ...more] = await faultsOf(text);
    expect(more).toEqual([]);
    expect(fault).toMatchObject({ code, line, column });
    for (const word of words) expect(fault!.message).toContain(word);
    expectPlainWords(fault!);
  });

  it("names the end that uses a feed without gain and without a dish", async () => {
    const faults = await faultsOf(spoiled(["0.5 dB, dish: tripod", "0.5 dB"]));
    expect(faults).toMatchObject([{ code: "missing_gain", line: 6, column: 3 }]);
    expect(faults[0]!.message).toContain("transmitter");
  });

  it.each<[what: string, text: string, code: string, line: number, column: number]>([
    ["nothing", "", "empty", 1, 1],
    ["blanks", " \n\n", "empty", 1, 1],
    ["a comment alone", "# to be written\n", "empty", 1, 1],
    ["a null", "~\n", "empty", 1, 1],
    ["a list at the top", "\n- a\n- b\n", "bad_value", 2, 1],
    ["a text at the top", "Heron Scar\nto Marrow Sands\n", "bad_value", 1, 1],
    ["a tab as indentation", "title: x\npath:\n\tfrom: 1\n", "yaml_tab_as_indent", 3, 1],
    ["a second document", `${sample}---\ntitle: x\n`, "yaml_multiple_docs", 22, 1],
    ["an older YAML, where no is a falsehood", `%YAML 1.1\n---\n${sample}`, "yaml_version", 1, 1],
    ["a newer YAML", `%YAML 1.9\n---\n${sample}`, "yaml_bad_directive", 1, 7],
    ["lists without bound", `title:\n${"- ".repeat(45_000)}`, "too_deep", 2, 81],
    ["brackets without bound", `title: ${"[".repeat(45_000)}`, "too_deep", 1, 48],
    ["a key without bound", `${"x".repeat(2000)}: 1\n`, "yaml_key_over_1024_chars", 1, 1],
    ["more than a scenario can be", `title: ${"x".repeat(100_000)}`, "too_large", 1, 1],
  ])("tells the place of %s", async (_, text, code, line, column) => {
    const faults = await faultsOf(text);
    expect(faults).toMatchObject([{ code, line, column }]);
    expectPlainWords(faults[0]!);
  });

  it("refuses anchors that multiply, before memory is full", async () => {
    const levels = "abcdefghi".split("");
    const lines = levels.map((name, i) => {
      const item = i === 0 ? "x" : `*${levels[i - 1]}`;
      return `${name}: &${name} [${Array(9).fill(item).join(", ")}]\n`;
    });
    expect(await faultsOf(lines.join(""))).toMatchObject([{ code: "aliases", line: 2, column: 8 }]);
  });

  it("is not led round in a circle by an anchor within itself", async () => {
    const faults = await faultsOf(spoiled(["  dry: {}", "  dry: &x { rain: *x }"]));
    expect(faults).toMatchObject([{ code: "bad_value", line: 19, column: 19 }]);
  });

  it("tells a fault behind an alias where it was typed, and once", async () => {
    const faults = await faultsOf(
      spoiled(["  film:", "  film: &film"], ["  sheet:", "  spare: *film\n  sheet:"], ["5 mil", "5"]),
    );
    expect(faults).toMatchObject([{ code: "bad_value", line: 10, column: 47 }]);
  });

  it("tells every fault at once, by place", async () => {
    const faults = await faultsOf(
      spoiled(
        ["title:", "tilte:"],
        ["3 W", "3"],
        ["[cw, ssb]", "[cw, sbs]"],
        ["return_loss: 14 dB, edge_taper: 10 dB", "edge_taper: 10"],
        ["  film:", "  ~: {}\n  film:"],
        ["FEP film", "FEP flim"],
        ["locator: IO83jd07, ground: 538 m", "ground: 538"],
        ["decision", "title: again\ntitle: twice\ndecision"],
      ),
    );
    expect(faults.map(({ code, line, column }) => [line, column, code])).toEqual([
      [1, 1, "unknown_key"],
      [3, 23, "bad_value"], // 3
      [4, 46, "unknown_name"], // sbs
      [6, 3, "bad_value"], // no return loss
      [6, 23, "bad_value"], // edge_taper: 10
      [9, 3, "bad_key"],
      [11, 26, "bad_value"], // FEP flim
      [17, 3, "bad_value"], // no locator
      [17, 19, "bad_value"], // ground: 538
      [23, 1, "yaml_duplicate_key"],
    ]);
  });

  it("tells line and column through a byte-order mark and line ends of Windows", async () => {
    const text = `\ufeff${spoiled(["title: Heron", "titel: Heron"], ["90 %", "90"])}`.replaceAll(
      "\n",
      "\r\n",
    );
    const faults = await faultsOf(text);
    expect(faults).toMatchObject([
      { code: "missing_key", line: 1, column: 1 },
      { code: "unknown_key", line: 1, column: 1 },
      { code: "bad_value", line: 21, column: 40 },
    ]);
  });

  it("shows a name by its beginning and a long list by its first names", async () => {
    const feeds = Array.from({ length: 200 }, (_, i) => `  f${i}: { return_loss: 14 dB }\n`).join("");
    const [fault] = await faultsOf(
      spoiled(["feed: stub", `feed: ${"z".repeat(400)}`], ["feeds:\n", `feeds:\n${feeds}`]),
    );
    expect(fault).toMatchObject({ code: "unknown_name" });
    expect(fault!.message).toContain("and 182 more");
    expectPlainWords(fault!);
  });

  it("leaves the prototype of objects alone", async () => {
    await loadScenario(spoiled(["  sheet:", "  __proto__: { gap: 1 mm, polluted: yes }\n  sheet:"]));
    expect(Object.keys(Object.prototype)).toEqual([]);
    expect("polluted" in {}).toBe(false);
  });
});

describe("a demo with slips of the keyboard", () => {
  const lines = demo.split("\n");
  const place = fc.nat({ max: demo.length - 1 });
  const typed = fc.oneof(
    fc.constantFrom(..."{}[]:,-#&*!|>'\"%@`?~<=/ \n\t\r\\0\u0007\u2028\ufeff"),
    fc.string({ maxLength: 6, unit: "binary" }),
    fc.constantFrom("__proto__", "<<: ", "---\n", ": ", "- ", "*x", "&x ", "1e999", ".nan", "null", "!!int "),
  );
  const slip = fc.oneof(
    fc.record({ at: place, cut: fc.nat({ max: 4 }), put: typed }),
    fc.record({ at: place, cut: fc.nat({ max: 60 }), put: fc.constant("") }),
    fc.record({ one: fc.nat({ max: lines.length - 1 }), other: fc.nat({ max: lines.length - 1 }) }),
  );
  const slipped = fc.array(slip, { minLength: 1, maxLength: 4 }).map((slips) =>
    slips.reduce((text, one) => {
      if ("at" in one) return text.slice(0, one.at) + one.put + text.slice(one.at + one.cut);
      const swapped = text.split("\n");
      [swapped[one.one], swapped[one.other]] = [swapped[one.other] ?? "", swapped[one.one] ?? ""];
      return swapped.join("\n");
    }, demo),
  );

  it("is read or refused, with places inside the file and in order; nothing is thrown", async () => {
    let read = 0;
    let refused = 0;
    await fc.assert(
      fc.asyncProperty(slipped, async (text) => {
        const { scenario, diagnostics } = await loadScenario(text);
        if (scenario) {
          read += 1;
          expect(diagnostics).toBeUndefined();
          return;
        }
        refused += 1;
        expect(diagnostics.length).toBeGreaterThan(0);
        const ends = text
          .replace(/^\ufeff/, "")
          .split(/\r\n|\r|\n/)
          .map((line) => line.length + 1);
        let before = 0;
        for (const fault of diagnostics) {
          expect(fault.column).toBeGreaterThanOrEqual(1);
          expect(fault.column).toBeLessThanOrEqual(ends[fault.line - 1] ?? 0);
          const order = 1e6 * fault.line + fault.column;
          expect(order).toBeGreaterThanOrEqual(before);
          before = order;
          expectPlainWords(fault);
        }
      }),
      { numRuns: 600 },
    );
    expect(read).toBeGreaterThan(20);
    expect(refused).toBeGreaterThan(200);
  });
});

function expectPlainWords({ message }: Diagnostic): void {
  expect(message).not.toMatch(
    /undefined|\[object|Error:|Invalid|Too small|_proto__ of| at .*:\d+:\d+|\p{Cc}/u,
  );
  expect(message.length).toBeLessThan(400);
}
