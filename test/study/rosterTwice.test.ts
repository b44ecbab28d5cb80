import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { seenStations, stationKey } from "../../src/study/rosterTwice.ts";

const place = { latitude: 53.5, longitude: -1.9 };

describe("a station's key", () => {
  it("is the same for capitals and some metres", () => {
    const key = stationKey({ name: "Plover", ...place });
    expect(stationKey({ name: "PLOVER", latitude: 53.50002, longitude: -1.90002 })).toEqual(key);
  });

  it("is another for another name or place", () => {
    const key = stationKey({ name: "Plover", ...place });
    expect(stationKey({ name: "Plover/p", ...place })).not.toEqual(key);
    expect(stationKey({ name: "Plover", ...place, longitude: 1.9 })).not.toEqual(key);
    expect(stationKey({ name: "Plover", ...place, latitude: 53.501 })).not.toEqual(key);
  });

  it("is another for each of a hundred thousand stations that differ little", () => {
    const keys = new Set<string>();
    for (let i = 0; i < 100_000; i++) {
      keys.add(
        String(
          stationKey({ name: `S${i % 1000}`, latitude: 50 + Math.floor(i / 1000) / 1000, longitude: 0 }),
        ),
      );
    }
    expect(keys.size).toBe(100_000);
  });
});

describe("stations seen", () => {
  it("tell the line of the first, like a plain map of keys would", () => {
    const anyKey = fc.tuple(fc.integer({ min: 0, max: 3 }), fc.integer({ min: 0, max: 0xffffffff }));
    fc.assert(
      fc.property(fc.array(anyKey, { maxLength: 200 }), (keys) => {
        const seen = seenStations(4); // so that it grows
        const map = new Map<string, number>();
        for (const [i, key] of [...keys, ...keys].entries()) {
          const wanted = map.get(String(key));
          if (wanted === undefined) map.set(String(key), i + 1);
          expect(seen.firstLineOf(key, i + 1)).toBe(wanted);
        }
      }),
    );
  });
});
