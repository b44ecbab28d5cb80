import { existsSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { materials } from "../../src/cover/materials.ts";
import { demo, oilskin, root, scenarioFile, scenarioNames, shell, widest } from "./run.ts";

const commands = [
  ...["budget", "covers", "spread", "weather", "compare", "thickness", "check", "new", "materials", "schema"],
];
const { version } = JSON.parse(readFileSync(join(root, "package.json"), "utf8")) as { version: string };
const ESCAPE = "\u001b";

describe("help and version", () => {
  it("--version prints the version of the package", () => {
    expect(oilskin(["--version"])).toEqual({ status: 0, stdout: `${version}\n`, stderr: "" });
  });

  it("--help lists every command within 80 columns", () => {
    const { status, stdout, stderr } = oilskin(["--help"]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    for (const command of commands) expect(stdout).toMatch(new RegExp(`^  ${command} `, "m"));
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });

  it.each(commands)("%s --help says how it is called", (command) => {
    const { status, stdout, stderr } = oilskin([command, "--help"]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    expect(stdout).toMatch(new RegExp(`^Usage: oilskin ${command} `));
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });

  it("without a command the help goes to stderr, and the status is that of a slip", () => {
    const { status, stdout, stderr } = oilskin([]);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain("Usage: oilskin");
  });
});

describe("a slip on the command line", () => {
  it.each([
    ["an unknown command", ["budgt", demo], "Did you mean budget?"],
    ["an unknown option", ["budget", demo, "--jsn"], "Did you mean --json?"],
    ["an option like none", ["budget", demo, "--xyzzy"], "oilskin budget --help"],
    ["a command like none", ["xyzzy"], "oilskin --help"],
    ["a missing file name", ["budget"], "missing required argument 'file'"],
    ["a file name too many", ["budget", demo, demo], "too many arguments"],
    ["an option without its value", ["budget", demo, "--cover"], "argument missing"],
    ["two forms at once", ["budget", demo, "--json", "--csv"], "cannot be used with"],
    ["data with detail", ["budget", demo, "--json", "--detail"], "cannot be used with"],
  ])("%s ends with 2 and a hint, and prints no report", (_, args, hint) => {
    const { status, stdout, stderr } = oilskin(args);
    expect({ status, stdout }).toEqual({ status: 2, stdout: "" });
    expect(stderr).toContain(hint);
    expect(stderr).not.toMatch(/^ +at /m);
  });
});

describe("covers, materials and schema", () => {
  it("materials lists names, figures and sources within 80 columns", () => {
    const { status, stdout, stderr } = oilskin(["materials"]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    expect(widest(stdout)).toBeLessThanOrEqual(80);
    expect(stdout).toMatch(/^FEP film +2\.05 \(2\.01-2\.1\) +0\.0008 /m);
    expect(stdout).toMatch(/^polycarbonate +2\.77 /m);
  });

  it.each(scenarioNames)("covers judges those of %s within 80 columns", (name) => {
    const { status, stdout, stderr } = oilskin(["covers", scenarioFile(name)]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    expect(widest(stdout)).toBeLessThanOrEqual(80);
  });

  it("materials says of each where its figures are from", () => {
    const text = oilskin(["materials"]).stdout.replace(/\s+/g, " ");
    expect(materials.length).toBeGreaterThan(30);
    for (const { name, source, confidence } of materials) {
      expect(text, name).toContain(` ${name}: `);
      expect(text, name).toContain(`${source} (${confidence})`);
    }
  });

  it("schema prints the JSON Schema that lies beside the scenarios", () => {
    const { status, stdout, stderr } = oilskin(["schema"]);
    expect({ status, stderr }).toEqual({ status: 0, stderr: "" });
    const stored = join(root, "scenarios/oilskin.schema.json");
    expect(existsSync(stored)).toBe(true);
    expect(JSON.parse(stdout)).toEqual(JSON.parse(readFileSync(stored, "utf8")));
  });

  it("the schema knows every key of the demos", () => {
    const { properties } = JSON.parse(oilskin(["schema"]).stdout) as { properties: object };
    for (const name of scenarioNames) {
      const keys = [...readFileSync(scenarioFile(name), "utf8").matchAll(/^([a-z_]+):/gm)].map(
        (match) => match[1]!,
      );
      expect(Object.keys(properties)).toEqual(expect.arrayContaining(keys));
    }
  });
});

describe("where the output goes", () => {
  it("a reader that stops early is no fault", () => {
    const { status, stdout, stderr } = shell(
      `set -o pipefail; "$NODE" "$OILSKIN" budget '${demo}' --json | head -c 1`,
    );
    expect({ status, stdout, stderr }).toEqual({ status: 0, stdout: "{", stderr: "" });
  });

  it.skipIf(!existsSync("/dev/full"))("a full disk is told in one line", () => {
    const { status, stderr } = shell(`"$NODE" "$OILSKIN" budget '${demo}' > /dev/full`);
    expect({ status, stderr }).toEqual({ status: 2, stderr: "the output cannot be written (ENOSPC)\n" });
  });

  it("a pipe gets no colour", () => {
    expect(oilskin(["budget", demo]).stdout).not.toContain(ESCAPE);
    expect(oilskin(["budget", demo], { environment: { TERM: "xterm-256color" } }).stdout).not.toContain(
      ESCAPE,
    );
  });
});

// `script` of util-linux gives a program a terminal.
describe.skipIf(shell("script --version").status !== 0)(
  "on a terminal (skipped where there is no `script`)",
  () => {
    const onTerminal = (environment: Readonly<Record<string, string>>) =>
      shell(`script -qec '"$NODE" "$OILSKIN" budget ${demo}' /dev/null`, { TERM: "xterm", ...environment })
        .stdout;
    const piped = oilskin(["budget", demo]).stdout;
    const withoutColour = (text: string) =>
      text.replaceAll("\r\n", "\n").replaceAll(new RegExp(`${ESCAPE}\\[\\d+m`, "g"), "");

    it("verdicts are coloured, and headings bold", () => {
      const text = onTerminal({});
      expect(text).toContain(`${ESCAPE}[32mcloses${ESCAPE}[39m`);
      expect(text).toContain(`${ESCAPE}[33mthin  ${ESCAPE}[39m`);
      expect(text).toContain(`${ESCAPE}[1mHeron Scar to Gannet Fell${ESCAPE}[22m`);
    });

    it("colour adds no word and moves nothing", () => {
      expect(withoutColour(onTerminal({})).replace(/ +\n/g, "\n")).toBe(piped);
    });

    it("NO_COLOR and a dumb terminal get none", () => {
      expect(onTerminal({ NO_COLOR: "1" })).not.toContain(ESCAPE);
      expect(onTerminal({ TERM: "dumb" })).not.toContain(ESCAPE);
    });

    it("an empty NO_COLOR does not count, as its authors ask (no-color.org)", () => {
      expect(onTerminal({ NO_COLOR: "" })).toContain(ESCAPE);
    });
  },
);

describe("no promise that someone could be hurt by", () => {
  const claim = /\bsafe(ly)?\b/i;

  it("is in any output", () => {
    const runs = [
      ["--help"],
      ["materials"],
      ["schema"],
      ...commands.map((command) => [command, "--help"]),
      ...scenarioNames.flatMap((name) => [
        ["budget", scenarioFile(name), "--detail"],
        ["budget", scenarioFile(name), "--json"],
        ["budget", scenarioFile(name), "--csv"],
        ["covers", scenarioFile(name)],
        ["check", scenarioFile(name)],
      ]),
    ];
    for (const args of runs) {
      const { stdout, stderr } = oilskin(args);
      expect(stdout.length, args.join(" ")).toBeGreaterThan(0);
      expect(stdout + stderr, args.join(" ")).not.toMatch(claim);
    }
  });

  it("is in the sources", () => {
    const files = readdirSync(join(root, "src"), { recursive: true, encoding: "utf8" }).filter((file) =>
      file.endsWith(".ts"),
    );
    expect(files.length).toBeGreaterThan(100);
    expect(files.filter((file) => claim.test(readFileSync(join(root, "src", file), "utf8")))).toEqual([]);
  });
});
