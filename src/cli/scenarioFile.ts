import { loadScenario, type Scenario } from "../index.ts";
import { diagnosticsText, UserError } from "./terminal.ts";

/** The scenario in a file, or the list of its faults as one error. */
export async function scenarioIn(file: string): Promise<Scenario> {
  // A name with a line break or ": " in it would be taken for YAML itself; from a command line it is a path.
  const { scenario, diagnostics } = await loadScenario(/\n|:\s/.test(file) ? `./${file}` : file);
  if (scenario) return scenario;
  const count = diagnostics.length === 1 ? "1 fault" : `${diagnostics.length} faults`;
  throw new UserError(`${diagnosticsText(file, diagnostics)}\n${count}; nothing was computed`);
}
