import { describe, expect, it } from "vitest";
import { chart } from "../../src/report/chart.ts";

const steps = Array.from({ length: 2000 }, (_, i) => i / 100);
const draw = (one: (x: number) => number, other: (x: number) => number = () => 0) =>
  chart({
    x: steps,
    xLabel: "mm",
    yLabel: "dB",
    series: [
      { mark: "+", label: "worst", values: steps.map(one) },
      { mark: "o", label: "usual", values: steps.map(other) },
    ],
  }).split("\n");

describe("chart", () => {
  it("is 14 lines of plain characters within 80 columns", () => {
    for (const lines of [
      draw((x) => x),
      draw(
        (x) => Math.sin(x) ** 2,
        (x) => -1e3 * x,
      ),
      draw(() => 0),
      draw((x) => 1e-4 * x),
      draw((x) => 1e-9 * x),
      draw((x) => -0.1 + x / 2),
    ]) {
      expect(lines).toHaveLength(14);
      for (const line of lines) {
        expect(line).toMatch(/^[ -~]*$/);
        expect(line.length).toBeLessThanOrEqual(80);
      }
    }
  });

  it("draws a straight line from the lower left to the upper right", () => {
    const lines = draw((x) => x / 2);
    const columns = lines.slice(0, 10).map((line) => line.indexOf("+"));
    expect(columns).toEqual(columns.toSorted((a, b) => b - a));
    expect(lines[0]).toMatch(/\+$/);
    expect(lines[0]!.startsWith("  10 |") || lines[0]!.startsWith("    10 |")).toBe(true);
    expect(lines[10]).toMatch(/^ +0 \|o+/);
  });

  it("loses no peak, however narrow", () => {
    const lines = draw((x) => (x === 12.34 ? 8 : 0));
    const column = 8 + Math.round((12.34 / 19.99) * 71);
    const top = lines.findIndex((line) => line.slice(8).includes("+"));
    expect(lines[top]!.indexOf("+")).toBeGreaterThanOrEqual(column - 1);
    expect(lines[top]!.indexOf("+")).toBeLessThanOrEqual(column + 1);
    expect(lines[top]).toMatch(/^ +8 \|/);
  });

  it("leaves no hole between values that lie columns apart", () => {
    const lines = chart({
      x: [0, 1],
      xLabel: "mm",
      yLabel: "dB",
      series: [{ mark: "o", label: "two points", values: [0, 0] }],
    }).split("\n");
    expect(lines.find((line) => line.includes("o"))).toMatch(/\|o{72}$/);
  });

  it("shows values below zero below the zero line", () => {
    const lines = draw((x) => (x < 10 ? 4 : -4));
    const zero = lines.findIndex((line) => /^ +0 \|/.test(line));
    expect(lines.slice(0, zero).some((line) => line.includes("+"))).toBe(true);
    expect(lines.slice(zero + 1, 11).some((line) => line.includes("+"))).toBe(true);
  });

  it("lets no value rise above the figure of its row", () => {
    const lines = draw((x) => -0.1 + x / 2); // to 9.895: from a row of -1 a step of 1 would end at 9
    const top = lines.findIndex((line) => line.slice(8).includes("+"));
    expect(lines.slice(0, top + 1).find((line) => /^ +\d+ \|/.test(line))).toMatch(/^ +(10|12|16) \|/);
  });

  it("has round figures below, at the places that they name, and explains its marks", () => {
    const lines = draw((x) => x);
    const figures = lines[12]!;
    for (const [figure, at] of [
      ["5", 5],
      ["10", 10],
      ["15", 15],
    ] as const) {
      const column = 7 + Math.round((at / 19.99) * 71);
      expect(figures.slice(column, column + figure.length)).toBe(figure);
      expect(lines[11]![column]).toBe("+");
    }
    expect(lines[13]).toBe("dB over mm: + worst   o usual");
  });
});
