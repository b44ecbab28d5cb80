import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { judgeLoss } from "../../src/readings/verdict.ts";
import { benchRows, fieldsOf } from "./bench.ts";

const expanded = (typeADb: number) => 2 * Math.sqrt(typeADb ** 2 + 0.05 ** 2 / 3);

describe("the verdict on a loss", () => {
  it.each([
    // loss, type A, bare return loss, covered return loss
    [0.21, 0.02, 15, undefined, "measured_loss"],
    [-0.03, 0.02, 15, undefined, "indistinguishable_from_zero"],
    [-0.6, 0.02, 15, undefined, "implausible_gain"],
    [-0.25, 0.03, 10, undefined, "gain_possible_by_matching"],
    [0.05, 0.02, 13, 9, "below_energy_floor"],
  ])("on %d dB is as the energy and the uncertainty say", (lossDb, typeADb, bare, covered, verdict) => {
    const judged = judgeLoss({
      lossDb,
      expandedDb: expanded(typeADb),
      feedReturnLossDb: bare,
      coveredReturnLossDb: covered,
    });
    expect(judged.verdict).toBe(verdict);
    expect(judged.retake).toBe(verdict !== "measured_loss" && verdict !== "indistinguishable_from_zero");
  });

  it.runIf(benchRows("verdict").length > 0)("agrees with the reference table", () => {
    for (const { input, expected } of benchRows("verdict")) {
      const given = fieldsOf(input);
      const covered = given["rl_with_db"];
      expect(
        judgeLoss({
          lossDb: Number(given["il_db"]),
          expandedDb:
            Number(given["k"]) *
            Math.sqrt(Number(given["u_a_db"]) ** 2 + Number(given["rep_halfwidth_db"]) ** 2 / 3),
          feedReturnLossDb: Number(given["feed_rl_bare_db"]),
          coveredReturnLossDb: covered === undefined ? undefined : Number(covered),
        }).verdict,
      ).toBe(expected);
    }
  });

  it("never rests on less than 0.05 dB", () => {
    expect(judgeLoss({ lossDb: 0.049, expandedDb: 0.001 }).verdict).toBe("indistinguishable_from_zero");
    expect(judgeLoss({ lossDb: 0.051, expandedDb: 0.001 }).verdict).toBe("measured_loss");
  });

  it("credits no gain to tuning where the bare match is unknown or perfect", () => {
    expect(judgeLoss({ lossDb: -0.2, expandedDb: 0.06 }).verdict).toBe("implausible_gain");
    expect(judgeLoss({ lossDb: -0.2, expandedDb: 0.06, feedReturnLossDb: Infinity }).verdict).toBe(
      "implausible_gain",
    );
  });

  it("calls nothing a gain that loses, and no loss that gains", () => {
    const db = fc.double({ min: -3, max: 3, noNaN: true });
    const returnLoss = fc.double({ min: 1, max: 30, noNaN: true });
    fc.assert(
      fc.property(
        db,
        fc.double({ min: 0, max: 1, noNaN: true }),
        returnLoss,
        returnLoss,
        (lossDb, u, g, g1) => {
          const { verdict, floorDb } = judgeLoss({
            lossDb,
            expandedDb: u,
            feedReturnLossDb: g,
            coveredReturnLossDb: g1,
          });
          if (verdict === "measured_loss") expect(lossDb).toBeGreaterThan(0);
          if (verdict.includes("gain")) expect(lossDb).toBeLessThan(0);
          if (verdict === "below_energy_floor") expect(lossDb).toBeLessThan(floorDb!);
          // with both return losses known a gain beyond the feed's mismatch is below the floor as well
          expect(verdict).not.toBe("implausible_gain");
        },
      ),
    );
  });
});
