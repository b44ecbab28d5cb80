import { loadScenario, type ReadScenario, type Scenario } from "../index.ts";
import { diagnosticsText, UserError } from "./terminal.ts";

/** The scenario in a file, or the list of its faults as one error. */
export async function scenarioIn(file: string): Promise<Scenario> {
  return (await scenariosIn([file]))[0]!.scenario;
}

/** The same for some files, each with its text as typed; the faults of all of them are told at once. */
export async function scenariosIn(files: readonly string[]): Promise<readonly ReadScenario[]> {
  const unlike = [...new Set(files)];
  // A name with a line break or ": " in it would be taken for YAML itself; from a command line it is a path.
  const loaded = await Promise.all(
    unlike.map(async (file) => loadScenario(/\n|:\s/.test(file) ? `./${file}` : file)),
  );
  const faults = loaded.flatMap(({ diagnostics = [] }) => diagnostics);
  if (faults.length > 0) {
    const told = loaded.flatMap(({ diagnostics }, i) =>
      diagnostics === undefined ? [] : diagnosticsText(unlike[i]!, diagnostics),
    );
    const count = faults.length === 1 ? "1 fault" : `${faults.length} faults`;
    throw new UserError(`${told.join("\n")}\n${count}; nothing was computed`);
  }
  const read = loaded.flatMap((one) => (one.scenario === undefined ? [] : one));
  return files.map((file) => read[unlike.indexOf(file)]!);
}
