import { dirname } from "node:path";
import { withRainMap } from "./climateMap.ts";
import { withReadings } from "./coverReadings.ts";
import { withTerrain } from "./pathTerrain.ts";
import type { FaultPath } from "./positions.ts";
import { danglingNames } from "./references.ts";
import { scenarioSchema } from "./schema.ts";
import type { Diagnostic, ReadScenario } from "./types.ts";
import { judgeYaml, readText } from "./yamlFile.ts";

export type Loaded =
  | (ReadScenario & { readonly diagnostics?: undefined })
  | {
      readonly scenario?: undefined;
      readonly typed?: undefined;
      readonly diagnostics: readonly Diagnostic[];
    };

/**
 * Reads a scenario and checks all of it, the tables of readings that its covers name, the terrain of its
 * path and the rain map of its climate.
 *
 * @param pathOrText  path of a YAML file, or the YAML itself (anything with a line break or ": " in it that does not
 *                    start with / ./ ../); the paths in a text start from the working directory, those in a file from its folder
 * @returns the scenario in canonical units, or every fault of the file with its line and column (from 1)
 * @throws nothing for a bad file: an unreadable one is a diagnostic at line 1
 */
export async function loadScenario(pathOrText: string): Promise<Loaded> {
  const isPath = /^\.{0,2}\//.test(pathOrText);
  const isText = !isPath && (/\n|:\s/.test(pathOrText) || pathOrText.trim() === "");
  if (isText) return judgeScenario(pathOrText, ".");
  const { text, fault } = readText(pathOrText, "scenario");
  return text === undefined ? { diagnostics: [fault] } : judgeScenario(text, dirname(pathOrText));
}

/** The same for a text whose paths start from `folder`. */
export async function judgeScenario(text: string, folder: string): Promise<Loaded> {
  const { value, typed, places, diagnostics } = await judgeYaml(text, {
    schema: scenarioSchema,
    noun: "scenario",
    starter: "`oilskin new FILE` writes a starter",
    resolve: async (typed) => {
      const { raw, faults } = await withReadings(typed, folder);
      return { raw, faults: [...danglingNames(raw), ...faults] };
    },
  });
  if (value === undefined) return { diagnostics };
  const { path, messages } = await withTerrain(value.path, folder);
  const { climate, mapMessages } = withRainMap(value, folder);
  if (messages.length + mapMessages.length === 0) return { scenario: { ...value, path, climate }, typed };
  const faults = (code: string, found: readonly string[], at: FaultPath) =>
    found.map((message) => ({ code, message, ...places.ofValue(at) }));
  return {
    diagnostics: [
      ...faults("bad_terrain", messages, ["path", "terrain"]),
      ...faults("bad_map", mapMessages, ["climate", "map"]),
    ],
  };
}
