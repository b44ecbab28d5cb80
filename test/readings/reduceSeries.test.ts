import { describe, expect, it } from "vitest";
import { bracketDifferences } from "../../src/readings/bracket.ts";
import { reduceReadings } from "../../src/readings/reduceReadings.ts";
import { reduceSeries } from "../../src/readings/reduceSeries.ts";
import { straightDrift } from "../../src/readings/straightDrift.ts";
import { randomSource } from "./bench.ts";

const losses: Readonly<Record<string, number>> = { open: 0, thin: 0.1, thick: 0.4 };

/** Readings at uneven times of a source that drifts by 0.07 dB per unit of time. */
function series(states: readonly string[], noise = (_: number) => 0) {
  return states.map((state, i) => {
    const time = i + 0.3 * Math.sin(i);
    return { time, state, levelDb: -40 + 0.07 * time - losses[state]! + noise(i) };
  });
}

const run = [
  "open",
  "thin",
  "thick",
  "open",
  "open",
  "thick",
  "open",
  "thin",
  "thin",
  "open",
  "thick",
  "open",
];

describe("a series of readings", () => {
  it("gives each cover's loss exactly under a straight drift at uneven times", () => {
    const { covers, readingStandardDb, outlier } = reduceSeries({ readings: series(run) });
    expect(covers.map(({ state }) => state)).toEqual(["thin", "thick"]);
    for (const { state, lossDb, typeADb } of covers) {
      expect(lossDb).toBeCloseTo(losses[state]!, 10);
      expect(typeADb).toBeLessThan(1e-10);
    }
    expect(readingStandardDb).toBeLessThan(1e-10);
    expect(outlier).toBeUndefined();
  });

  it("pools the scatter of all covers, so that a single reading of one has an uncertainty too", () => {
    const { normal } = randomSource(5);
    const readings = series(["open", "thin", "open", "thin", "open", "thick", "open"], () => 0.05 * normal());
    const { covers, degreesOfFreedom } = reduceSeries({ readings });
    expect(degreesOfFreedom).toBe(1);
    const [thin, thick] = covers;
    expect(thick!.differencesDb).toHaveLength(1);
    expect(thick!.typeADb).toBeGreaterThan(thin!.typeADb);
  });

  it("estimates the scatter of one reading without bias, whatever the order", () => {
    const { normal } = randomSource(6);
    let variance = 0;
    for (let trial = 0; trial < 2000; trial++) {
      variance +=
        reduceSeries({ readings: series(run, () => 0.05 * normal()) }).readingStandardDb ** 2 / 2000;
    }
    // relative random error of the mean: sqrt(2/5/2000) = 1.4 %
    expect(variance / 0.05 ** 2).toBeGreaterThan(0.95);
    expect(variance / 0.05 ** 2).toBeLessThan(1.05);
  });

  it("names covered readings without an open one on either side", () => {
    const readings = series(["thin", ...run, "thick"]);
    const { covers, unbracketed } = reduceSeries({ readings });
    expect(unbracketed).toEqual([0, run.length + 1]);
    expect(covers).toEqual(
      reduceSeries({ readings }).covers.map((cover) => expect.objectContaining({ state: cover.state })),
    );
    expect(bracketDifferences(readings).differences).toHaveLength(6);
  });

  it("agrees with readings in turn", () => {
    const openDb = [0, 0.1, -0.05, 0.02];
    const coveredDb = [-0.3, -0.22, -0.31];
    const readings = openDb.flatMap((levelDb, i) => [
      { time: 10 * i, state: "open", levelDb },
      ...(i < 3 ? [{ time: 10 * i + 5, state: "film", levelDb: coveredDb[i]! }] : []),
    ]);
    const one = reduceReadings({ openDb, coveredDb });
    const [film] = reduceSeries({ readings }).covers;
    expect(film!.lossDb).toBeCloseTo(one.lossDb, 12);
    expect(film!.typeADb).toBeCloseTo(one.typeADb, 12);
  });

  it("judges each cover by its own return loss", () => {
    const { normal } = randomSource(9);
    const { covers } = reduceSeries({
      readings: series(run, () => 0.005 * normal()),
      feedReturnLossDb: 15,
      coveredReturnLossDb: { thin: 6 },
    });
    // 6 dB of return loss alone costs 1.26 - 0.14 dB
    expect(covers[0]).toMatchObject({ state: "thin", verdict: "below_energy_floor" });
    expect(covers[0]!.floorDb).toBeCloseTo(1.117, 3);
    expect(covers[1]).toMatchObject({ state: "thick", verdict: "measured_loss", retake: false });
  });

  it("refuses times that do not rise", () => {
    const readings = series(run);
    expect(() => reduceSeries({ readings: [...readings].reverse() })).toThrow(/later/);
    expect(() => reduceSeries({ readings: readings.filter(({ state }) => state === "open") })).toThrow(
      /at least two/,
    );
  });
});

describe("one straight line of drift", () => {
  it("gives drift and losses, of unbracketed readings too", () => {
    const { driftDb, losses: found } = straightDrift(series(["thin", ...run, "thick"]));
    expect(driftDb).toBeCloseTo(0.07, 8);
    for (const { state, lossDb } of found) expect(lossDb).toBeCloseTo(losses[state]!, 8);
  });

  it("agrees with the brackets within their uncertainty, and scatters as much", () => {
    const { normal } = randomSource(21);
    let variance = 0;
    for (let trial = 0; trial < 300; trial++) {
      const readings = series(run, () => 0.05 * normal());
      const line = straightDrift(readings);
      variance += line.readingStandardDb ** 2 / 300;
      for (const { state, lossDb, typeADb } of reduceSeries({ readings }).covers) {
        const other = line.losses.find((one) => one.state === state)!;
        expect(Math.abs(lossDb - other.lossDb)).toBeLessThan(5 * Math.max(typeADb, other.standardDb));
      }
    }
    expect(variance / 0.05 ** 2).toBeGreaterThan(0.9);
    expect(variance / 0.05 ** 2).toBeLessThan(1.1);
  });

  it("refuses readings that leave a figure free", () => {
    expect(() => straightDrift(series(["open", "thin", "open"]))).toThrow(/more than 3/);
  });
});
