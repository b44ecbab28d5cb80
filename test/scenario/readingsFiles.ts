import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll } from "vitest";
import { type BenchReadings, loadReadings } from "../../src/scenario/readings.ts";

/** Bare and film in turn, 0.2 dB apart, the level falling by 0.01 dB a row. */
export const bench = `# invented
time s,state,level dB
0,bare,-40.00
10,film,-40.21
20,bare,-40.02
30,film,-40.23
40,bare,-40.04
`;

export const folder = mkdtempSync(join(tmpdir(), "oilskin-readings-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

export function file(name: string, content: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

export async function readingsIn(path: string): Promise<BenchReadings> {
  const { readings, faults } = await loadReadings(path);
  if (!readings) throw new Error(JSON.stringify(faults));
  return readings;
}

/** Every fault as `line: message`. */
export async function faultsIn(path: string): Promise<string[]> {
  const { faults } = await loadReadings(path);
  if (!faults) throw new Error("the readings were taken, where faults were expected");
  return faults.map(({ line, message }) => `${line}: ${message}`);
}
