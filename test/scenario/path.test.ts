import { describe, expect, it } from "vitest";
import { pathSettings } from "../../src/budget/pathSettings.ts";
import { faultsOf, scenarioOf, spoiled } from "./sample.ts";

const end = "height: 3 m }\n";
const withKeys = (keys: string) => spoiled([end, `${end}  ${keys}\n`]);

async function settingsOf(keys: string) {
  return pathSettings((await scenarioOf(withKeys(keys))).path);
}

describe("the air of a path", () => {
  it("is that of the usual day where nothing is said", async () => {
    const { path } = await scenarioOf(spoiled());
    // 157 (1 - 3/4) = 39.25: the gradient that makes k = 4/3 (ITU-R P.452-18, equation 5).
    expect(pathSettings(path)).toEqual({
      k: 4 / 3,
      kLow: 2 / 3,
      N0: 325,
      dN: 39.25,
      txCoastKm: 500,
      rxCoastKm: 500,
    });
  });

  it("is read from k, a fraction too, and the gradient follows", async () => {
    const { k, dN } = await settingsOf("k: 5/4");
    expect(k).toBe(1.25);
    expect(dN).toBeCloseTo(157 * (1 - 1 / 1.25), 9);
  });

  it("is read from the refractivity, and k follows", async () => {
    const { k, dN, N0 } = await settingsOf("refractivity: { N0: 318, dN: 45 }");
    expect({ dN, N0 }).toEqual({ dN: 45, N0: 318 });
    expect(k).toBeCloseTo(157 / 112, 9);
  });

  it("never has a lowest k above the usual one", async () => {
    expect((await settingsOf("k: 0.5")).kLow).toBe(0.5);
  });
});

describe("trees and coasts", () => {
  it("are lengths at either end", async () => {
    const { path } = await scenarioOf(withKeys("foliage: { to: 20 ft }\n  coast: { from: 12 km }"));
    expect(path.foliageM?.from).toBe(0);
    expect(path.foliageM?.to).toBeCloseTo(6.096, 9); // a foot is 0.3048 m by definition
    expect(pathSettings(path)).toMatchObject({ txCoastKm: 12, rxCoastKm: 500 });
  });
});

describe("faults of a path", () => {
  it.each([
    ["k: 0", 17, /from 0\.3 to 20/],
    ["k: 1\n  k_low: 1.2", 18, /k_low is above k, expected at most 1$/],
    ["refractivity: { No: 325 }", 17, /No/],
    ["foliage: { to: 900 m }", 17, /from 0 to 400 m/],
    ["terrain: nowhere.hgt", 17, /nowhere\.hgt/],
  ])("%s", async (keys, after, message) => {
    const faults = await faultsOf(withKeys(keys));
    expect(faults).toHaveLength(1);
    expect(faults[0]!.message).toMatch(message);
    const line =
      withKeys(keys)
        .split("\n")
        .findIndex((text) => text.includes("height: 3 m }")) + 2;
    expect(faults[0]!.line).toBe(line + after - 17);
  });

  it("refuse a path to the other side of the globe, not one across an ocean", async () => {
    const to = (latitude: string, longitude: string) =>
      spoiled(["latitude: 54.27", `latitude: ${latitude}`], ["longitude: 3.30 W", `longitude: ${longitude}`]);
    expect((await faultsOf(to("30 S", "177 E")))[0]!.message).toMatch(/km, expected at most 10000 km/);
    expect((await scenarioOf(to("45 N", "75 W"))).path.to.longitude).toBe(-75);
  });
});
