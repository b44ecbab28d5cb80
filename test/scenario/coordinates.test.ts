import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { type Axis, readCoordinate } from "../../src/scenario/coordinates.ts";
import type { RefusalCode } from "../../src/scenario/quantity.ts";

// 25' 48" = 0.43 deg and 11' 24" = 0.19 deg, both exactly: 1548/3600 and 684/3600
const accepted: [input: string | number, axis: Axis, degrees: number][] = [
  [53.43, "latitude", 53.43],
  [-0.19, "longitude", -0.19],
  [0, "longitude", 0],
  ["53.43", "latitude", 53.43],
  ["+53.43", "latitude", 53.43],
  ["−0.19", "longitude", -0.19], // typographic minus
  ["53.43 N", "latitude", 53.43],
  ["53.43N", "latitude", 53.43],
  ["53.43 deg N", "latitude", 53.43],
  ["53.43 degrees", "latitude", 53.43],
  ["53.43° n", "latitude", 53.43],
  ["N53.43", "latitude", 53.43],
  ["N 53 25 48", "latitude", 53.43],
  ["0.19 E", "longitude", 0.19],
  ["0.19 w", "longitude", -0.19],
  ["W0.19", "longitude", -0.19],
  ["-0.19 W", "longitude", -0.19],
  ["+0.19 E", "longitude", 0.19],
  ["53°25'48\" N", "latitude", 53.43],
  ["53° 25′ 48″ N", "latitude", 53.43],
  ["53º25’48’’S", "latitude", -53.43],
  ["53°25.8'N", "latitude", 53.43],
  ["53 25.8 N", "latitude", 53.43],
  ["53 25 48 N", "latitude", 53.43],
  ["53:25:48 N", "latitude", 53.43],
  ["53d25m48s N", "latitude", 53.43],
  ["53d25m48s", "latitude", 53.43],
  ["53d 25m 48s S", "latitude", -53.43],
  ["53d25.8m S", "latitude", -53.43],
  ["53 25 48 s", "latitude", -53.43], // without d and m, s is south
  ["0 11 24 W", "longitude", -0.19],
  ["-0 11 24", "longitude", -0.19], // the sign survives a zero of degrees
  ["90", "latitude", 90],
  ["180 W", "longitude", -180],
];

const refused: [input: string, axis: Axis, code: RefusalCode, hint?: RegExp][] = [
  ["-0.19 E", "longitude", "contradiction", /opposite/],
  ["+0.19 W", "longitude", "contradiction", /opposite/],
  ["-53.43 N", "latitude", "contradiction", /opposite/],
  ["0.19 E", "latitude", "contradiction", /E belongs to a longitude.*swapped/],
  ["53.43 N", "longitude", "contradiction", /N belongs to a latitude/],
  ["153.02", "latitude", "out_of_range", /swapped/],
  ["90.0001", "latitude", "out_of_range"],
  ["90 0 1 N", "latitude", "out_of_range"],
  ["400", "latitude", "out_of_range", /ends at 90/],
  ["359.81", "longitude", "out_of_range", /write -0.19,/],
  ["-190", "longitude", "out_of_range", /write 170,/],
  ["1000", "longitude", "out_of_range", /ends at 180/],
  ["53 60 0 N", "latitude", "out_of_range", /below 60/],
  ["53 25 60 N", "latitude", "out_of_range", /below 60/],
  ["53.5 25 48 N", "latitude", "unreadable", /only the last/],
  ["53 25.5 48 N", "latitude", "unreadable", /only the last/],
  ["53,43", "latitude", "decimal_comma"],
  ["53.43, 0.19", "latitude", "unreadable"],
  ["N53.43N", "latitude", "unreadable"],
  ["53 25 48 12 N", "latitude", "unreadable"],
  ["5e1", "latitude", "unreadable"],
  ["--53", "latitude", "unreadable"],
  ["53 km", "latitude", "unreadable"],
  ["IO84", "latitude", "unreadable"],
  ["", "latitude", "no_number"],
  ["north", "latitude", "no_number"],
  [".inf", "latitude", "no_number"],
];

describe("readCoordinate", () => {
  it.each(accepted)("reads %j as a %s", (input, axis, degrees) => {
    const reading = readCoordinate(input, axis);
    if (!reading.ok) throw new Error(`refused: ${reading.code} ${reading.hint}`);
    expect(reading.degrees).toBeCloseTo(degrees, 12);
  });

  it.each(refused)("refuses %j as a %s", (input, axis, code, hint = /^/) => {
    const reading = readCoordinate(input, axis);
    if (reading.ok) throw new Error(`read as ${reading.degrees}`);
    expect(reading.code).toBe(code);
    expect(reading.hint ?? "").toMatch(hint);
    expect(reading.expected).toContain(axis);
  });

  it("refuses numbers that YAML can make and no globe has", () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(readCoordinate(value, "latitude").ok).toBe(false);
    }
  });

  it("reads degrees, minutes and seconds written out of any position", () => {
    const position = fc.record({
      degrees: fc.integer({ min: 0, max: 89 }),
      minutes: fc.integer({ min: 0, max: 59 }),
      seconds: fc.integer({ min: 0, max: 59 }),
      south: fc.boolean(),
    });
    fc.assert(
      fc.property(position, ({ degrees, minutes, seconds, south }) => {
        const letter = south ? "S" : "N";
        const exact = ((south ? -1 : 1) * (degrees * 3600 + minutes * 60 + seconds)) / 3600;
        for (const text of [
          `${degrees}°${minutes}'${seconds}"${letter}`,
          `${letter}${degrees} ${minutes} ${seconds}`,
          `${degrees}d${minutes}m${seconds}s ${letter}`,
          `${degrees}:${minutes}:${seconds} ${letter}`,
        ]) {
          const reading = readCoordinate(text, "latitude");
          expect(reading.ok && Math.abs(reading.degrees - exact) < 1e-12, text).toBe(true);
        }
      }),
    );
  });
});
