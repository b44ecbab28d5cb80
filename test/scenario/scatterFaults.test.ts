import { describe, expect, it } from "vitest";
import { faultsOf, spoiled, withoutMark } from "./sample.ts";

/** What is written in place of a field of the sample, with the mark where the fault is told; then its words. */
type Row = [what: string, written: string, ...words: string[]];

const POWER = "power: 3 W";
const LINE = "line_loss: 0.5 dB";
const RAIN = "rain: 16 mm/h";
const LAYER = "thickness: 5 mil";
const LOSS = "insertion_loss: 0.22 dB";

async function expectFault(field: string, code: string, written: string, words: string[]): Promise<void> {
  const { text, line, column } = withoutMark(spoiled([field, written]));
  const [fault, ...more] = await faultsOf(text);
  expect(more).toEqual([]);
  expect(fault).toMatchObject({ code, line, column });
  for (const word of words) expect(fault!.message).toContain(word);
  expect(fault!.message).not.toMatch(/undefined|\[object|NaN/);
}

const values: [field: string, ...Row][] = [
  [POWER, "no distribution", "¶power: {}", "a group of keys", "3 W", "normal, lognormal, flat"],
  [POWER, "a word that goes with a distribution, alone", "¶power: { sigma: 1 dB }", "normal, lognormal"],
  [POWER, "keys far from any", "¶power: { watts: 3 }", "a group of keys", "exponential, mixture"],
  [
    POWER,
    "two distributions",
    "¶power: { normal: 3 W, flat: [1 W, 2 W], sigma: 1 dB }",
    "both normal and flat",
  ],
  [
    POWER,
    "three",
    "¶power: { normal: 3 W, flat: [1 W, 2 W], mixture: [] }",
    "more than one of normal, flat, mixture",
  ],
  [POWER, "a list", "¶power: [1 W, 2 W]", "read a list", "3 W"],
  [POWER, "a negative sigma", "power: { normal: 3 W, sigma: ¶-0.5 dB }", '"-0.5 dB"', "from 0 to 130 dB"],
  [POWER, "a sigma in watts", "power: { normal: 3 W, sigma: ¶0.5 W }", '"0.5 W"', "a power", "0.25 dB"],
  [POWER, "a sigma without a unit", "power: { normal: 3 W, sigma: ¶0.5 }", "bare number", "0.5 dB"],
  [POWER, "a sigma beyond sense", "power: { normal: 3 W, sigma: ¶131 dB }", "130 dB"],
  [POWER, "a sigma and +/-", "power: { normal: ¶3 W +/- 1 dB, sigma: 1 dB }", "no uncertainty is taken here"],
  [POWER, "nothing for a mean", "power: { normal: ¶, sigma: 1 dB }", "read nothing"],
  [POWER, "a mean without a unit", "power: { normal: ¶3, sigma: 1 dB }", "bare number", "3 W"],
  [POWER, "a mean out of range", "power: { normal: ¶30 kW, sigma: 1 dB }", "from -60 to 70 dBm", "30 W"],
  [
    POWER,
    "a log-normal level",
    "power: { lognormal: ¶3 W, factor: 1.5 }",
    "lognormal",
    "expected normal",
    "dBm",
  ],
  [POWER, "an exponential level", "power: { exponential: ¶3 W }", "exponential", "expected normal", "dBm"],
  [
    POWER,
    "a mixed log-normal level",
    "power: { mixture: [{ share: 100 %, of: { lognormal: ¶3 W, factor: 2 } }] }",
    "dBm",
  ],
  [RAIN, "a factor of 1", "rain: { lognormal: 16 mm/h, factor: ¶1 }", '"1"', "from 1.001 to 5"],
  [RAIN, "a factor below 1", "rain: { lognormal: 16 mm/h, factor: ¶0.6 }", "from 1.001 to 5"],
  [RAIN, "a huge factor", "rain: { lognormal: 16 mm/h, factor: ¶60 }", "from 1.001 to 5"],
  [RAIN, "a factor in percent", "rain: { lognormal: 16 mm/h, factor: ¶160 % }", "write 1.6"],
  [RAIN, "a median of 0", "rain: { lognormal: ¶0 mm/h, factor: 1.6 }", '"0 mm/h"', "above 0"],
  [RAIN, "a median out of range", "rain: { lognormal: ¶500 mm/h, factor: 1.6 }", "from 0 to 400 mm/h"],
  [LOSS, "a negative median", "insertion_loss: { lognormal: ¶-1 dB, factor: 1.6 }", '"-1 dB"', "above 0"],
  [LINE, "an exponential of 0", "line_loss: { exponential: ¶0 dB }", '"0 dB"', "above 0"],
  [LOSS, "a negative exponential", "insertion_loss: { exponential: ¶-1 dB }", "above 0"],
  [LINE, "flat ends swapped", "line_loss: { ¶flat: [0.6 dB, 0.2 dB] }", "the high end first"],
  [LINE, "flat ends that are one", "line_loss: { ¶flat: [0.2 dB, 0.20 dB] }", "two equal ends"],
  [LINE, "one flat end", "line_loss: { ¶flat: [0.2 dB] }", "a list of 1", "expected two"],
  [LINE, "three flat ends", "line_loss: { ¶flat: [0.2 dB, 0.3 dB, 0.4 dB] }", "a list of 3"],
  [LINE, "flat ends without a list", "line_loss: { flat: ¶0.2 dB }", '"0.2 dB"', "a list of two"],
  [LINE, "a flat end without a unit", "line_loss: { flat: [0.2 dB, ¶0.6] }", "write 0.6 dB"],
  [LINE, "a flat end out of range", "line_loss: { flat: [¶-0.2 dB, 0.6 dB] }", "from 0 to 60 dB"],
  [LINE, "a flat end with a spread", "line_loss: { flat: [¶0.2 dB +/- 0.1 dB, 0.6 dB] }", "no uncertainty"],
  [LINE, "a flat end of unlike things", "line_loss: { flat: [0.2 dB, ¶0.3 dB + 2 m] }", "same kind"],
  [LINE, "a mixture without parts", "line_loss: { ¶mixture: [] }", "an empty list"],
  [LINE, "a mixture without a list", "line_loss: { mixture: ¶1 dB }", "a list of parts"],
  [LINE, "a part that is none", "line_loss: { mixture: [¶1 dB] }", '"1 dB"', "share and of"],
  [
    LINE,
    "shares short of the whole",
    "line_loss: { ¶mixture: [{ share: 90 %, of: 1 dB }, { share: 5.5 %, of: 2 dB }] }",
    "add up to 95.5 %, expected 100 %",
  ],
  [
    LINE,
    "a share beyond the whole",
    "line_loss: { mixture: [{ share: ¶101 %, of: 1 dB }] }",
    "from 0 to 100 %",
  ],
  [LINE, "a negative share", "line_loss: { mixture: [{ share: ¶-1 %, of: 1 dB }] }", "from 0 to 100 %"],
  [
    LINE,
    "a share that is no percentage",
    "line_loss: { mixture: [{ share: ¶0.5, of: 1 dB }] }",
    "write 50 %",
  ],
  [LINE, "a part without a unit", "line_loss: { mixture: [{ share: 100 %, of: ¶1 }] }", "write 1 dB"],
  [LINE, "a part out of range", "line_loss: { mixture: [{ share: 100 %, of: ¶61 dB }] }", "from 0 to 60 dB"],
  [
    LINE,
    "a flat part swapped",
    "line_loss: { mixture: [{ share: 100 %, of: { ¶flat: [2 dB, 1 dB] } }] }",
    "the high end first",
  ],
  [LAYER, "a thickness that is not normal", "thickness: { ¶flat: [4 mil, 6 mil] }", "flat", "+/- or normal"],
  [LAYER, "a log-normal thickness", "thickness: { lognormal: ¶5 mil, factor: 1.1 }", "+/- or normal"],
];

const keys: [field: string, ...Row][] = [
  [POWER, "a mistyped distribution", "power: { ¶norml: 3 W }", '"norml"', "did you mean normal?"],
  [POWER, "a mistyped sigma", "power: { normal: 3 W, sigma: 1 dB, ¶sgima: 2 dB }", "did you mean sigma?"],
  [
    LINE,
    "a key far from any",
    "line_loss: { flat: [0 dB, 1 dB], ¶colour: red }",
    '"colour"',
    "expected flat",
  ],
  [LINE, "a sigma beside flat ends", "line_loss: { flat: [0 dB, 1 dB], ¶sigma: 1 dB }", "sigma beside flat"],
  [
    LINE,
    "a key of a part",
    "line_loss: { mixture: [{ share: 100 %, of: 1 dB, ¶off: 2 dB }] }",
    "did you mean of?",
  ],
  [LINE, "a key of any object", "line_loss: { flat: [0 dB, 1 dB], ¶constructor: x }", '"constructor"'],
];

const missing: [field: string, ...Row][] = [
  [POWER, "a sigma", "¶power: { normal: 3 W }", '"sigma"', "one standard deviation", "0.25 dB"],
  [RAIN, "a factor", "¶rain: { lognormal: 16 mm/h }", '"factor"', "multiplies"],
  [LINE, "a share", "line_loss: { mixture: [¶{ of: 1 dB }] }", '"share"', "90 %"],
  [LINE, "a part", "line_loss: { mixture: [¶{ share: 100 % }] }", '"of"', "0.25 dB"],
];

describe("a faulty distribution", () => {
  it.each(values)("in place of %s: tells the place of %s", (field, _, written, ...words) =>
    expectFault(field, "bad_value", written, words),
  );

  it.each(keys)("in place of %s: tells the place of %s", (field, _, written, ...words) =>
    expectFault(field, "unknown_key", written, words),
  );

  it.each(missing)("in place of %s: tells what lacks %s", (field, _, written, ...words) =>
    expectFault(field, "missing_key", written, words),
  );

  it("is refused as a gain: log-normal and exponential", async () => {
    for (const form of ["lognormal: ¶10 dBi, factor: 1.2", "exponential: ¶10 dBi"]) {
      await expectFault("vswr: 1.2", "bad_value", `vswr: 1.2, gain: { ${form} }`, ["expected normal", "dBi"]);
    }
  });

  it("tells all its faults at once, with those of its neighbours", async () => {
    const faults = await faultsOf(
      spoiled(
        ["power: 3 W", "power: { mixture: [{ share: 2, of: 3 }, { shore: 1 % }] }"],
        ["0.5 dB", "{ flat: [1, 2] }"],
      ),
    );
    expect(faults.map(({ code }) => code)).toEqual([
      "bad_value",
      "bad_value",
      "missing_key",
      "missing_key",
      "unknown_key",
      "bad_value",
      "bad_value",
    ]);
  });

  it("comes to an end where an anchor is used within itself", async () => {
    const part = "{ share: 50 %, of: *x }";
    const faults = await faultsOf(
      spoiled(["rain: 16 mm/h", `rain: &x { mixture: [${Array(40).fill(part).join(", ")}] }`]),
    );
    expect(faults).not.toEqual([]);
    expect(faults.length).toBeLessThan(100);
    for (const { code, message } of faults) {
      expect(code).toBe("bad_value");
      expect(message).toMatch(/mixtures within mixtures|more than 50 parts/);
    }
  });
});
