import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bullingtonLoss } from "../../src/path/bullington.ts";
import { type DeltaBullingtonInput, deltaBullingtonLoss } from "../../src/path/deltaBullington.ts";
import { knifeEdgeLoss } from "../../src/path/knifeEdge.ts";
import { type Profile, smoothSurface } from "../../src/path/profile.ts";
import { describeReference, num, type Row } from "../reference.ts";
import { polarizationOf, referenceProfile } from "./profiles.ts";

const base: Omit<DeltaBullingtonInput, "profile"> = {
  frequencyGHz: 10.368,
  txHeightM: 10,
  rxHeightM: 20,
  effectiveRadiusKm: 8500,
  polarization: "horizontal",
};

const anyProfile = fc
  .array(fc.double({ min: 0, max: 600, noNaN: true }), { minLength: 4, maxLength: 60 })
  .chain((heightsM) =>
    fc.record({
      distancesKm: fc.constant(heightsM.map((_, i) => 0.7 * i + 0.02 * i ** 1.5)),
      heightsM: fc.constant(heightsM),
      coverM: fc.array(fc.double({ min: 0, max: 30, noNaN: true }), {
        minLength: heightsM.length,
        maxLength: heightsM.length,
      }),
    }),
  );
const anyHeight = fc.double({ min: 0.5, max: 200, noNaN: true });

/** Equations 13 to 21 of P.452-18 as printed, with the equivalent edge built explicitly. */
function bullingtonAsPrinted(profile: Profile, f: number, hts: number, hrs: number, a: number): number {
  const { distancesKm, heightsM, coverM } = profile;
  const D = distancesKm[distancesKm.length - 1]!;
  const points = Array.from(distancesKm, (d, i) => ({ d, g: heightsM[i]! + (coverM?.[i] ?? 0) })).slice(
    1,
    -1,
  );
  const bulge = (d: number) => (500 * d * (D - d)) / a;
  const slopeTx = Math.max(...points.map(({ d, g }) => (g + bulge(d) - hts) / d));
  const slopeRay = (hrs - hts) / D;
  const perEdge = (d: number) => Math.sqrt((0.002 * D) / ((0.2998 / f) * d * (D - d)));
  let nu: number;
  if (slopeTx < slopeRay) {
    nu = Math.max(...points.map(({ d, g }) => (g + bulge(d) - (hts * (D - d) + hrs * d) / D) * perEdge(d)));
  } else {
    const slopeRx = Math.max(...points.map(({ d, g }) => (g + bulge(d) - hrs) / (D - d)));
    const d = (hrs - hts + slopeRx * D) / (slopeTx + slopeRx);
    nu = (hts + slopeTx * d - (hts * (D - d) + hrs * d) / D) * perEdge(d);
  }
  const edge = knifeEdgeLoss(nu);
  return edge + (1 - Math.exp(-edge / 6)) * (10 + 0.02 * D);
}

describe("equivalent edge of a profile", () => {
  it("agrees with the equations as printed", () => {
    fc.assert(
      fc.property(anyProfile, anyHeight, anyHeight, (profile, tx, rx) => {
        const last = profile.heightsM.length - 1;
        const hts = profile.heightsM[0]! + tx + 1;
        const hrs = profile.heightsM[last]! + rx + 1;
        const ours = bullingtonLoss(profile, 10, hts, hrs, 8500);
        expect(Math.abs(ours - bullingtonAsPrinted(profile, 10, hts, hrs, 8500))).toBeLessThan(1e-6);
      }),
    );
  });

  it("falls when an antenna rises, and rises with the ground", () => {
    fc.assert(
      fc.property(anyProfile, anyHeight, fc.nat(), (profile, lift, place) => {
        const at = (p: Profile, tx: number) => bullingtonLoss(p, 10, tx, 300, 8500);
        const index = 1 + (place % (profile.heightsM.length - 2));
        const raised = profile.heightsM.map((h, i) => (i === index ? h + lift : h));
        expect(at(profile, 100 + lift)).toBeLessThanOrEqual(at(profile, 100) + 1e-9);
        expect(at({ ...profile, heightsM: raised }, 100)).toBeGreaterThanOrEqual(at(profile, 100) - 1e-9);
      }),
    );
  });

  it("is that of half the field where the ray just grazes", () => {
    // 500 * 100 / 5000 = 10 m of bulge at the middle: nu = 0 exactly.
    const loss = bullingtonLoss({ distancesKm: [0, 10, 20] }, 10, 10, 10, 5000);
    const edge = knifeEdgeLoss(0);
    expect(loss).toBeCloseTo(edge + (1 - Math.exp(-edge / 6)) * 10.4, 10);
  });

  it("counts no cover nearer than 50 m to an antenna", () => {
    const distancesKm = [0, 0.03, 0.05, 1, 1.96, 2];
    const heightsM = [0, 0, 0, 0, 0, 0];
    const at = (coverM: number[]) => bullingtonLoss({ distancesKm, heightsM, coverM }, 10, 20, 20, 8500);
    const bare = at([0, 0, 0, 0, 0, 0]);
    expect(at([50, 50, 0, 0, 50, 50])).toBe(bare);
    expect(at([0, 0, 50, 0, 0, 0])).toBeGreaterThan(bare + 6);
  });
});

describe("delta-Bullington loss", () => {
  it("gives 100 km of flat land the loss of the smooth Earth", () => {
    // ITU-R Study Group 3, validation results for Rec. ITU-R P.452-18, path "flat_land_100km":
    // Lbulla50, Lbulls50, Ldsph50 and Ld50 at 2 GHz, vertical, 10 m, k = 157 / (157 - 42.496465).
    const distancesKm = Array.from({ length: 101 }, (_, i) => i);
    const result = deltaBullingtonLoss({
      profile: { distancesKm, heightsM: distancesKm.map(() => 0) },
      frequencyGHz: 2,
      txHeightM: 10,
      rxHeightM: 10,
      effectiveRadiusKm: (6371 * 157) / (157 - 42.496465),
      polarization: "vertical",
    });
    expect(result.actualDb).toBeCloseTo(38.43000095885, 6);
    expect(result.smoothDb).toBeCloseTo(38.43000095885, 6);
    expect(result.sphericalDb).toBeCloseTo(99.60559847, 5);
    expect(result.lossDb).toBeCloseTo(99.60559847, 5);
  });

  it("is the same from either end", () => {
    fc.assert(
      fc.property(anyProfile, anyHeight, anyHeight, (profile, txHeightM, rxHeightM) => {
        const last = profile.heightsM.length - 1;
        const mirrored = {
          distancesKm: profile.distancesKm.map(
            (_, i) => profile.distancesKm[last]! - profile.distancesKm[last - i]!,
          ),
          heightsM: profile.heightsM.toReversed(),
          coverM: profile.coverM.toReversed(),
        };
        const there = deltaBullingtonLoss({ ...base, profile, txHeightM, rxHeightM });
        const back = deltaBullingtonLoss({
          ...base,
          profile: mirrored,
          txHeightM: rxHeightM,
          rxHeightM: txHeightM,
        });
        expect(Math.abs(back.lossDb - there.lossDb)).toBeLessThan(1e-6);
      }),
    );
  });

  it("is never a gain, nor less than that of the profile's own edge", () => {
    fc.assert(
      fc.property(anyProfile, anyHeight, anyHeight, (profile, txHeightM, rxHeightM) => {
        const { lossDb, actualDb } = deltaBullingtonLoss({ ...base, profile, txHeightM, rxHeightM });
        expect(actualDb).toBeGreaterThanOrEqual(0);
        expect(lossDb).toBeGreaterThanOrEqual(actualDb);
      }),
    );
  });

  it("answers for antennas on the ground", () => {
    fc.assert(
      fc.property(anyProfile, anyHeight, (profile, rxHeightM) => {
        const { lossDb } = deltaBullingtonLoss({ ...base, profile, txHeightM: 0, rxHeightM });
        expect(lossDb).toBeGreaterThanOrEqual(0);
      }),
    );
  });

  it("takes the sea from the zones unless it is told", () => {
    const distancesKm = Array.from({ length: 81 }, (_, i) => i);
    const heightsM = distancesKm.map(() => 0);
    const zones = distancesKm.map(() => "sea" as const);
    const wet = deltaBullingtonLoss({
      ...base,
      polarization: "vertical",
      profile: { distancesKm, heightsM, zones },
    });
    const told = deltaBullingtonLoss({
      ...base,
      polarization: "vertical",
      profile: { distancesKm, heightsM },
      seaFraction: 1,
    });
    const dry = deltaBullingtonLoss({
      ...base,
      polarization: "vertical",
      profile: { distancesKm, heightsM },
    });
    expect(wet.lossDb).toBe(told.lossDb);
    expect(Math.abs(wet.lossDb - dry.lossDb)).toBeGreaterThan(0.01);
  });

  it("refuses a broken profile and an antenna under ground", () => {
    const profile = { distancesKm: [0, 1, 2], heightsM: [0, 0, 0] };
    expect(() => deltaBullingtonLoss({ ...base, profile: { ...profile, heightsM: [0] } })).toThrow(
      "heightsM",
    );
    expect(() => deltaBullingtonLoss({ ...base, profile, txHeightM: -1 })).toThrow("txHeightM");
    expect(() => deltaBullingtonLoss({ ...base, profile, effectiveRadiusKm: 0 })).toThrow(
      "effectiveRadiusKm",
    );
  });
});

function check(row: Row, polarization: "horizontal" | "vertical", toleranceDb: number): void {
  const profile = referenceProfile(row["profile"]!);
  const txHeightM = num(row, "htg_m");
  const rxHeightM = num(row, "hrg_m");
  const result = deltaBullingtonLoss({
    profile,
    txHeightM,
    rxHeightM,
    frequencyGHz: num(row, "f_GHz"),
    effectiveRadiusKm: num(row, "ae_km"),
    polarization,
  });
  expect(Math.abs(result.actualDb - num(row, "Lbulla_dB"))).toBeLessThan(toleranceDb);
  expect(Math.abs(result.smoothDb - num(row, "Lbulls_dB"))).toBeLessThan(toleranceDb);
  expect(Math.abs(result.sphericalDb - num(row, "Ldsph_dB"))).toBeLessThan(toleranceDb);
  expect(Math.abs(result.lossDb - num(row, "Ld_dB"))).toBeLessThan(toleranceDb);
}

// ITU-R SG3 validation results; published with slightly other constants.
describeReference("terrain/delta-bullington-published.csv", (row) => check(row, "horizontal", 0.01));

// Reference implementation of P.452-18 on the same two profiles.
describeReference("terrain/delta-bullington-10GHz.csv", (row) => {
  check(row, polarizationOf(row), 1e-6);
  const profile = referenceProfile(row["profile"]!);
  const last = profile.heightsM.length - 1;
  const tx = profile.heightsM[0]! + num(row, "htg_m");
  const rx = profile.heightsM[last]! + num(row, "hrg_m");
  const surface = smoothSurface(profile, tx, rx);
  expect(Math.abs(surface.diffractionTxM - num(row, "hstd_m"))).toBeLessThan(1e-6);
  expect(Math.abs(surface.diffractionRxM - num(row, "hsrd_m"))).toBeLessThan(1e-6);
});
