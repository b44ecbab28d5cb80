import { loadScenario } from "../../src/scenario/load.ts";
import type { Diagnostic, Scenario } from "../../src/scenario/types.ts";

/** A sound scenario of the tests' own, with each thing that they spoil on it once. */
export const sample = `title: Heron Scar to Marrow Sands
frequency: 10.368 GHz
transmitter: { power: 3 W, line_loss: 0.5 dB, dish: tripod, feed: stub, cover: film }
receiver: { noise_figure: 1.1 dB, mode: [cw, ssb], dish: tripod, feed: horn, cover: sheet }
feeds:
  stub: { return_loss: 14 dB, edge_taper: 10 dB, facing: level }
  horn: { vswr: 1.2, beamwidth_10db: 90 deg }
covers:
  film:
    layers: [{ material: FEP film, thickness: 5 mil }]
  sheet:
    measured: { insertion_loss: 0.22 dB, return_loss_change: 2.7 dB }
dish:
  tripod: { diameter: 60 cm, focal_ratio: 0.4, blockage: 6 cm }
path:
  from: { locator: IO83jd07, ground: 538 m, height: 2 m }
  to: { latitude: 54.27, longitude: 3.30 W, ground: 592 m, height: 3 m }
weather:
  dry: {}
  shower: { rain: 16 mm/h, extent: 8 km }
decision: { reserve: 3 dB, confidence: 90 % }
`;

/** The sample with texts replaced; each must stand in it once and only once. */
export function spoiled(...changes: readonly (readonly [from: string, to: string])[]): string {
  return changes.reduce((text, [from, to]) => {
    if (text.split(from).length !== 2) throw new Error(`"${from}" does not stand once in the sample`);
    return text.replace(from, () => to);
  }, sample);
}

/** Where the fault is expected to be told; taken out before the text is read. */
const MARK = "¶";

export function withoutMark(marked: string): { text: string; line: number; column: number } {
  const before = marked.slice(0, marked.indexOf(MARK)).split("\n");
  return { text: marked.replace(MARK, ""), line: before.length, column: before.at(-1)!.length + 1 };
}

export async function faultsOf(pathOrText: string): Promise<readonly Diagnostic[]> {
  const { diagnostics } = await loadScenario(pathOrText);
  if (!diagnostics) throw new Error("the scenario was read, where faults were expected");
  return diagnostics;
}

export async function scenarioOf(pathOrText: string): Promise<Scenario> {
  const { scenario, diagnostics } = await loadScenario(pathOrText);
  if (!scenario) throw new Error(JSON.stringify(diagnostics));
  return scenario;
}
