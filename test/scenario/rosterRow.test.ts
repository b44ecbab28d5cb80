import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { separatorOf } from "../../src/scenario/csvText.ts";
import { type RosterKind, readRosterHeader } from "../../src/scenario/rosterColumns.ts";
import { cellsOf, columnAt, type ReadStation, rowReader } from "../../src/scenario/rosterRow.ts";

/** Reads one row under a header, line 7. */
function read(header: string, row: string): ReadStation {
  const separator = separatorOf(header);
  const { columns, faults } = readRosterHeader(cellsOf(header, separator), "stations");
  expect(faults).toEqual([]);
  const form = { columns, separator, dishes: ["tripod", "big"], modes: ["cw", "ssb", "fm"] };
  return rowReader(form)(row, 7);
}

const PLAIN = "name,locator,latitude,longitude,ground,height,power,dish,noise figure,mode,note";

function stationOf(header: string, row: string) {
  const { station, faults } = read(header, row);
  if (station === undefined) throw new Error(JSON.stringify(faults));
  return station;
}

describe("the header of a roster", () => {
  const headed = (text: string, kind: RosterKind = "stations") => readRosterHeader(text.split(","), kind);

  it("may have its columns in any order, by the names that people use", () => {
    const { columns, faults } = headed("Mode,Antenna_Height,Lat,LON,Station,Noise-Figure,asl,Comments");
    expect(faults).toEqual([]);
    const cells = Object.entries(columns).map(([name, { cell }]) => [name, cell]);
    expect(Object.fromEntries(cells)).toEqual({
      mode: 0,
      height: 1,
      latitude: 2,
      longitude: 3,
      name: 4,
      "noise figure": 5,
      ground: 6,
      note: 7,
    });
  });

  it.each([
    ["ground m", "ground", "m"],
    ["Height (ft)", "height", "ft"],
    ["power [W]", "power", "W"],
    ["dish_cm", "dish", "cm"],
    ["nf/dB", "noise figure", "dB"],
  ] as const)("may name a unit: %s", (text, column, unit) => {
    expect(headed(`name,locator,${text}`).columns[column]).toEqual({ cell: 2, unit });
  });

  it.each([
    ["A,IO84aa", /^no header: the first row reads "A,IO84aa", expected columns name, locator/],
    ["name,locatr", /^unknown column "locatr", .*did you mean locator/],
    ["name,locator,name", /^the column name twice/],
    ["locator,power", /^no column name/],
    ["name,latitude", /^no column locator, nor latitude and longitude/],
  ])("%s is refused", (text, message) => {
    expect(headed(text).faults.map((fault) => fault.message)).toEqual([expect.stringMatching(message)]);
  });

  it("may hold columns of a list's own, which are passed over", () => {
    const { columns, passedOver, faults } = headed("No.,name,E-mail,locator,Joined,");
    expect(faults).toEqual([]);
    expect(passedOver).toEqual(["No.", "E-mail", "Joined"]);
    expect(columns).toEqual({ name: { cell: 1, unit: "" }, locator: { cell: 3, unit: "" } });
  });

  it("of own sites knows no dish", () => {
    expect(headed("name,locator,ground", "sites").faults).toEqual([]);
    expect(headed("name,locator,dish", "sites").faults).toHaveLength(1);
  });
});

describe("a row of a roster", () => {
  it("is a station in canonical units", () => {
    const row = 'Plover Edge,,53.5 N,1.9 W,100 ft,3 m,2 W +/- 0.3 dB,60 cm,1.2 dB,SSB,"on foot, no car"';
    const station = stationOf(PLAIN, row);
    expect(station).toMatchObject({
      line: 7,
      name: "Plover Edge",
      latitude: 53.5,
      longitude: -1.9,
      positionErrorKm: 0,
      heightM: 3,
      dish: { diameterM: 0.6 },
      noiseFigureDb: { value: 1.2 },
      mode: "ssb",
    });
    expect(station.groundM).toBeCloseTo(30.48, 9);
    expect(station.powerDbm).toEqual({ value: expect.closeTo(33.0103, 4), sigma: 0.3 });
  });

  it("leaves out what it does not say", () => {
    expect(stationOf(PLAIN, "A,IO84aa")).toMatchObject({
      groundM: undefined,
      heightM: undefined,
      powerDbm: undefined,
      dish: undefined,
      mode: undefined,
    });
  });

  it.each([4, 6, 8, 10])("takes a locator of %d characters, which leaves it uncertain", (length) => {
    const locator = "IO84wb20ax".slice(0, length);
    const station = stationOf(PLAIN, `A,${locator}`);
    expect(station.locator).toBe(locator);
    // A square of four characters is 2 by 1 deg, and each pair makes 24 or 10 parts of it.
    const halfHeightKm = 111.3 / 2 / ([1, 24, 240, 5760][length / 2 - 2] ?? 0);
    expect(station.positionErrorKm).toBeGreaterThan(halfHeightKm);
    expect(station.positionErrorKm).toBeLessThan(2 * halfHeightKm);
  });

  it("takes coordinates in place of the square that holds them", () => {
    const station = stationOf(PLAIN, "A,IO84wb,54.06,-2.13");
    expect(station).toMatchObject({
      latitude: 54.06,
      longitude: -2.13,
      positionErrorKm: 0,
      locator: "IO84wb",
    });
  });

  it("reads decimal commas beside semicolons, and units from the header", () => {
    const station = stationOf("name;lat;lon;ground m;power W", "A;53,5;-1,9;412,5;1,5");
    expect(station).toMatchObject({ latitude: 53.5, longitude: -1.9, groundM: 412.5 });
    expect(station.powerDbm!.value).toBeCloseTo(31.7609, 4);
  });

  it.each([
    ["TRIPOD", { name: "tripod" }],
    ["1.2 m", { diameterM: 1.2 }],
    ["34 dBi", { gainDbi: { value: 34 } }],
  ])("takes the dish %s", (dish, wanted) => {
    expect(stationOf("name,locator,dish", `A,IO84aa,${dish}`).dish).toMatchObject(wanted);
  });

  it.each([
    ["A,IO84aa,,,412", 12, /^ground: read "412", expected a length with a unit.*"ground m"/],
    ["A,IO8", 3, /^locator: read "IO8", expected 4 to 10 characters/],
    ["A,ZZ84aa", 3, /^locator: .*"Z", must be a letter from A to R/],
    ["A", 2, /^locator: missing, expected a locator, or latitude and longitude/],
    ["A,,,3", 4, /^latitude: missing beside the longitude/],
    ["A,,95,3", 4, /^latitude: read "95"/],
    ["A,IO84wb,20,20", 3, /^locator: "IO84wb" is not the square of the latitude and longitude/],
    [",IO84aa", 1, /^name: read an empty text/],
    ["A,IO84aa,,,,,,tripd", 15, /^dish: read "tripd", expected tripod, big, .*did you mean tripod/],
    ["A,IO84aa,,,,,,,,cww", 17, /^mode: no mode "cww", expected cw, ssb, fm \(did you mean cw/],
    ["A,IO84aa,,,9999 m", 12, /^ground: .*from -450 to 9000 m/],
    ["A,IO84aa,,,,,0 W", 14, /^power: /],
    ['"A,IO84aa', 1, /^a quote that is opened and not closed/],
    ['"A, the hill",IO84aa,,,5', 24, /^ground: /],
    ["A,IO84aa,1,2,3,4,5,6,7,8,9,10", 28, /^12 cells under 11 headings/],
    ["\ufffd,IO84aa", 1, /^is no text in UTF-8/],
    [`A,${"I".repeat(3000)}`, 1, /^a row longer than 2000 characters/],
  ])("%s is told with its place", (row, column, message) => {
    const { faults } = read(PLAIN, row);
    expect(faults?.[0]).toEqual({ line: 7, column, message: expect.stringMatching(message) });
  });

  it("tells all its faults at once", () => {
    const { faults } = read(PLAIN, "A,IO84aa,,,412,9 bananas,,,,cww");
    expect(faults).toHaveLength(3);
  });

  it("never throws, whatever it reads", () => {
    const anyText = fc.string({ unit: "binary", maxLength: 60 });
    fc.assert(
      fc.property(
        fc.oneof(
          anyText,
          fc.array(anyText, { maxLength: 12 }).map((cells) => cells.join(",")),
        ),
        (row) => {
          const { station, faults } = read(PLAIN, row);
          expect((station === undefined) === (faults !== undefined && faults.length > 0)).toBe(true);
          for (const { message } of faults ?? []) expect(message).not.toMatch(/\p{Cc}/u);
        },
      ),
    );
  });
});

describe("the place of a cell", () => {
  it.each([
    ["a,b,c", 0, 1],
    ["a,b,c", 2, 5],
    ["a, b,c", 1, 4],
    ['"a,b",c', 1, 7],
    ["a", 3, 2],
  ])("%s, cell %d", (line, cell, column) => {
    expect(columnAt(line, ",", cell)).toBe(column);
  });
});
