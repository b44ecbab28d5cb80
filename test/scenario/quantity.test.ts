import fc from "fast-check";
import { create, type FactoryFunctionMap, unitDependencies } from "mathjs";
import { describe, expect, it } from "vitest";
import { integrate } from "../../src/numeric/quadrature.ts";
import {
  describeRefusal,
  kinds,
  type QuantityKind,
  type RefusalCode,
  readQuantity,
} from "../../src/scenario/quantity.ts";
import { rangeHint } from "../../src/scenario/rangeHints.ts";

function read(input: string | number, kind: QuantityKind) {
  const reading = readQuantity(input, kind, { spread: true });
  if (!reading.ok) throw new Error(`${reading.code}: ${describeRefusal(reading)}`);
  return reading;
}

function refusal(input: string | number, kind: QuantityKind, spread = false) {
  const reading = readQuantity(input, kind, { spread });
  if (reading.ok) throw new Error(`${input} was read as ${reading.value}`);
  return reading;
}

// Exact factors: 1 in = 25.4 mm, 1 ft = 0.3048 m, 1 yd = 0.9144 m, 1 mi = 1609.344 m (international yard and
// pound agreement, 1959); 1 mil = 1/1000 in; 1 nautical mile = 1852 m (Monaco, 1929); 0 degC = 273.15 K and
// degF = 9/5 degC + 32 (definitions). 1 inHg = 33.86389 hPa (NIST SP 811, appendix B.8, from memory).
const accepted: [input: string | number, kind: QuantityKind, value: number][] = [
  ["10.368 GHz", "frequencyGHz", 10.368],
  ["10368 MHz", "frequencyGHz", 10.368],
  ["10.368ghz", "frequencyGHz", 10.368],
  ["24048.1 Mhz", "frequencyGHz", 24.0481],
  ["500 Hz", "bandwidthHz", 500],
  ["2.4 kHz", "bandwidthHz", 2400],
  ["28 MHz", "bandwidthHz", 28e6],
  ["5 mil", "thicknessMm", 0.127],
  ["5 thou", "thicknessMm", 0.127],
  ["127 um", "thicknessMm", 0.127],
  ["127 µm", "thicknessMm", 0.127], // micro sign
  ["127 μm", "thicknessMm", 0.127], // Greek letter
  ["50 microns", "thicknessMm", 0.05],
  ["3/32 in", "thicknessMm", 2.38125],
  ['3/32"', "thicknessMm", 2.38125],
  ["3/32″", "thicknessMm", 2.38125],
  ["1 1/2 in", "thicknessMm", 38.1],
  ["-1 1/2 in", "thicknessMm", -38.1],
  ["0.8 mm", "thicknessMm", 0.8],
  [".8 mm", "thicknessMm", 0.8],
  ["5. mm", "thicknessMm", 5],
  ["8e-1 mm", "thicknessMm", 0.8],
  ["  0.8  mm ", "thicknessMm", 0.8],
  ["0.8\u00a0mm", "thicknessMm", 0.8], // no-break space
  ["60 cm", "lengthM", 0.6],
  ["412 m", "lengthM", 412],
  ["−3 m", "lengthM", -3], // typographic minus: ground below the sea
  ["5 ft", "lengthM", 1.524],
  ["5'", "lengthM", 1.524],
  ["5 FT", "lengthM", 1.524],
  ["10 yd", "lengthM", 9.144],
  ["8 km", "distanceKm", 8],
  ["5 mi", "distanceKm", 8.04672],
  ["5 miles", "distanceKm", 8.04672],
  ["1 W", "powerDbm", 30],
  ["200 mW", "powerDbm", 23.0103], // 30 + 10 lg 0.2
  ["3 W", "powerDbm", 34.771213], // 30 + 10 lg 3
  ["0.1 kW", "powerDbm", 50],
  ["10 uW", "powerDbm", -20],
  ["34.8 dBm", "powerDbm", 34.8],
  ["34.8 dbm", "powerDbm", 34.8],
  ["-3 dBW", "powerDbm", 27],
  ["0.25 dB", "levelDb", 0.25],
  ["1/4 db", "levelDb", 0.25],
  ["34.5 dBi", "gainDbi", 34.5],
  ["20 dBd", "gainDbi", 22.15],
  ["0.5 deg", "angleDeg", 0.5],
  ["0.5°", "angleDeg", 0.5],
  ["0.5º", "angleDeg", 0.5], // ordinal sign
  ["30 arcmin", "angleDeg", 0.5],
  ["10 mrad", "angleDeg", 0.5729578], // 1.8 / pi
  ["16 mm/h", "rainRateMmPerH", 16],
  ["16 mm / hr", "rainRateMmPerH", 16],
  ["2 in/h", "rainRateMmPerH", 50.8],
  ["20 degC", "temperatureC", 20],
  ["20 °C", "temperatureC", 20],
  ["20 C", "temperatureC", 20],
  ["68 degF", "temperatureC", 20],
  ["-40 F", "temperatureC", -40],
  ["293.15 K", "temperatureC", 20],
  ["200 K", "temperatureK", 200],
  ["1013 hPa", "pressureHPa", 1013],
  ["1013 mbar", "pressureHPa", 1013],
  ["101.3 kPa", "pressureHPa", 1013],
  ["101325 Pa", "pressureHPa", 1013.25],
  ["1 inHg", "pressureHPa", 33.86389],
  ["90 %", "percent", 90],
  ["0.01%", "percent", 0.01],
  ["0.05 g/m3", "densityGm3", 0.05],
  ["0.05 g/m^3", "densityGm3", 0.05],
  ["0.05 g/m³", "densityGm3", 0.05],
  ["0.3 g/cm3", "densityGm3", 3e5],
  ["12 m/s", "speedMPerS", 12],
  ["36 km/h", "speedMPerS", 10],
  ["10 mph", "speedMPerS", 4.4704],
  ["36 knots", "speedMPerS", 18.52],
  ["30 min", "durationMin", 30],
  ["1.5 h", "durationMin", 90],
  ["90 s", "durationMin", 1.5],
  ["0.4", "ratio", 0.4],
  [0.4, "ratio", 0.4],
  [1e-4, "ratio", 1e-4],
  ["4/3", "ratio", 4 / 3],
];

const refused: [input: string | number, kind: QuantityKind, code: RefusalCode, hint?: RegExp][] = [
  ["5", "thicknessMm", "bare_number", /5 mm, 5 mil or 5 in/],
  [5, "thicknessMm", "bare_number", /5 mil/],
  [0, "lengthM", "bare_number", /0 m/],
  ["3/32", "thicknessMm", "bare_number"],
  ["0.9", "percent", "bare_number", /90 %/],
  [90, "percent", "bare_number", /90 %/],
  ["10 GHz", "thicknessMm", "wrong_dimension", /10 GHz is a frequency/],
  ["3 dB", "powerDbm", "wrong_dimension", /3 dBm/],
  ["21 dB", "gainDbi", "wrong_dimension", /21 dBi or 21 dBd/],
  ["0.5 dBm", "levelDb", "wrong_dimension", /0.5 dB$/],
  ["55 %", "ratio", "wrong_dimension", /0.55/],
  ["2 mm", "ratio", "wrong_dimension", /length/],
  ["12 m/s", "rainRateMmPerH", "wrong_dimension", /speed/],
  ["17 degC", "temperatureK", "wrong_dimension", /290.15 K/],
  ["5 mli", "thicknessMm", "unknown_unit", /mil/],
  ["10 GHx", "frequencyGHz", "unknown_unit", /GHz/],
  ["10368 mHz", "frequencyGHz", "unknown_unit", /case.*MHz/],
  ["10368 mhz", "frequencyGHz", "unknown_unit", /case.*MHz/],
  ["3 MW", "powerDbm", "unknown_unit", /case.*mW/],
  ["3 Mm", "thicknessMm", "unknown_unit", /case.*mm/],
  ["0,8 mm", "thicknessMm", "decimal_comma", /0\.8/],
  [",8 mm", "thicknessMm", "decimal_comma", /0\.8/],
  ["10,3681 GHz", "frequencyGHz", "decimal_comma", /10\.3681/],
  ["1,500 m", "lengthM", "thousands_separator", /1500.*1\.500/],
  ["1 500 m", "lengthM", "thousands_separator", /1500/],
  ["1'500 m", "lengthM", "thousands_separator", /1500/],
  ["1_500 m", "lengthM", "thousands_separator", /1500/],
  ["1.4:1", "ratio", "unreadable", /^write 1\.4$/], // as people say a standing-wave ratio
  ["1.25 : 1.0", "ratio", "unreadable", /^write 1\.25$/],
  ["4:3", "ratio", "unreadable", /^write 4\/3$/],
  ["1-1/2 in", "thicknessMm", "unreadable", /1 1\/2 in/],
  ["5 ft 6 in", "lengthM", "unreadable", /5 ft \+ 6 in/],
  ["5'6\"", "lengthM", "unreadable", /5 ft \+ 6 in/],
  ["1e400 m", "lengthM", "not_finite"],
  ["3/0 in", "thicknessMm", "not_finite"],
  [Number.POSITIVE_INFINITY, "ratio", "no_number"],
  [Number.NaN, "ratio", "no_number"],
  ["0 W", "powerDbm", "no_level", /no level/],
  ["-3 W", "powerDbm", "no_level"],
  ["", "lengthM", "no_number"],
  ["lots", "lengthM", "no_number"],
  ["about 5 m", "lengthM", "unreadable"],
  ["10.368.000 GHz", "frequencyGHz", "unreadable"],
  ["2 * 3/32 in", "thicknessMm", "unreadable"],
  ["0.22 dB +/- 0.05 dB", "levelDb", "spread", /no uncertainty/],
  [`${"1".repeat(300)} m`, "lengthM", "too_long"],
];

describe("readQuantity", () => {
  it.each(accepted)("reads %j as %s", (input, kind, value) => {
    expect(read(input, kind).value).toBeCloseTo(value, 6);
  });

  it("gives the decimal that a person would, without binary noise", () => {
    expect(read("5 mil", "thicknessMm").value).toBe(0.127);
    expect(read("3/32 in", "thicknessMm").value).toBe(2.38125);
    expect(read("10368 MHz", "frequencyGHz").value).toBe(10.368);
    expect(read("60 cm", "lengthM").value).toBe(0.6);
    expect(read("68 degF", "temperatureC").value).toBe(20);
  });

  it("keeps number and unit as they were written", () => {
    expect(read("3/32 in", "thicknessMm")).toMatchObject({ number: 0.09375, unit: "in" });
  });

  it.each(refused)("refuses %j as %s", (input, kind, code, hint = /^/) => {
    const { code: given, hint: advice = "" } = refusal(input, kind);
    expect(given).toBe(code);
    expect(advice).toMatch(hint);
  });

  it("refers to the arithmetic only what it may read", () => {
    const may = ["2 * 3/32 in", "0.3 furlong", "3 ft + 2 in", "(1 + 2) mm", "5 mli"];
    expect(may.filter((text) => !refusal(text, "lengthM").libraryMayRead)).toEqual([]);
    const mayNot = ["5", "5 GHz", "lots", "0,8 mm", "5 ft 6 in", "1-1/2 in", "1e400 m", "5 Mm"];
    expect(mayNot.filter((text) => refusal(text, "lengthM").libraryMayRead)).toEqual([]);
  });

  it("says all of it in one line", () => {
    expect(describeRefusal(refusal("5", "thicknessMm"))).toBe(
      'read "5", expected a length with a unit, such as 0.8 mm, 5 mil or 3/32 in ' +
        "(bare number; write 5 mm, 5 mil or 5 in)",
    );
    expect(describeRefusal(refusal(`${"9".repeat(5000)} m`, "lengthM")).length).toBeLessThan(250);
  });

  it("offers examples that it reads itself", () => {
    for (const [kind, { expected, usual }] of Object.entries(kinds)) {
      const examples = expected.replace(/^.*such as /, "").split(/, | or /);
      for (const example of examples) read(example, kind as QuantityKind);
      for (const unit of usual) read(`7 ${unit}`, kind as QuantityKind);
    }
  });

  it("takes the dipole's gain for what the dipole's pattern integrates to", () => {
    // directivity of the half-wave dipole, 2 / integral of cos^2(pi/2 cos t) / sin t (textbook, e.g. Balanis ch. 4)
    const pattern = (t: number) => Math.cos((Math.PI / 2) * Math.cos(t)) ** 2 / Math.sin(t);
    const directivityDbi = 10 * Math.log10(2 / integrate(pattern, 0, Math.PI));
    expect(Math.abs(read("0 dBd", "gainDbi").value - directivityDbi)).toBeLessThan(0.005);
  });

  it("returns to the number that was formatted", () => {
    const names = Object.keys(kinds) as QuantityKind[];
    const canonical = names.map((kind) => [kind, kinds[kind].usual[0]!] as const);
    const number = fc.double({ min: -1e12, max: 1e12, noNaN: true });
    fc.assert(
      fc.property(number, fc.constantFrom(...canonical), (value, [kind, unit]) => {
        expect(read(`${value} ${unit}`, kind).value === value).toBe(true); // 0 and -0 are alike
      }),
    );
  });

  it("reads fractions and mixed numbers as their decimals", () => {
    const whole = fc.integer({ min: 1, max: 999 });
    fc.assert(
      fc.property(whole, whole, whole, (a, b, c) => {
        expect(read(`${b}/${c} mm`, "thicknessMm").value).toBe(b / c);
        expect(read(`${a} ${b}/${c} mm`, "thicknessMm").value).toBe(a + b / c);
      }),
    );
  });

  it("reads or refuses any text, and never throws", () => {
    const anyKind = fc.constantFrom(...(Object.keys(kinds) as QuantityKind[]));
    const texty = fc.oneof(
      fc.string({ unit: "grapheme" }),
      fc.stringMatching(/^[0-9 ./+e'"°%,mGHzdBWi-]{0,12}$/),
    );
    fc.assert(
      fc.property(texty, anyKind, fc.boolean(), (text, kind, spread) => {
        const reading = readQuantity(text, kind, { spread });
        if (reading.ok) expect(Number.isFinite(reading.value)).toBe(true);
        else expect(reading.expected).not.toBe("");
      }),
    );
  });
});

describe("the small grammar against the unit parser of mathjs", () => {
  const math = create({ unitDependencies } as FactoryFunctionMap);
  const shared: [kind: QuantityKind, canonical: string, units: string][] = [
    ["frequencyGHz", "GHz", "Hz kHz MHz GHz"],
    ["thicknessMm", "mm", "um mm cm m km mil in inch inches ft foot feet yd yard mi mile miles"],
    ["angleDeg", "deg", "deg degree degrees rad mrad arcmin arcsec"],
    ["rainRateMmPerH", "mm/h", "mm/h mm/hr mm/hour cm/h in/h inch/h"],
    ["speedMPerS", "m/s", "m/s km/h ft/s"],
    ["temperatureC", "degC", "degC celsius K kelvin degF fahrenheit"],
    ["pressureHPa", "hPa", "Pa hPa kPa mbar bar"],
    ["densityGm3", "g/m^3", "g/m^3 kg/m^3 g/cm^3"],
    ["durationMin", "minute", "s sec second seconds min minute minutes h hr hour hours day days"],
  ];

  it.each(shared)("agrees in %s", (kind, canonical, units) => {
    for (const unit of units.split(" ")) {
      for (const number of [1, 37.25]) {
        const known = unit.replace(/\bin\b/, "inch");
        const other = math.unit(`${number} ${known}`).toNumber(canonical);
        const own = read(`${number} ${unit}`, kind).value;
        expect(Math.abs(own - other), `${number} ${unit}`).toBeLessThanOrEqual(1e-12 * Math.max(1, other));
      }
    }
  });
});

describe("spread", () => {
  it.each<[string, QuantityKind, number, number]>([
    ["3 W +/- 0.5 dB", "powerDbm", 34.771213, 0.5],
    ["34.8 +/- 0.5 dBm", "powerDbm", 34.8, 0.5],
    ["34.5 dBi +/- 0.5 dB", "gainDbi", 34.5, 0.5],
    ["0.22 dB +/- 0.05 dB", "levelDb", 0.22, 0.05],
    ["0.22 +/- 0.05 dB", "levelDb", 0.22, 0.05],
    ["(0.22 ± 0.05) dB", "levelDb", 0.22, 0.05],
    ["0.22dB±0.05dB", "levelDb", 0.22, 0.05],
    ["5 mil +/- 10 um", "thicknessMm", 0.127, 0.01],
    ["3/32 ± 1/64 in", "thicknessMm", 2.38125, 0.396875],
    ["68 degF +- 9 degF", "temperatureC", 20, 5], // a difference: no offset
    ["0.55 +/- 0.05", "ratio", 0.55, 0.05],
  ])("reads %s as %s", (text, kind, value, sigma) => {
    const reading = read(text, kind);
    expect(reading.value).toBeCloseTo(value, 6);
    expect(reading.sigma).toBeCloseTo(sigma, 12);
  });

  it.each<[string, QuantityKind]>([
    ["3 W +/- 0.5 W", "powerDbm"],
    ["3 +/- 0.5 W", "powerDbm"],
    ["0.22 dB +/- 0.05", "levelDb"],
    ["0.22 dB +/- 5 %", "levelDb"],
    ["0.22 dB +/- -0.05 dB", "levelDb"],
    ["0.22 dB +/-", "levelDb"],
    ["1 +/- 1 +/- 1 dB", "levelDb"],
    ["5 mm +/- 1 GHz", "thicknessMm"],
  ])("refuses %s", (text, kind) => {
    expect(refusal(text, kind, true).code).toBe("spread");
  });

  it("leaves sigma away where none was written", () => {
    expect(read("0.22 dB", "levelDb")).not.toHaveProperty("sigma");
  });
});

describe("rangeHint", () => {
  it.each<[string, QuantityKind, [number, number], string | undefined]>([
    ["10368 GHz", "frequencyGHz", [1, 100], "10368 GHz: did you mean 10368 MHz (10.368 GHz)?"],
    ["5 mm", "thicknessMm", [0.01, 2], "5 mm: did you mean 5 mil (0.127 mm)?"],
    ["0.127 mil", "thicknessMm", [0.01, 2], "0.127 mil: did you mean 0.127 mm?"],
    ["5000 W", "powerDbm", [-10, 60], "5000 W: did you mean 5000 mW (36.9897 dBm)?"],
    ["72 m", "distanceKm", [0.5, 100], "72 m: did you mean 72 km?"],
    ["60 m", "lengthM", [0.1, 10], "60 m: did you mean 60 cm (0.6 m)?"],
    ["68 degC", "temperatureC", [-60, 50], "68 degC: did you mean 68 degF (20 degC)?"],
    ["16 in/h", "rainRateMmPerH", [0, 300], "16 in/h: did you mean 16 mm/h?"],
    ["0.127 mil", "thicknessMm", [0.01, 10], "0.127 mil: did you mean 0.127 mm or 0.127 in (3.2258 mm)?"],
    ["-5 mm", "thicknessMm", [0.01, 2], undefined], // no unit helps
    ["5 mil", "thicknessMm", [0.01, 2], undefined], // within
  ])("advises on %s as %s in %j", (text, kind, window, hint) => {
    expect(rangeHint(read(text, kind), kind, window)).toBe(hint);
  });
});
