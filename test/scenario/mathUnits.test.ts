import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { readArithmetic } from "../../src/scenario/mathUnits.ts";
import { kinds, type QuantityKind, type RefusalCode, readQuantity } from "../../src/scenario/quantity.ts";

function refusal(text: string, kind: QuantityKind) {
  const reading = readArithmetic(text, kind);
  if (reading.ok) throw new Error(`${text} was read as ${reading.value}`);
  return reading;
}

describe("readArithmetic", () => {
  // by hand from 1 in = 25.4 mm, 1 ft = 12 in, 1 yd = 3 ft, 1 furlong = 220 yd, 1 rod = 16.5 ft, 1 fathom = 6 ft
  it.each<[string, QuantityKind, number]>([
    ["2 * 3/32 in", "thicknessMm", 4.7625],
    ["1/8 in + 5 mil", "thicknessMm", 3.302],
    ["3 ft + 2 in", "lengthM", 0.9652],
    ["5' + 6\"", "lengthM", 1.6764],
    ["3 ft + 1 1/2 in", "lengthM", 0.9525], // a mixed number, not a product
    ["2 * 1 1/2 in", "thicknessMm", 76.2],
    ["-(1 + 2) mm", "thicknessMm", -3],
    ["+3 ft - 2 ft", "lengthM", 0.3048],
    ["3 ft + -2 ft", "lengthM", 0.3048],
    ["2^3 mm", "thicknessMm", 8],
    ["2 × 5 µm", "thicknessMm", 0.01],
    ["2 thou + 3 mils", "thicknessMm", 0.127],
    ["0.3 furlong", "distanceKm", 0.0603504],
    ["2 nmi", "distanceKm", 3.704],
    ["5 rod", "lengthM", 25.146],
    ["2 fathoms", "lengthM", 3.6576],
    ["10 gigahertz", "frequencyGHz", 10],
    ["10 GHz + 368 MHz", "frequencyGHz", 10.368],
    ["2 * 0.25 dB + 0.5 dB", "levelDb", 1],
    ["2 * 0.5 W", "powerDbm", 30],
    ["45 deg / 2", "angleDeg", 22.5],
    ["5 m/h", "rainRateMmPerH", 5000],
    ["8 mm / 30 min", "rainRateMmPerH", 16],
    ["5 mm h^-1", "rainRateMmPerH", 5],
    ["72 km / 2 h", "speedMPerS", 10],
    ["36 kn + 0 mph", "speedMPerS", 18.52],
    ["290 K + 3.15 K", "temperatureC", 20],
    ["2 * 100 K", "temperatureK", 200],
    ["1 atm", "pressureHPa", 1013.25], // definition of the standard atmosphere
    ["2 * 14.96 inHg", "pressureHPa", 1013.2075888], // 29.92 in at 33.86389 hPa
    ["50 mg / m^3", "densityGm3", 0.05],
    ["1 h + 30 min", "durationMin", 90],
    ["2 * 4/3", "ratio", 8 / 3],
    ["3 ft / 1 yd", "ratio", 1],
  ])("reads %s as %s", (text, kind, value) => {
    const reading = readArithmetic(text, kind);
    if (!reading.ok) throw new Error(`${reading.code}: ${reading.hint}`);
    expect(reading.value).toBeCloseTo(value, 9);
  });

  it.each<[string, QuantityKind, RefusalCode, RegExp]>([
    ["2 * 3", "lengthM", "bare_number", /comes to 6/],
    ["3 ft * 2 in", "lengthM", "wrong_dimension", /another quantity/],
    ["3 ft + 2 s", "lengthM", "wrong_dimension", /same kind/],
    ["1 + 2 in", "lengthM", "wrong_dimension", /same kind/],
    ["2 * 3 GHz", "lengthM", "wrong_dimension", /another quantity/],
    ["2 * 3 mm", "ratio", "wrong_dimension", /unit remains/],
    ["1 dB * 1 dB", "levelDb", "wrong_dimension", /another quantity/],
    ["3 ft 2 in", "lengthM", "unreadable", /\+ or \*/],
    ["5 m 3", "lengthM", "unreadable", /\+ or \*/],
    ["1 2 m", "lengthM", "unreadable", /neither/],
    ["20 degC + 5 degC", "temperatureC", "forbidden", /degC does not start at zero/],
    ["2 * 30 fahrenheit", "temperatureC", "forbidden", /does not start at zero/],
    ["30 dBm + 3 dB", "powerDbm", "forbidden", /dBm is a level/],
    ["2 * 3 dBi", "gainDbi", "forbidden", /no arithmetic/],
    ["2 * 45 %", "percent", "forbidden", /no arithmetic/],
    ["0 * 3 W", "powerDbm", "no_level", /no level/],
    ["2 * 3 mli", "thicknessMm", "unknown_unit", /mli is no unit; did you mean mil/],
    ["2 * ", "lengthM", "unreadable", /neither/],
    ["10.368.000 GHz", "frequencyGHz", "unreadable", /neither/],
  ])("refuses %s as %s", (text, kind, code, hint) => {
    const reading = refusal(text, kind);
    expect(reading.code).toBe(code);
    expect(reading.hint).toMatch(hint);
    expect(reading.read).toBe(text.trim());
    expect(reading.libraryMayRead).toBe(false);
  });

  const hostile: [text: string, code: RefusalCode][] = [
    ['import("fs")', "forbidden"],
    ["import(fs)", "forbidden"],
    ["cos(1) m", "forbidden"],
    ["sqrt(4) m", "forbidden"],
    ["mm(3)", "forbidden"],
    ["(mm)(3)", "unreadable"],
    ["f(x)=x", "forbidden"],
    ["x = 3 m", "forbidden"],
    ['evaluate("1")', "forbidden"],
    ["evaluate(1)", "forbidden"],
    ["parse(1)", "forbidden"],
    ["createUnit(foo)", "forbidden"],
    ["createUnit", "unknown_unit"],
    ["config", "unknown_unit"],
    ["import", "unknown_unit"],
    ["constructor", "unknown_unit"],
    ["__proto__", "unknown_unit"],
    ["3 toString", "unknown_unit"],
    ["pi m", "unknown_unit"],
    ["a.b", "forbidden"],
    ["mm.constructor", "forbidden"],
    ["mm.constructor.constructor(1)", "forbidden"],
    ["mm[1]", "forbidden"],
    ["[1,2] m", "forbidden"],
    ["{a: 1}", "forbidden"],
    ["1:3 m", "forbidden"],
    ["1 m; 2 m", "forbidden"],
    ["1 m\n2 m", "unreadable"],
    ["1 < 2 ? 3 m : 4 m", "forbidden"],
    ["5! m", "forbidden"],
    ["5 m'", "forbidden"],
    ["5 m # note", "forbidden"],
    ["5 m to ft", "forbidden"],
    ["not 5 m", "forbidden"],
    ["5 m mod 3 m", "forbidden"],
    ["5 xor 3", "forbidden"],
    ["5 .* 3 m", "forbidden"],
    ["true m", "forbidden"],
    ["null", "forbidden"],
    ["5 m ^ 2 m", "wrong_dimension"],
    ["9^9^9 m", "forbidden"],
    ["2^0.5 m", "forbidden"],
    ["1e400 m", "not_finite"],
    ["1e308 * 10 m", "not_finite"],
    ["1/0 m", "not_finite"],
    ["0/0 m", "not_finite"],
    ["NaN m", "not_finite"],
    ["Infinity m", "not_finite"],
    [`${"(".repeat(10_000)}1 m${")".repeat(10_000)}`, "too_long"],
    [`${"(".repeat(90)}1 m${")".repeat(90)}`, "forbidden"],
    [`${"-".repeat(190)}1 m`, "forbidden"],
    [`1 m${" + 1 m".repeat(200)}`, "too_long"],
    ["", "forbidden"],
  ];
  const named = hostile.map(([text, code]) => ({ text, code, name: text.slice(0, 40) }));

  it.each(named)("refuses $name with a message", ({ text, code }) => {
    const reading = refusal(text, "lengthM");
    expect(reading.code).toBe(code);
    expect(reading.hint).toBeTruthy();
  });

  it("reads a sum as long as the longest text allowed", () => {
    const text = `1 m${" + 1 m".repeat(32)}`;
    expect(text.length).toBeLessThanOrEqual(200);
    expect(readArithmetic(text, "lengthM")).toMatchObject({ ok: true, value: 33 });
  });

  it("agrees with the small grammar wherever both read the usual units", () => {
    const offsets = /^(deg[CF]|dB[imdW]|%)$/;
    for (const [name, { usual }] of Object.entries(kinds)) {
      const kind = name as QuantityKind;
      for (const unit of usual.filter((each) => !offsets.test(each))) {
        const small = readQuantity(`7.25 ${unit}`, kind);
        const large = readArithmetic(`29/4 ${unit}`, kind);
        if (!small.ok || !large.ok) throw new Error(`7.25 ${unit} as ${kind}`);
        expect(large.value, unit).toBeCloseTo(small.value, 9);
      }
    }
  });
});

describe("the start of mathjs", () => {
  const source = new URL("../../src", import.meta.url).pathname;
  const files = readdirSync(source, { recursive: true, encoding: "utf8" }).filter((name) =>
    name.endsWith(".ts"),
  );
  const textOf = (file: string) => readFileSync(`${source}/${file}`, "utf8");

  it("is put off until a run needs it: mathUnits.ts is imported dynamically only", () => {
    expect(files.filter((file) => /from\s+"[^"]*mathUnits\.ts"/.test(textOf(file)))).toEqual([]);
  });
});
