import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import { exposureOfLink } from "../../src/study/exposureOfLink.ts";
import { dishOf, feedOf, scenarioOf } from "../budget/scenarios.ts";

/** Speed of light over 10.368 GHz [m], by hand. */
const wavelengthM = 0.02891517;

describe("exposure in front of the transmitter", () => {
  it("takes the power behind the line", () => {
    // 40 dBm less 3 dB: 5.012 W
    const found = exposureOfLink(
      prepare(scenarioOf({ transmitter: { powerDbm: { value: 40 }, lineLossDb: { value: 3 } } })),
    );
    expect(found.powerW).toBeCloseTo(5.012, 3);
  });

  it("leaves pointing out: whoever stands on the axis stands on the axis", () => {
    const gainOf = (pointingErrorDeg: number, pointingOffsetDeg: number) =>
      exposureOfLink(
        prepare(scenarioOf({ dish: { tripod: dishOf({ pointingErrorDeg, pointingOffsetDeg }) } })),
      ).gainDbi;
    expect(gainOf(2, 1)).toBe(gainOf(0, 0));
  });

  it("of a bare feed is power times gain spread over a sphere", () => {
    // 1 W after the line with 20 dBi: 100 W; at the ICNIRP 2020 public limit of 10 W/m2 above 2 GHz
    // (whole body, table 5) the sphere has a radius of sqrt(100 / (4 pi 10)) = 0.892 m.
    const { transmitter: _, ...rest } = scenarioOf();
    const { gainDbi, eirpW, surfaceWPerM2, limits } = exposureOfLink(
      prepare({
        ...rest,
        feeds: { ...rest.feeds, horn: feedOf({ gainDbi: { value: 20 }, edgeTaperDb: undefined }) },
        transmitter: { feed: "horn", cover: "bare", lineLossDb: { value: 0.5 }, powerDbm: { value: 30.5 } },
      }),
    );
    expect(gainDbi).toBeCloseTo(20, 9);
    expect(eirpW).toBeCloseTo(100, 6);
    expect(surfaceWPerM2).toBeUndefined();
    const publicLimit = limits.find(
      ({ audience, limitWPerM2 }) => audience === "public" && limitWPerM2 === 10,
    )!;
    expect(publicLimit.distanceM).toBeCloseTo(0.892, 3);
  });

  it("of a dish reaches as far as power and gain say, where that is the far field", () => {
    // 100 W at a 60 cm dish of 37 dB or so exceeds 10 W/m2 far beyond 0.6 D^2 / lambda = 7.5 m.
    const found = exposureOfLink(
      prepare(scenarioOf({ transmitter: { powerDbm: { value: 50 }, lineLossDb: { value: 0 } } })),
    );
    const sphereM = Math.sqrt(found.eirpW / (4 * Math.PI * 10));
    expect(sphereM).toBeGreaterThan((0.6 * 0.6 ** 2) / wavelengthM);
    const limit = found.limits.find(
      ({ audience, limitWPerM2 }) => audience === "public" && limitWPerM2 === 10,
    )!;
    expect(limit.distanceM / sphereM).toBeCloseTo(1, 6);
  });

  it("of a dish has 4 P / A at its face", () => {
    // OET 65 equation 11: 4 x 10 W over pi 0.3^2 m2
    const found = exposureOfLink(
      prepare(scenarioOf({ transmitter: { powerDbm: { value: 40 }, lineLossDb: { value: 0 } } })),
    );
    expect(found.surfaceWPerM2).toBeCloseTo(40 / (Math.PI * 0.09), 6);
  });

  it("grows with the power, never shrinks", () => {
    const reach = [10, 20, 30, 40, 50].map((dbm) => {
      const { limits } = exposureOfLink(prepare(scenarioOf({ transmitter: { powerDbm: { value: dbm } } })));
      return Math.max(...limits.map(({ distanceM }) => distanceM));
    });
    expect(reach).toEqual([...reach].sort((a, b) => a - b));
    expect(reach[4]).toBeGreaterThan(reach[0]!);
  });

  it("of a dish whose size is not known goes by its gain alone", () => {
    const { limits, eirpW, surfaceWPerM2 } = exposureOfLink(
      prepare(scenarioOf({ dish: { tripod: dishOf({ diameterM: undefined, gainDbi: { value: 34 } }) } })),
    );
    expect(surfaceWPerM2).toBeUndefined();
    for (const { distanceM, limitWPerM2 } of limits) {
      expect(4 * Math.PI * distanceM ** 2 * limitWPerM2).toBeCloseTo(eirpW, 6);
    }
  });
});
