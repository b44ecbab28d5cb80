import { describe, expect, it } from "vitest";
import { integrate } from "../../src/numeric/quadrature.ts";
import { requiredEbN0Db } from "../../src/receiver/digital.ts";

describe("energy a bit for a bit error ratio", () => {
  it("is 9.59, 10.34 and 13.35 dB at 1e-5", () => {
    // J. G. Proakis, Digital Communications (textbook figures)
    const at = (keying: Parameters<typeof requiredEbN0Db>[0]["keying"]) =>
      requiredEbN0Db({ keying, bitErrorRatio: 1e-5 });
    expect(at("coherentPhase")).toBeCloseTo(9.59, 2);
    expect(at("differentialPhase")).toBeCloseTo(10.34, 2);
    expect(at("twoTone")).toBeCloseTo(13.35, 2);
  });

  it("agrees with the Gaussian tail integrated for coherent keying", () => {
    const x = 10 ** (requiredEbN0Db({ keying: "coherentPhase", bitErrorRatio: 0.01 }) / 10);
    const tail = integrate((t) => Math.exp((-t * t) / 2) / Math.sqrt(2 * Math.PI), Math.sqrt(2 * x), 12, 128);
    expect(tail).toBeCloseTo(0.01, 12);
  });

  it("refuses a ratio of 0 and a coin's toss", () => {
    expect(() => requiredEbN0Db({ keying: "twoTone", bitErrorRatio: 0 })).toThrow(RangeError);
    expect(() => requiredEbN0Db({ keying: "twoTone", bitErrorRatio: 0.5 })).toThrow(RangeError);
  });
});
