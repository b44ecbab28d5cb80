import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { openRoster, type RosterLines, rosterLines } from "../../src/scenario/rosterFile.ts";
import { temporaryFolder } from "../cli/run.ts";

const folder = temporaryFolder();
let count = 0;

function fileOf(text: string | Buffer): string {
  const file = join(folder, `${count++}.csv`);
  writeFileSync(file, text);
  return file;
}

async function readAll(text: string | Buffer, atATime = 2): Promise<RosterLines[]> {
  const { roster, faults } = openRoster(fileOf(text), "stations");
  if (roster === undefined) throw new Error(JSON.stringify(faults));
  const found: RosterLines[] = [];
  for await (const rows of rosterLines(roster, atATime)) found.push(rows);
  return found;
}

const HEAD = "name,locator\n";

describe("the lines of a roster", () => {
  it("come a few at a time, each with its number", async () => {
    const found = await readAll(`# invented\n\n${HEAD}a\nb\nc`);
    expect(found.map(({ firstLine, lines }) => [firstLine, lines])).toEqual([
      [4, ["a", "b"]],
      [6, ["c"]],
    ]);
    expect(found.map(({ share }) => share)).toEqual([29 / 30, 1]); // of 30 bytes, the line behind not counted
  });

  it("begin below the line in which a spreadsheet names its separator", async () => {
    const found = await readAll("sep=;\r\nname;locator\r\na;IO84aa\r\n");
    expect(found).toEqual([expect.objectContaining({ firstLine: 3, lines: ["a;IO84aa"] })]);
  });

  it.each([
    ["\n", ""],
    ["\r\n", ""],
    ["\r", ""],
    ["\n", "\ufeff"],
  ])("end by %j, after %j", async (end, mark) => {
    const [rows] = await readAll(`${mark}name,locator${end}a${end}b${end}`);
    expect(rows).toMatchObject({ firstLine: 2, lines: ["a", "b"] });
  });

  it("are the same however the file falls into pieces", async () => {
    // Longer than a piece of 256 kB, and its ends of lines fall anywhere.
    const anyEnd = fc.constantFrom("\r\n", "\n", "\r");
    await fc.assert(
      fc.asyncProperty(fc.integer({ min: 0, max: 40 }), anyEnd, async (length, end) => {
        const lines = Array.from({ length: 9000 }, (_, i) => `${i}${"ä".repeat(length)}x`);
        const found = await readAll(`name,locator${end}${lines.join(end)}`, 1000);
        expect(found.flatMap((rows) => rows.lines)).toEqual(lines);
        expect(found.map(({ firstLine }) => firstLine)).toEqual(found.map((_, i) => 2 + 1000 * i));
      }),
      { numRuns: 8 },
    );
  });

  it("stop with a word where the file turns binary, and those before stand", async () => {
    const text = `${HEAD}${"a row\n".repeat(60_000)}`;
    const found = await readAll(Buffer.concat([Buffer.from(text), Buffer.from([0, 1])]), 500);
    expect(found.flatMap(({ lines }) => lines).length).toBeGreaterThan(40_000);
    expect(found.at(-1)!.fault).toMatchObject({ message: expect.stringContaining("binary"), column: 1 });
    expect(found.slice(0, -1).every(({ fault }) => fault === undefined)).toBe(true);
  });

  it("stop with a word at a line without end", async () => {
    const [last] = await readAll(`${HEAD}${"x".repeat(2_000_000)}`);
    expect(last!.fault).toMatchObject({ line: 2, message: expect.stringContaining("is this CSV?") });
  });

  it("may hold bytes that are no UTF-8, which cost no other line", async () => {
    const [rows] = await readAll(
      Buffer.concat([Buffer.from(`${HEAD}a\nb`), Buffer.from([0xff]), Buffer.from("\nc")]),
      9,
    );
    expect(rows!.lines).toEqual(["a", "b\ufffd", "c"]);
  });
});

describe("a roster that cannot be opened", () => {
  const faultOf = (path: string) => openRoster(path, "stations").faults?.[0];

  it.each([
    ["", "the file is empty"],
    ["# only words\n\n", "the file is empty"],
    ["A,IO84aa\n", "no header"],
    ["name\0", "binary"],
  ])("%j", (text, message) => {
    expect(faultOf(fileOf(text))).toMatchObject({ line: 1, message: expect.stringContaining(message) });
  });

  it("is a folder, or is not there", () => {
    mkdirSync(join(folder, "sub"));
    expect(faultOf(join(folder, "sub"))!.message).toContain("is a folder");
    expect(faultOf(join(folder, "none.csv"))!.message).toBe("no such file");
  });

  it("has its faults told with line and column", () => {
    expect(faultOf(fileOf("# words\nname,locator,hight\n"))).toMatchObject({
      line: 2,
      column: 14,
      message: expect.stringContaining("did you mean height"),
    });
  });
});
