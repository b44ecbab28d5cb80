import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { openTerrain } from "../../../src/scenario/terrain/openTerrain.ts";
import { readProfile } from "../../../src/scenario/terrain/profileCsv.ts";
import { temporaryFolder } from "../../cli/run.ts";

const folder = temporaryFolder();

function read(text: string) {
  const file = join(folder, "profile.csv");
  writeFileSync(file, text);
  return readProfile(file, "profile.csv");
}

/** Line and message of each fault. */
function faults(text: string): string[] {
  return read(text).faults?.map(({ line, message }) => `${line}: ${message}`) ?? [];
}

describe("a profile from CSV", () => {
  it("reads distance, height, cover and zone", () => {
    const text =
      "# ridge\ndistance (km),height (m),cover (m),zone\n0,10,0,coastal\n1.5,90,12,inland\n2,5,0,Sea\n";
    expect(read(text).profile).toEqual({
      distancesKm: [0, 1.5, 2],
      heightsM: [10, 90, 5],
      coverM: [0, 12, 0],
      zones: ["coastal", "inland", "sea"],
    });
  });

  // International yard and pound, 1959: a mile is 1609.344 m, a foot 0.3048 m.
  it.each([
    ["miles and feet", "dist_mi,elevation_ft\n0,100\n1,200\n2,300\n", 1.609344, 60.96],
    [
      "metres in another order",
      "height m,distance m\n30.48,0\n60.96,1609.344\n91.44,3218.688\n",
      1.609344,
      60.96,
    ],
    [
      "semicolons, decimal commas, CRLF",
      "distance km;height m\r\n0;30,48\r\n1,609344;60,96\r\n3;0\r\n",
      1.609344,
      60.96,
    ],
    [
      "brackets, tabs, a byte-order mark",
      "\ufeffDistance [km]\tGround [m]\n0\t1\n1.609344\t60.96\n3\t2\n",
      1.609344,
      60.96,
    ],
  ])("reads %s", (_, text, km, heightM) => {
    const { profile } = read(text);
    expect(profile?.distancesKm[1]).toBeCloseTo(km, 9);
    expect(profile?.heightsM[1]).toBeCloseTo(heightM, 9);
  });

  it("puts a point on the straight line between two", () => {
    expect(read("distance km,height m\n0,10\n4,30\n").profile).toEqual({
      distancesKm: [0, 2, 4],
      heightsM: [10, 20, 30],
    });
  });

  it("tells every fault with its line", () => {
    const text =
      "# made by hand\ndistance km,height m,cover m,zone\n0.5,10,0,inland\n\n1,99999,0,inland\n1,20,-3,lake\nx,,0,sea\n";
    expect(faults(text)).toEqual([
      "3: starts at 0.5 km, expected 0, below the transmitter",
      '5: height: read "99999", expected -500 to 9000 m',
      "6: distance 1 km after 1 km, expected distances that rise from row to row",
      '6: cover: read "-3", expected 0 to 500 m',
      '6: zone: read "lake", expected inland, coastal, sea',
      '7: distance: read "x", expected 0 to 10000 km',
      "7: height: read nothing, expected -500 to 9000 m",
    ]);
  });

  it.each([
    ["distance km,height m\n0,1\n", "2: profile of 1 point, expected 2 or more"],
    ["distance km,height m\n", "1: profile of no points, expected 2 or more"],
    [
      "",
      "1: the file is empty, expected columns distance (km), height (m) and, where known, cover (m) and zone",
    ],
    [
      "distance,height m\n0,1\n1,2\n",
      '1: no unit in the column "distance", expected one such as distance (m)',
    ],
    [
      "distance km,height GHz\n0,1\n1,2\n",
      '1: the unit "ghz" of the column height, expected km, m, mi or ft',
    ],
    [
      "distance km\n0\n1\n",
      "1: no column height, expected columns distance (km), height (m) and, where known, cover (m) and zone",
    ],
  ])("refuses %j", (text, fault) => {
    expect(faults(text)).toEqual([fault]);
  });

  it("names the column that was meant", () => {
    expect(faults("distnce km,height m\n0,1\n1,2\n")[0]).toMatch(
      /^1: unknown column "distnce km".*did you mean distance\?/,
    );
  });

  it("refuses what is no text", () => {
    const file = join(folder, "picture.csv");
    writeFileSync(file, Buffer.from([0x89, 0xff, 0xfe, 0x00]));
    expect(readProfile(file, "picture.csv").faults).toMatchObject([
      { code: "not_text", file: "picture.csv" },
    ]);
  });
});

describe("the ends of a profile", () => {
  // One degree of longitude at the equator is 111.3195 km on WGS84 (a pi / 180 with a = 6378.137 km).
  const from = { latitude: 0, longitude: 0 };
  const to = { latitude: 0, longitude: 1 };
  const opened = async (lastKm: number) => {
    writeFileSync(join(folder, "long.csv"), `distance km,height m\n0,1\n50,2\n${lastKm},3\n`);
    const terrain = await openTerrain("long.csv", folder);
    if (!terrain.ok) throw new Error("not opened");
    return terrain;
  };

  it("are taken within one per cent of the path", async () => {
    expect(await (await opened(112.4)).profileBetween(from, to)).toMatchObject({ ok: true });
    expect(await (await opened(112.5)).profileBetween(from, to)).toEqual({
      ok: false,
      faults: [
        {
          code: "wrong_length",
          file: "long.csv",
          message: "profile ends at 112.50 km, expected 111.32 km, the length of the path, within 1.11 km",
        },
      ],
    });
  });

  it("may be off by what the positions leave open", async () => {
    const wide = await opened(115);
    expect(await wide.profileBetween(from, to)).toMatchObject({ ok: false });
    expect(await wide.profileBetween({ ...from, positionErrorKm: 4 }, to)).toMatchObject({ ok: true });
  });
});
