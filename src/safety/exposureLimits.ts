import { requirePositive } from "../numeric/check.ts";

/** A published limit of power density at one frequency. */
export interface ExposureLimit {
  readonly name: string;
  /** `public` also stands for uncontrolled, `occupational` for controlled surroundings. */
  readonly audience: "public" | "occupational";
  readonly limitWPerM2: number;
  /** Time over which the density is averaged [min]. */
  readonly averagingMinutes: number;
  readonly source: string;
}

/** Limit [W/m2] and averaging time [min] as functions of the frequency [GHz]. */
interface Level {
  readonly limit: (frequencyGHz: number) => number;
  readonly minutes: (frequencyGHz: number) => number;
}

interface Rule {
  readonly name: string;
  readonly source: string;
  /** Frequencies that the rule covers [GHz]. */
  readonly fromGHz: number;
  readonly toGHz: number;
  readonly public?: Level;
  readonly occupational: Level;
}

const level = (limitWPerM2: number, averagingMinutes: number): Level => ({
  limit: () => limitWPerM2,
  minutes: () => averagingMinutes,
});

/** Limit for a few square centimetres of the body, falling with frequency; averaged over 6 minutes. */
const local = (at1GHz: number): Level => ({ limit: (f) => at1GHz / f ** 0.177, minutes: () => 6 });

const rules: readonly Rule[] = [
  {
    name: "ICNIRP 2020 local",
    source: "ICNIRP 2020, Health Physics 118(5), 483-524, local reference levels above 6 GHz",
    fromGHz: 6,
    toGHz: 300,
    public: local(55),
    occupational: local(275),
  },
  {
    name: "ICNIRP 2020 whole body",
    source: "ICNIRP 2020, Health Physics 118(5), 483-524, whole-body reference levels (from memory)",
    fromGHz: 2,
    toGHz: 300,
    public: level(10, 30),
    occupational: level(50, 30),
  },
  {
    name: "FCC 1.1310",
    source: "47 CFR 1.1310 Table 1: 1.0 mW/cm2 uncontrolled, 5 mW/cm2 controlled",
    fromGHz: 1.5,
    toGHz: 100,
    public: level(10, 30),
    occupational: level(50, 6),
  },
  {
    name: "IEEE C95.1-2019 local",
    source: "IEEE C95.1-2019 (third digit from memory)",
    fromGHz: 6,
    toGHz: 300,
    public: local(55),
    occupational: local(274.8),
  },
  {
    name: "IEEE C95.1-2019 whole body",
    source: "IEEE C95.1-2019 (from memory)",
    fromGHz: 6,
    toGHz: 300,
    public: level(10, 30),
    occupational: level(50, 30),
  },
  {
    name: "Directive 2013/35/EU",
    source: "Directive 2013/35/EU, as put into Norwegian regulation 14-6",
    fromGHz: 6,
    toGHz: 300,
    occupational: { limit: () => 50, minutes: (f) => (f <= 10 ? 6 : 68 / f ** 1.05) },
  },
];

/**
 * Published limits of power density that apply at a frequency, for the public and for trained workers.
 *
 * Some countries are stricter. The smallest limit that applies where the station stands is the one to keep;
 * which one that is, local rules and a competent person decide.
 *
 * Source: named with each limit
 * Valid:  each rule within its own range of frequency; an empty list says that none is held for this one
 *
 * @param frequencyGHz  above 0
 */
export function exposureLimits({ frequencyGHz }: { frequencyGHz: number }): ExposureLimit[] {
  requirePositive("frequencyGHz", frequencyGHz);
  return rules
    .filter(({ fromGHz, toGHz }) => frequencyGHz >= fromGHz && frequencyGHz <= toGHz)
    .flatMap((rule) =>
      (["public", "occupational"] as const).flatMap((audience) => {
        const applied = rule[audience];
        if (applied === undefined) return [];
        return {
          name: rule.name,
          audience,
          limitWPerM2: applied.limit(frequencyGHz),
          averagingMinutes: applied.minutes(frequencyGHz),
          source: rule.source,
        };
      }),
    );
}
