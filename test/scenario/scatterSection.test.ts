import { describe, expect, it } from "vitest";
import { faultsOf, sample, scenarioOf, withoutMark } from "./sample.ts";

const full = `spread:
  feed_return_loss: 2 dB
  cover_loss: 40 %
  water: 50 %
  rain_rate: 1.15
  rain_length: 25 %
  gas: 5 %
  fog: 45 %
  diffraction: 5 dB
  troposcatter: 7 dB
  rain_scatter: 6 dB
  foliage: 4 dB
  tilt: { flat: [0 dB, 0.3 dB] }
  blunder: { chance: 3.5 %, loss: { flat: [10 dB, 20 dB] } }
  correlation: { water: 0.8, cover: 1, aim: 0, gain: -0.1, return_loss: 0.2, line: -1 }
`;

const spreadOf = async (section: string) => (await scenarioOf(sample + section)).spread;

describe("the spread of what no field states", () => {
  it("is not there where nothing is said of it", async () => {
    expect(await spreadOf("")).toBeUndefined();
  });

  it("is read in canonical units, shares and factors", async () => {
    expect(await spreadOf(full)).toEqual({
      feedReturnLossDb: 2,
      coverLossShare: 0.4,
      waterShare: 0.5,
      rainRateFactor: 1.15,
      rainLengthShare: 0.25,
      gasShare: 0.05,
      fogShare: 0.45,
      diffractionDb: 5,
      troposcatterDb: 7,
      rainScatterDb: 6,
      foliageDb: 4,
      tiltLossDb: {
        value: 0.15,
        sigma: expect.closeTo(0.08660254, 8), // 0.3 over the root of 12
        scatter: { kind: "flat", low: 0, high: 0.3 },
      },
      blunder: {
        chance: expect.closeTo(0.035, 12),
        lossDb: {
          value: 15,
          sigma: expect.closeTo(2.88675135, 8),
          scatter: { kind: "flat", low: 10, high: 20 },
        },
      },
      correlation: { water: 0.8, cover: 1, aim: 0, gain: -0.1, returnLoss: 0.2, line: -1 },
    });
  });

  it("leaves open what is not typed", async () => {
    const given = Object.entries((await spreadOf("spread: { gas: 0 % }\n"))!);
    expect(given.filter(([, value]) => value !== undefined)).toEqual([["gasShare", 0]]);
    expect(await spreadOf("spread: {}\n")).toEqual({});
    expect(await spreadOf("spread: { correlation: { water: 1 } }\n")).toEqual({ correlation: { water: 1 } });
  });

  it("has no blunder at a chance of 0, whatever it would cost", async () => {
    expect((await spreadOf("spread: { blunder: { chance: 0 % } }\n"))!.blunder!.chance).toBe(0);
    const both = await spreadOf("spread: { blunder: { chance: 0 %, loss: 10 dB } }\n");
    expect(both!.blunder).toMatchObject({ chance: 0, lossDb: { value: 10 } });
  });

  it.each<[what: string, code: string, from: string, to: string, ...words: string[]]>([
    [
      "a correlation above 1",
      "bad_value",
      "water: 0.8",
      "water: ¶1.2",
      '"1.2"',
      "correlation",
      "from -1 to 1",
    ],
    ["a correlation below -1", "bad_value", "line: -1", "line: ¶-1.01", "correlation", "from -1 to 1"],
    ["a correlation in percent", "bad_value", "water: 0.8", "water: ¶80 %", "write 0.8"],
    ["an unknown correlation", "unknown_key", "aim: 0", "¶aims: 0", "did you mean aim?"],
    ["an unknown key", "unknown_key", "  gas:", "  ¶gass:", "did you mean gas?"],
    ["a share without its sign", "bad_value", "water: 50 %", "water: ¶0.5", "write 50 %"],
    ["a share above the whole", "bad_value", "water: 50 %", "water: ¶150 %", "from 0 to 100 %"],
    ["a negative share", "bad_value", "gas: 5 %", "gas: ¶-5 %", "from 0 to 100 %"],
    ["decibels without a unit", "bad_value", "troposcatter: 7 dB", "troposcatter: ¶7", "write 7 dB"],
    ["negative decibels", "bad_value", "troposcatter: 7 dB", "troposcatter: ¶-7 dB", "from 0 to 30 dB"],
    ["a factor below 1", "bad_value", "rain_rate: 1.15", "rain_rate: ¶0.9", "factor", "from 1 to 5"],
    ["a huge factor", "bad_value", "rain_rate: 1.15", "rain_rate: ¶6", "from 1 to 5"],
    [
      "a distribution where a number stands",
      "bad_value",
      "gas: 5 %",
      "¶gas: { flat: [1 %, 2 %] }",
      "a group of keys",
    ],
    [
      "a tilt that helps",
      "bad_value",
      "flat: [0 dB, 0.3",
      "flat: [¶-1 dB, 0.3",
      "tilted polarization",
      "from 0",
    ],
    ["a chance above 1", "bad_value", "chance: 3.5 %", "chance: ¶350 %", "from 0 to 100 %"],
    ["a blunder without a chance", "missing_key", "blunder: { chance: 3.5 %, ", "¶blunder: { ", '"chance"'],
    [
      "a blunder that costs nobody knows what",
      "missing_key",
      "blunder: { chance: 3.5 %, loss: { flat: [10 dB, 20 dB] } }",
      "¶blunder: { chance: 3.5 % }",
      '"loss"',
      "15 dB",
    ],
    ["a section that is none", "bad_value", full, "spread: ¶wide\n", '"wide"', "feed_return_loss"],
  ])("tells the place of %s", async (_, code, from, to, ...words) => {
    expect(full.split(from)).toHaveLength(2);
    const { text, line, column } = withoutMark(sample + full.replace(from, to));
    const [fault, ...more] = await faultsOf(text);
    expect(more).toEqual([]);
    expect(fault).toMatchObject({ code, line, column });
    for (const word of words) expect(fault!.message).toContain(word);
  });
});
