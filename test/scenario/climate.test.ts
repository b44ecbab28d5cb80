import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, describe, expect, it } from "vitest";
import { faultsOf, sample, scenarioOf } from "./sample.ts";

const folder = mkdtempSync(join(tmpdir(), "oilskin-climate-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const withClimate = (climate: string) => `${sample}climate: ${climate}\n`;
const climateOf = async (climate: string) => (await scenarioOf(withClimate(climate))).climate;
/** Line and column of the climate's own line, which is the sample's last. */
const LINE = sample.split("\n").length;
const faultIn = async (climate: string) => {
  const faults = await faultsOf(withClimate(climate));
  expect(faults).toHaveLength(1);
  const [{ line, column, message }] = faults as [(typeof faults)[number]];
  expect(line).toBe(LINE);
  return {
    text: withClimate(climate)
      .split("\n")
      [line - 1]!.slice(column - 1),
    message,
  };
};

const rainfall = "[53 mm, 41 mm, 46 mm, 43 mm, 50 mm, 58 mm, 56 mm, 61 mm, 57 mm, 66 mm, 64 mm, 60 mm]";
const degrees = [4, 4, 6, 9, 12, 15, 17, 17, 15, 11, 7, 5];
const temperature = `[${degrees.map((value) => `${value} degC`).join(", ")}]`;

describe("the climate of a scenario", () => {
  it("is not needed", async () => {
    expect((await scenarioOf(sample)).climate).toBeUndefined();
  });

  it("has its rain by rate, zone or months", async () => {
    expect((await climateOf("{ rain_rate: 1 in/h }"))!.rain).toEqual({
      kind: "rate",
      rainRate001MmPerH: 25.4,
    });
    expect((await climateOf("{ rain_zone: K }"))!.rain).toEqual({ kind: "zone", zone: "K" });
    const { rain } = (await climateOf(
      `{ monthly: { rainfall: ${rainfall}, temperature: ${temperature} } }`,
    ))!;
    expect(rain).toMatchObject({ kind: "monthly", monthlyTemperatureC: degrees });
    expect(rain).toHaveProperty("monthlyRainfallMm.2", 46);
  });

  it("may know the air, the ground and the rain height", async () => {
    expect(
      await climateOf("{ rain_rate: 30 mm/h, dN1: -350 N/km, terrain_roughness: 40 m, rain_height: 2.1 km }"),
    ).toMatchObject({ dN1: -350, terrainRoughnessM: 40, meanRainHeightM: 2100 });
    // P.839-4: the rain height lies 360 m over the isotherm.
    expect(
      await climateOf("{ rain_rate: 30 mm/h, dN1: -1.5e2, isotherm: 2395 m }".replace("-1.5e2", "−150")),
    ).toMatchObject({ dN1: -150, meanRainHeightM: 2755 });
  });

  it.each<[climate: string, at: string, message: RegExp]>([
    ["{ dN1: -200 N/km }", "climate", /missing rain_rate, rain_zone, monthly or map/],
    ["{ rain_rate: 30 mm/h, rain_zone: K }", "climate", /more than one of rain_rate, .*; write one/],
    ["{ rain_rate: 30 }", "30 }", /read "30".*bare number; write 30 mm\/h/],
    ["{ rain_rate: 3000 mm/h }", "3000", /from 0 to 400 mm\/h/],
    ["{ rain_zone: I }", "I }", /read "I", expected a rain climatic zone.*A, B, C, D, E, F, G, H, J, K/],
    ["{ rain_zone: K, rian_height: 2 km }", "rian_height", /unknown key.*did you mean rain_height\?/],
    ["{ rain_zone: K, dN1: steep }", "steep", /read "steep", expected a refractivity gradient/],
    ["{ rain_zone: K, dN1: -200 N/m }", "-200", /read "-200 N\/m", expected a refractivity gradient/],
    ["{ rain_zone: K, dN1: 900 }", "900", /from -2000 to 500 N\/km/],
    ["{ rain_zone: K, isotherm: 2 km, rain_height: 2 km }", "climate", /both isotherm and rain_height/],
    [
      `{ monthly: { rainfall: [1 mm, 2 mm], temperature: ${temperature} } }`,
      "rainfall",
      /a list of 2, expected twelve/,
    ],
    [`{ monthly: { rainfall: ${rainfall} } }`, "monthly", /missing key "temperature", expected twelve/],
    [
      `{ monthly: { rainfall: ${rainfall}, temperature: ${temperature.replace("17 degC", "17")} } }`,
      "17,",
      /read "17"/,
    ],
    [
      `{ monthly: { rainfall: ${rainfall.replace("53", "-53")}, temperature: ${temperature} } }`,
      "-53",
      /from 0 to 3000/,
    ],
    ["30 mm/h", "30", /expected the climate/],
  ])("refuses %s at its place", async (climate, at, message) => {
    const fault = await faultIn(climate);
    expect(fault.text.startsWith(at), fault.text).toBe(true);
    expect(fault.message).toMatch(message);
  });
});

/** An invented map of 3 by 4 points, a quarter of a degree apart; half-way along the sample's path lies inside. */
const map = {
  "R001.TXT": "20 21 22 23\n24 25 26 27\n28 29 30 31\n",
  "LAT_R001.TXT": "53.75 53.75 53.75 53.75\n54 54 54 54\n54.25 54.25 54.25 54.25\n",
  "LON_R001.TXT": "-3.5 -3.25 -3 -2.75\n-3.5 -3.25 -3 -2.75\n-3.5 -3.25 -3 -2.75\n",
};
let count = 0;

function mapFolder(files: Readonly<Record<string, string>>): string {
  const path = join(folder, `map${++count}`);
  mkdirSync(path);
  for (const [name, text] of Object.entries(files)) writeFileSync(join(path, name), text);
  return path;
}

async function rateOf(
  files: Readonly<Record<string, string>>,
  change = (text: string) => text,
): Promise<number> {
  const { climate } = await scenarioOf(change(withClimate(`{ map: ${mapFolder(files)} }`)));
  if (climate?.rain.kind !== "map") throw new Error("no map");
  return climate.rain.rainRate001MmPerH!;
}

/** Both ends put on a parallel, or a meridian, about the wanted middle. */
function about(latitude: number, longitude: number) {
  return (text: string) =>
    text
      .replace("locator: IO83jd07", `latitude: ${latitude - 0.1}, longitude: ${longitude}`)
      .replace("latitude: 54.27, longitude: 3.30 W", `latitude: ${latitude + 0.1}, longitude: ${longitude}`);
}

describe("a rain map in ITU's layout", () => {
  it("is read half-way along the path", async () => {
    // Down: 4 a row of 0.25 deg, along: 1 a column of 0.25 deg. By hand: 20 + 4 x 0.6 + 1 x 1.2.
    expect(await rateOf(map, about(53.9, -3.2))).toBeCloseTo(23.6, 3);
  });

  it("takes rows from north to south, a turn of 360 deg, small letters and a prefix, and any blanks", async () => {
    const backwards = Object.fromEntries(
      Object.entries(map).map(([name, text]) => [name, `${text.trim().split("\n").reverse().join("\n")}\n`]),
    ) as typeof map;
    expect(await rateOf(backwards, about(53.9, -3.2))).toBeCloseTo(23.6, 3);
    const turned = map["LON_R001.TXT"].replace(/-[\d.]+/g, (text) => String(360 + Number(text)));
    expect(await rateOf({ ...map, "LON_R001.TXT": turned }, about(53.9, -3.2))).toBeCloseTo(23.6, 3);
    const renamed = Object.fromEntries(
      Object.entries(map).map(([name, text]) => [
        `v7_${name.toLowerCase()}`,
        ` ${text.replaceAll(" ", "\t  ").replaceAll("\n", " \r\n ")}\r\n\n`,
      ]),
    );
    expect(await rateOf(renamed, about(53.9, -3.2))).toBeCloseTo(23.6, 3);
  });

  it("is sought from the folder of the scenario", async () => {
    mapFolder(map);
    const file = join(folder, "near.yaml");
    writeFileSync(file, about(53.9, -3.2)(withClimate(`{ map: map${count} }`)));
    expect((await scenarioOf(file)).climate!.rain).toHaveProperty("folder", `map${count}`);
  });

  const { "R001.TXT": rates, "LAT_R001.TXT": lat, "LON_R001.TXT": lon } = map;
  it.each<[why: string, files: Readonly<Record<string, string>>, message: RegExp]>([
    ["without the map", { "LAT_R001.TXT": lat }, /holds no R001\.TXT/],
    [
      "with half of the positions",
      { "R001.TXT": rates, "LON_R001.TXT": lon },
      /LON_R001\.TXT and no LAT_R001\.TXT/,
    ],
    [
      "of another size than the whole Earth, without positions",
      { "R001.TXT": rates },
      /R001\.TXT has 3 rows, expected 1441/,
    ],
    ["cut short", { ...map, "R001.TXT": rates.slice(0, 30) }, /R001\.TXT:3: has 2 columns, expected 4/],
    ["short of a row", { ...map, "R001.TXT": rates.slice(0, 24) }, /R001\.TXT has 2 rows, expected 3/],
    [
      "with a row that lacks a point",
      { ...map, "R001.TXT": rates.replace("25 ", "") },
      /R001\.TXT:2: has 3 columns/,
    ],
    [
      "with a word",
      { ...map, "R001.TXT": rates.replace("25", "no") },
      /R001\.TXT:2: holds more than numbers/,
    ],
    [
      "of no rain rates",
      { ...map, "R001.TXT": rates.replace("25", "-999") },
      /R001\.TXT:2: read -999 in column 2/,
    ],
    ["of another place", { ...map, "LAT_R001.TXT": lat.replaceAll("5", "1") }, /lies beyond the map/],
    [
      "of one position",
      { ...map, "LON_R001.TXT": lon.replace(/-[\d.]+/g, "-3") },
      /same position at both edges/,
    ],
    ["of nothing", { ...map, "R001.TXT": "\n" }, /R001\.TXT is empty/],
  ])("%s is refused at its place in the scenario", async (_, files, message) => {
    const path = mapFolder(files);
    const faults = await faultsOf(about(53.9, -3.2)(withClimate(`{ map: ${path} }`)));
    expect(faults).toHaveLength(1);
    expect(faults[0]).toMatchObject({ line: LINE, column: "climate: { map: ".length + 1, code: "bad_map" });
    expect(faults[0]!.message).toMatch(message);
  });

  it.each([
    ["nowhere", /no folder ".*nowhere"/],
    ["a file", /is no folder/],
  ])("%s is refused", async (name, message) => {
    writeFileSync(join(folder, "a file"), "");
    expect((await faultIn(`{ map: "${join(folder, name)}" }`)).message).toMatch(message);
  });
});
