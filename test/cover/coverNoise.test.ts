import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { coverNoise } from "../../src/cover/coverNoise.ts";
import { layeredSheet } from "../../src/cover/layeredSheet.ts";
import { polar } from "../../src/numeric/complex.ts";
import { describeReference, num } from "../reference.ts";
import { parseStack } from "./stack.ts";

/** A matched attenuator of a loss in dB. */
const pad = (lossDb: number) => ({ reflection: polar(0, 0), transmission: polar(10 ** (-lossDb / 20), 0) });
const temperatures = { skyK: 60, coverK: 290, receiverK: 120 };

describe("noise of a cover", () => {
  // Pozar, Microwave Engineering, chapter on noise (from memory): a matched attenuator of loss L at T adds (L - 1) T at
  // its input, (1 - 1/L) T at its output.
  it("a matched pad of 3 dB at 290 K before a sky of 0 K gives (1 - 1/L) 290 K = 144.66 K", () => {
    const { availableGain, availableNoiseK } = coverNoise({
      ...temperatures,
      skyK: 0,
      feedReturnLossDb: Infinity,
      sheet: pad(3),
    });
    expect(availableGain).toBeCloseTo(0.501187, 6);
    expect(availableNoiseK).toBeCloseTo(144.656, 3);
  });

  // Friis: L before a receiver of T_r, sky at 0: C/N falls by L (T_r + (1 - 1/L) 290)/T_r.
  it("0.2 dB of warm water against a cold sky costs five times its loss at a quiet receiver", () => {
    const { carrierToNoiseChangeDb } = coverNoise({
      feedReturnLossDb: Infinity,
      sheet: pad(0.2),
      skyK: 10,
      coverK: 290,
      receiverK: 50,
    });
    // 0.2 + 10 log10((10/L + 290 (1 - 1/L) + 50)/60), L = 1.047129
    expect(carrierToNoiseChangeDb).toBeCloseTo(0.2 + 10 * Math.log10(72.6021 / 60), 4);
  });

  it("a sheet without heat adds no noise, however it reflects", () => {
    const sheet = { reflection: polar(0.6, 1), transmission: polar(0.8, -0.4) };
    const { availableGain, availableNoiseK, carrierToNoiseChangeDb } = coverNoise({
      ...temperatures,
      feedReturnLossDb: 12,
      sheet,
      phaseDeg: 20,
    });
    expect(availableGain).toBeCloseTo(1, 12);
    expect(availableNoiseK).toBeCloseTo(60, 10);
    expect(carrierToNoiseChangeDb).toBeCloseTo(0, 12);
  });

  it("all at one temperature: noise stays, C/N falls by the loss", () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.5, max: 60, noNaN: true }),
        fc.double({ min: 0, max: 0.9, noNaN: true }),
        fc.double({ min: 0.05, max: 1, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        (feedReturnLossDb, a, passed, phaseDeg) => {
          const sheet = {
            reflection: polar(a, 0.5),
            transmission: polar(Math.sqrt((1 - a * a) * passed), 0),
          };
          const everywhere = { skyK: 290, coverK: 290, isolatorK: 290, receiverK: 100 };
          const noise = coverNoise({ ...everywhere, feedReturnLossDb, sheet, phaseDeg });
          expect(noise.availableNoiseK).toBeCloseTo(290, 8);
          expect(noise.carrierToNoiseChangeDb).toBeCloseTo(-10 * Math.log10(passed), 8);
          expect(noise.carrierToNoiseChangeIsolatorDb).toBeGreaterThan(noise.carrierToNoiseChangeDb - 1e-9);
        },
      ),
    );
  });

  it.each([
    [{ skyK: -1 }, /skyK/],
    [{ coverK: Number.NaN }, /coverK/],
    [{ receiverK: 0 }, /receiverK/],
    [{ isolatorK: -5 }, /isolatorK/],
  ])("refuses %o", (change, named) => {
    expect(() => coverNoise({ ...temperatures, feedReturnLossDb: 12, sheet: pad(1), ...change })).toThrow(
      named,
    );
  });
});

describeReference("covers/check-noise.csv", (row) => {
  const frequencyGHz = 10.4;
  const layers = parseStack(row["stack"]!);
  const noise = coverNoise({
    feedReturnLossDb: num(row, "feed_rl_db"),
    sheet: layeredSheet({ frequencyGHz, incidenceDeg: 0, polarization: "te", layers }),
    phaseDeg: num(row, "phi22_deg"),
    gapMm: num(row, "gap_mm"),
    frequencyGHz,
    skyK: num(row, "t_sky_k"),
    coverK: num(row, "t_cover_k"),
    receiverK: num(row, "t_rx_k"),
  });
  const near = (value: number, column: string, tolerance: number) =>
    expect(Math.abs(value - num(row, column)), `${row["id"]} ${column}`).toBeLessThanOrEqual(tolerance);
  near(noise.availableGain, "ga", 1e-4 * num(row, "ga"));
  near(noise.availableNoiseK, "t_available_k", 0.01);
  near(noise.carrierToNoiseChangeDb, "cn_change_db", 1e-3);
  near(noise.carrierToNoiseChangeIsolatorDb, "cn_change_isolator_db", 1e-3);
});
