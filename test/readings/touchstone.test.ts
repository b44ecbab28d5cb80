import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { abs, arg, type Complex } from "../../src/numeric/complex.ts";
import { readTouchstone } from "../../src/readings/touchstone.ts";
import { TouchstoneFault } from "../../src/readings/touchstoneFault.ts";
import { benchRows, fieldsOf } from "./bench.ts";

const db = (value: Complex) => 20 * Math.log10(abs(value));
const degrees = (value: Complex) => (arg(value) * 180) / Math.PI;

/** Line and message of the fault that a text must cause. */
function faultOf(text: string, ports: 1 | 2): { line: number; message: string } {
  try {
    readTouchstone(text, ports);
  } catch (error) {
    if (error instanceof TouchstoneFault) return { line: error.line, message: error.message };
    throw error;
  }
  throw new Error("the text was read without a fault");
}

describe("a Touchstone file", () => {
  it.runIf(benchRows("touchstone_s1p").length > 0)("agrees with the reference table", () => {
    for (const { row, input, expected, tolerance } of [
      ...benchRows("touchstone_s1p"),
      ...benchRows("touchstone_s2p"),
    ]) {
      const ports = row["kind"] === "touchstone_s1p" ? 1 : 2;
      const { points } = readTouchstone(input.replaceAll(" / ", "\n"), ports);
      const wanted = expected.split(" ; ").map(fieldsOf);
      expect(points).toHaveLength(wanted.length);
      wanted.forEach((one, i) => {
        const point = points[i]!;
        expect(point.frequencyHz).toBeCloseTo(Number(one["f_hz"]), 2);
        expect(Math.abs(db(point.s11) - Number(one["s11_db"]))).toBeLessThanOrEqual(tolerance);
        if (one["s21_db"] !== undefined) {
          expect(Math.abs(db(point.s21!) - Number(one["s21_db"]))).toBeLessThanOrEqual(tolerance);
        }
      });
    }
  });

  it("has defaults of GHz, S, MA and 50 ohm, and takes the items in any order and case", () => {
    expect(readTouchstone("#\n2 0.5 90", 1)).toMatchObject({
      referenceOhm: 50,
      points: [{ frequencyHz: 2e9, s11: { im: 0.5 } }],
    });
    const { referenceOhm, points } = readTouchstone("# r 75.5 db s MHz ! as exported\n10368 -6.0206 180", 1);
    expect(referenceOhm).toBe(75.5);
    expect(points[0]!.frequencyHz).toBe(10368e6);
    expect(points[0]!.s11.re).toBeCloseTo(-0.5, 5);
  });

  it("may end its lines anyhow, wrap them, begin with a mark of its encoding, and hold comments anywhere", () => {
    const text =
      "\uFEFF! bare horn\r# Hz S RI R 50\r\n1 0.1 0.2 ! first\n0.3 0.4\n\n0.5 0.6 0.7 0.8\r2 0 0 0 0 0 0 0 1e-1";
    const { points } = readTouchstone(text, 2);
    expect(points).toEqual([
      {
        frequencyHz: 1,
        s11: { re: 0.1, im: 0.2 },
        s21: { re: 0.3, im: 0.4 },
        s12: { re: 0.5, im: 0.6 },
        s22: { re: 0.7, im: 0.8 },
      },
      expect.objectContaining({ frequencyHz: 2, s22: { re: 0, im: 0.1 } }),
    ]);
  });

  it("of two ports ends where noise data begin", () => {
    const text =
      "# GHz S MA R 50\n10 .1 0 .9 0 .9 0 .1 0\n11 .1 0 .9 0 .9 0 .1 0\n10 0.7 .64 69 .38\n11 0.9 .6 70 .4\n";
    expect(readTouchstone(text, 2).points.map((point) => point.frequencyHz)).toEqual([10e9, 11e9]);
    expect(faultOf("# GHz\n10 .1 0 .9 0 .9 0 .1 0\n9 .1 0 .9 0 .9 0 .1 0", 2)).toMatchObject({ line: 3 });
    expect(faultOf("# GHz\n10 .1 0\n10 .2 0", 1)).toEqual({ line: 3, message: "frequency 10 does not rise" });
  });

  const second = (lines: string, data: string) =>
    `[Version] 2.0\n# GHz S RI R 50\n[Number of Ports] 2\n${lines}\n[Network Data]\n${data}\n[End]\nthis is not read`;

  it("of version 2 says its order, matrix, reference and number of frequencies", () => {
    const values = "10 .1 0 .2 0 .3 0 .4 0";
    const full = readTouchstone(second("[Two-Port Data Order] 12_21\n[Number of Frequencies] 1", values), 2);
    expect(full.points[0]).toMatchObject({ s12: { re: 0.2 }, s21: { re: 0.3 }, s22: { re: 0.4 } });
    const usual = readTouchstone(
      second("[Two-Port Data Order] 21_12\n[Reference]\n! ohm\n60\n70", values),
      2,
    );
    expect(usual.points[0]).toMatchObject({ s21: { re: 0.2 }, s12: { re: 0.3 } });
    expect(usual.referenceOhm).toBe(60);
    for (const half of ["Lower", "upper"]) {
      const lines = `[Two-Port Data Order] 21_12\n[Matrix Format] ${half}`;
      expect(readTouchstone(second(lines, "10 .1 0 .2 0 .4 0"), 2).points[0]).toMatchObject({
        s11: { re: 0.1 },
        s21: { re: 0.2 },
        s12: { re: 0.2 },
        s22: { re: 0.4 },
      });
    }
  });

  it("of version 2 skips noise and information", () => {
    const lines =
      "[Two-Port Data Order] 21_12\n[Number of Noise Frequencies] 1\n[Begin Information]\n3 words [x]\n[End Information]";
    const data = "10 .1 0 .2 0 .3 0 .4 0\n[Noise Data]\n4 .7 .64 69 19";
    expect(readTouchstone(second(lines, data), 2).points).toHaveLength(1);
  });

  it("of one port may hold impedance or admittance", () => {
    // 100 ohm on 50 ohm reflects 1/3; its admittance is 0.01 S
    for (const text of [
      "# Z RI\n1 2 0",
      "# Y RI\n1 0.5 0",
      "[Version] 2.0\n# GHz Z RI R 50\n[Number of Ports] 1\n[Network Data]\n1 100 0",
      "[Version] 2.0\n# GHz Y RI R 50\n[Number of Ports] 1\n[Network Data]\n1 0.01 0",
    ]) {
      expect(readTouchstone(text, 1).points[0]!.s11.re).toBeCloseTo(1 / 3, 12);
    }
    expect(faultOf("# Z RI\n1 2 0 1 0 1 0 2 0", 2).message).toMatch(/S parameters/);
    expect(faultOf("! h\n# H RI\n1 2 0 1 0 1 0 2 0", 2)).toMatchObject({ line: 2 });
  });

  it.each([
    ["", 1, 1, /option line/],
    ["! nothing\n1 0.5 0\n# GHz", 1, 2, /before the option line/],
    ["# GHz\n", 1, 2, /no data/],
    ["# GHz\n1 0.5 zero", 1, 2, /zero stands/],
    ["# GHz\n1 0.5 Infinity", 1, 2, /number/],
    ["# GHz\n1 0.5 0\n2 0.5", 1, 3, /not complete/],
    ["# GHz S MA R -50\n1 0.5 0", 1, 1, /above 0/],
    ["# GHz S MA R\n1 0.5 0", 1, 1, /nothing stands/],
    ["# THz\n1 0.5 0", 1, 1, /THZ/],
    ["# GHz\n-1 0.5 0", 1, 2, /below 0/],
    ["# GHz\n[Network Data]\n1 0.5 0", 1, 2, /\[Version\]/],
    ["[Version] 3.0\n# GHz\n1 0.5 0", 1, 1, /3\.0/],
    ["[Version] 2.0\n# GHz\n[Number of Ports] 4\n", 1, 3, /4 ports/],
    ["[Version] 2.0\n# GHz\n[Number of Ports] 1\n1 0 0", 1, 4, /before \[Network Data\]/],
    ["[Version] 2.0\n# GHz\n[Mixed-Mode Order] D2,3 C2,3", 2, 3, /mixed/],
    ["[Version] 2.0\n# GHz\n[Colour] red", 1, 3, /COLOUR/],
    ["[Version] 2.0\n# GHz\n[Network Data]\n1 0 0 0 0 0 0 0 0", 2, 4, /Two-Port/],
    [
      "[Version] 2.0\n# GHz\n[Reference] 50\n[Two-Port Data Order] 21_12\n[Network Data]\n1 0 0 0 0 0 0 0 0",
      2,
      6,
      /1 values/,
    ],
    ["[Version] 2.0\n# GHz\n[Number of Frequencies] 2\n[Network Data]\n1 0 0", 1, 3, /2 frequencies/],
    ["[Version] 2.0\n# GHz\n[Matrix Format] Round", 1, 3, /FULL, LOWER, UPPER/],
  ] as const)("is refused with its line: %j", (text, ports, line, message) => {
    const fault = faultOf(text, ports);
    expect(fault.message).toMatch(message);
    expect(fault.line).toBe(line);
  });

  it("returns what was written, in every format and unit", () => {
    const magnitude = fc.double({ min: 1e-4, max: 1, noNaN: true });
    const angle = fc.double({ min: -179, max: 179, noNaN: true });
    const formats = {
      MA: (m: number, a: number) => `${m} ${a}`,
      DB: (m: number, a: number) => `${20 * Math.log10(m)} ${a}`,
      RI: (m: number, a: number) =>
        `${m * Math.cos((a * Math.PI) / 180)} ${m * Math.sin((a * Math.PI) / 180)}`,
    };
    const units = { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9 };
    fc.assert(
      fc.property(
        fc.constantFrom("MA", "DB", "RI"),
        fc.constantFrom("Hz", "kHz", "MHz", "GHz"),
        magnitude,
        angle,
        (format, unit, m, a) => {
          const text = `# ${unit} S ${format} R 50\n10.368 ${formats[format](m, a)}`;
          const [point] = readTouchstone(text, 1).points;
          expect(point!.frequencyHz).toBeCloseTo(10.368 * units[unit], 3);
          expect(abs(point!.s11)).toBeCloseTo(m, 10);
          expect(degrees(point!.s11)).toBeCloseTo(a, 8);
        },
      ),
    );
  });
});
