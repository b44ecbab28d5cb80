import { execFileSync } from "node:child_process";
import { chmodSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { build } from "esbuild";
import { afterAll, describe, expect, it } from "vitest";
import { faultsOf, sample, scenarioOf, spoiled } from "./sample.ts";

const folder = mkdtempSync(join(tmpdir(), "oilskin-files-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function file(name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

const bytes = (text: string, encoding: BufferEncoding) => Buffer.from(text, encoding);

describe("a scenario in a file", () => {
  it.each<[what: string, name: string, content: string | Uint8Array]>([
    ["as its text", "plain.yaml", sample],
    ["under a name with blanks and letters of any tongue", "Höhe über 峠.yaml", sample],
    ["without a telling ending", "scenario", sample],
    ["with a byte-order mark", "marked.yaml", `\ufeff${sample}`],
    ["with line ends of Windows", "windows.yaml", sample.replaceAll("\n", "\r\n")],
  ])("is read %s", async (_, name, content) => {
    expect(await scenarioOf(file(name, content))).toEqual(await scenarioOf(sample));
  });

  it("is read through a symbolic link", async () => {
    const link = join(folder, "link.yaml");
    symlinkSync(file("target.yaml", sample), link);
    expect(await scenarioOf(link)).toEqual(await scenarioOf(sample));
  });

  it("has its faults told by place, as in a text", async () => {
    const path = file("bad.yaml", spoiled(["10.368 GHz", "10.368"]));
    expect(await faultsOf(path)).toMatchObject([{ code: "bad_value", line: 2, column: 12 }]);
  });

  it.each<[what: string, name: string, content: string | Uint8Array, code: string, word: string]>([
    ["an empty one", "empty.yaml", "", "empty", "empty"],
    ["an empty one with a byte-order mark", "mark.yaml", "\ufeff", "empty", "empty"],
    ["a picture", "picture.png", bytes("89504e470d0a1a0a0000000d49484452", "hex"), "not_text", "binary"],
    ["UTF-16", "utf16.yaml", bytes(`\ufeff${sample}`, "utf16le"), "not_text", "UTF-8"],
    ["Latin-1", "latin1.yaml", bytes("title: H\u00f6he\n", "latin1"), "not_text", "UTF-8"],
    ["a book", "book.yaml", `title: x\n${"# word\n".repeat(20_000)}`, "too_large", "100000"],
  ])("that is %s is refused", async (_, name, content, code, word) => {
    const faults = await faultsOf(file(name, content));
    expect(faults).toMatchObject([{ code, line: 1, column: 1 }]);
    expect(faults[0]!.message).toContain(word);
  });

  it.each<[what: string, path: () => string, code: string]>([
    ["that is not there", () => join(folder, "none.yaml"), "no_file"],
    ["in a folder that is not there", () => join(folder, "none", "at-all.yaml"), "no_file"],
    ["in a folder that is a file", () => join(file("no-folder", "x"), "a.yaml"), "no_file"],
    ["that is a folder", () => folder, "not_a_file"],
    ["that is a device", () => "/dev/null", "not_a_file"],
    ["that links to nothing", () => dangling("dangling.yaml", "nowhere.yaml"), "no_file"],
    ["that links to itself", () => dangling("ring.yaml", "ring.yaml"), "unreadable"],
    ["whose name is too long for any", () => `${"x".repeat(5000)}.yaml`, "unreadable"],
    ["whose name holds a NUL", () => "a\0b.yaml", "unreadable"],
  ])("%s is refused", async (_, path, code) => {
    const faults = await faultsOf(path());
    expect(faults).toMatchObject([{ code, line: 1, column: 1 }]);
    expect(faults[0]!.message).not.toMatch(/Error:|\n| at /);
  });

  function dangling(name: string, target: string): string {
    const path = join(folder, name);
    symlinkSync(join(folder, target), path);
    return path;
  }
});

// Root reads what it likes, so the reader is run by a child without rights, from a bundle that it can read.
const root = process.getuid?.() === 0;

describe("a scenario that may not be read", () => {
  it.skipIf(process.platform === "win32")("is refused, be it the file or its folder", async () => {
    chmodSync(folder, 0o755);
    const locked = file("locked.yaml", sample);
    chmodSync(locked, 0o000);
    const room = join(folder, "room");
    mkdirSync(room);
    const inside = join(room, "inside.yaml");
    writeFileSync(inside, sample);
    chmodSync(room, 0o000);

    const reader = join(folder, "reader.cjs");
    await build({
      stdin: {
        contents: `import { loadScenario } from "./load.ts";
          for (const path of process.argv.slice(2))
            void loadScenario(path).then((result) => process.stdout.write(JSON.stringify(result) + "\\n"));`,
        resolveDir: new URL("../../src/scenario", import.meta.url).pathname,
      },
      bundle: true,
      platform: "node",
      external: ["#math-units"],
      outfile: reader,
      logLevel: "error",
    });
    const output = execFileSync(process.execPath, [reader, locked, inside], {
      encoding: "utf8",
      cwd: folder,
      ...(root && { uid: 65534, gid: 65534 }),
    });
    chmodSync(room, 0o755); // or it could not be removed
    const denied = { diagnostics: [{ code: "no_permission", line: 1, column: 1 }] };
    const results = output.trim().split("\n");
    expect(results).toHaveLength(2);
    for (const result of results) expect(JSON.parse(result)).toMatchObject(denied);
  });
});
