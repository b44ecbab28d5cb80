import { describe, expect, it } from "vitest";
import { combineMechanisms, type Mechanisms } from "../../src/path/clearAirCombination.ts";

/** A path well beyond the horizon, where only what a test sets is strong. */
const far: Mechanisms = {
  percent: 1,
  beta0Percent: 2,
  distanceKm: 300,
  seaFraction: 0,
  terrainExcessMPerKm: 50,
  freeSpaceDb: 160,
  lineOfSightDb: 158,
  lineOfSightBeta0Db: 159,
  diffractionMedianDb: 200,
  diffractionDb: 150,
  timeWeight: 1,
  troposcatterDb: 230,
  ductingDb: 400,
};

describe("combination of the mechanisms", () => {
  it("follows the strongest one far beyond the horizon", () => {
    expect(combineMechanisms(far)).toBeCloseTo(230, 3);
    expect(combineMechanisms({ ...far, ductingDb: 190 })).toBeCloseTo(190, 3);
    expect(combineMechanisms({ ...far, diffractionDb: 10 })).toBeCloseTo(168, 3);
  });

  it("loses 1.5 dB against either of two equal ones", () => {
    // P.452-18 equation 64: 5 log 2.
    expect(combineMechanisms({ ...far, ductingDb: 230 })).toBeCloseTo(230 - 5 * Math.log10(2), 3);
  });

  it("lets no duct do better than the focused line of sight", () => {
    expect(combineMechanisms({ ...far, ductingDb: 100 })).toBeCloseTo(158, 3);
  });

  it("takes line of sight and diffraction on a clear short path", () => {
    const clear = {
      ...far,
      distanceKm: 5,
      terrainExcessMPerKm: -50,
      diffractionDb: 3,
      diffractionMedianDb: 4,
    };
    expect(combineMechanisms(clear)).toBeCloseTo(161, 3);
    expect(combineMechanisms({ ...clear, seaFraction: 1 })).toBeCloseTo(158, 3);
    // Above beta0 the least loss slides from the median, 164 dB, to that at beta0, 159 + 3 dB.
    expect(combineMechanisms({ ...clear, percent: 50, timeWeight: 0 })).toBeCloseTo(164, 3);
    expect(combineMechanisms({ ...clear, percent: 10, timeWeight: 0.5 })).toBeCloseTo(163, 3);
  });

  it("stays finite for losses beyond any use", () => {
    expect(
      combineMechanisms({ ...far, troposcatterDb: 9000, ductingDb: 9000, diffractionDb: 9000 }),
    ).toBeCloseTo(9000 - 5 * Math.log10(2), 3);
  });
});
