import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { bundleFor, cacheFile, runBundle } from "./codeCache.ts";

// A cache holds what has been compiled, so the command named here runs once, silently, on the demo.
const command = process.argv[2]!;
process.argv = [process.argv[0]!, "oilskin", command, join(__dirname, "../scenarios/hilltop-contest.yaml")];
process.stdout.write = () => true;
const bundle = bundleFor(command);
const script = runBundle(__dirname, bundle);
process.on("exit", () => writeFileSync(cacheFile(__dirname, bundle), script.createCachedData()));
