import { describe, expect, it } from "vitest";
import { cell, columns, RULE } from "../../src/report/columns.ts";

const rowOf = (...texts: string[]) => texts.map((text) => cell(text));

describe("columns", () => {
  it("puts the first column to the left, the others to the right, two blanks between", () => {
    const text = columns([
      rowOf("cover", "dry", "shower"),
      RULE,
      rowOf("bare", "24.3", "9.1"),
      rowOf("x", "-0.4"),
    ]);
    expect(text).toBe(
      ["cover   dry  shower", "-------------------", "bare   24.3     9.1", "x      -0.4"].join("\n"),
    );
  });

  it("counts characters, so that a sign beyond ASCII or a pictograph is one wide", () => {
    expect(columns([rowOf("a", "±1"), rowOf("b", "𝛆12"), rowOf("é", "3")])).toBe("a   ±1\nb  𝛆12\né    3");
  });

  it("does not count colour", () => {
    const red = cell("bad", "\u001b[31mbad\u001b[39m");
    expect(columns([[cell("a"), red], rowOf("b", "fine")])).toBe("a   \u001b[31mbad\u001b[39m\nb  fine");
  });

  it("sets a cell that covers two columns flush with the second", () => {
    const text = columns([
      [cell(""), { text: "dry", across: 2 }, cell(""), { text: "wet", across: 2 }, cell("")],
      rowOf("", "dB", "dBm", "dB", "dBm"),
      rowOf("free space", "-154.6", "-127.9", "-154.6", "-128.4"),
    ]);
    expect(text).toBe(
      [
        "                       dry             wet",
        "                dB     dBm      dB     dBm",
        "free space  -154.6  -127.9  -154.6  -128.4",
      ].join("\n"),
    );
  });

  it("widens the columns below a wide name, and keeps the others in line", () => {
    const text = columns([
      [cell(""), { text: "drizzle at the cliff", across: 2 }, cell(""), cell("dry")],
      rowOf("", "dB", "dBm", "dBm"),
      RULE,
      rowOf("line", "-0.2", "9.8", "9.8"),
    ]);
    expect(text).toBe(
      [
        "      drizzle at the cliff  dry",
        "        dB             dBm  dBm",
        "-------------------------------",
        "line  -0.2             9.8  9.8",
      ].join("\n"),
    );
  });

  it("leaves no blanks at the end of a line", () => {
    expect(columns([rowOf("a", ""), rowOf("long one", "1")])).toBe("a\nlong one  1");
  });
});
