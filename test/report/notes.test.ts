import { describe, expect, it } from "vitest";
import { prepare } from "../../src/budget/prepare.ts";
import { leftOutText, safetyText, warningText } from "../../src/report/notes.ts";
import { plain } from "../../src/report/words.ts";
import type { LinkExposure } from "../../src/study/exposureOfLink.ts";
import { scenarioOf, weatherOf } from "../budget/scenarios.ts";

const limit = (name: string, limitWPerM2: number, distanceM: number) =>
  ({ name, audience: "public", limitWPerM2, distanceM }) as const;

function exposed(change: Partial<LinkExposure>): string {
  const found = { powerW: 3, gainDbi: 35, eirpW: 9487, surfaceWPerM2: undefined, limits: [], ...change };
  return safetyText(found, plain).replace(/\s+/g, " ");
}

describe("cautions", () => {
  it("name the public limit that reaches farthest, and how far", () => {
    const text = exposed({
      limits: [limit("near rule", 50, 2), limit("far rule", 10, 8.64), limit("mid rule", 20, 4)],
    });
    expect(text).toContain(
      "With 3 W at the antenna the strictest public limit known here (far rule, 10 W/m2)",
    );
    expect(text).toContain("out to about 8.7 m.");
  });

  it("do not measure the public by the limits of workers", () => {
    const worker = { ...limit("worker rule", 50, 99), audience: "occupational" } as const;
    const text = exposed({ limits: [limit("public rule", 10, 1), worker] });
    expect(text).toContain("(public rule, 10 W/m2)");
    expect(text).not.toContain("99 m");
  });

  it("still warn of the feed where no limit is reached in front of the dish", () => {
    const text = exposed({ powerW: 0.001, limits: [limit("rule", 10, 0)] });
    expect(text).toContain("With 1 mW at the antenna no public limit known here is reached on the axis");
    expect(text).toContain("at the feed itself it can be");
  });

  it("say so where no limit is known for the frequency", () => {
    expect(exposed({ limits: [] })).toContain("No published limit is at hand for this frequency.");
  });

  it("end every exposure sentence with who decides", () => {
    for (const limits of [[], [limit("rule", 10, 0)], [limit("rule", 10, 5)]]) {
      expect(exposed({ limits })).toContain(
        "An estimate for carrier all the time; local exposure rules decide.",
      );
    }
  });
});

describe("doubts", () => {
  it("stand one a paragraph, under a heading, each with its place", () => {
    const text = warningText(
      [
        { code: "a", where: "covers.film", message: "short" },
        {
          code: "b",
          where: "path",
          message: "and a doubt that is too long for one line of eighty columns, so it hangs",
        },
      ],
      plain,
    );
    expect(text).toBe(
      [
        "Warnings",
        "  - covers.film: short",
        "  - path: and a doubt that is too long for one line of eighty columns, so it",
        "    hangs",
      ].join("\n"),
    );
  });

  it("have no heading where there are none", () => {
    expect(warningText([], plain)).toBe("");
  });
});

describe("what is left out", () => {
  const inWeather = (rainMmPerH: number) =>
    leftOutText(prepare(scenarioOf({ weather: { now: weatherOf({ rainMmPerH: { value: rainMmPerH } }) } })));

  it("holds the hills and the fades in any weather", () => {
    expect(inWeather(0).replace(/\s+/g, " ")).toMatch(/hills, trees and buildings.*multipath fading/);
  });

  it("speaks of the statistics of rain only where it rains", () => {
    expect(inWeather(0)).not.toContain("statistics of rain");
    expect(inWeather(10).replace(/\s+/g, " ")).toContain("long-term statistics of rain");
  });
});
