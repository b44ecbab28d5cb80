import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { cacheFile, runProgram } from "./codeCache.ts";

// The cache holds what has been compiled, so the program runs once, silently, on its demo.
process.argv = [process.argv[0]!, "oilskin", "budget", join(__dirname, "../scenarios/hilltop-contest.yaml")];
process.stdout.write = () => true;
const script = runProgram(__dirname);
process.on("exit", () => writeFileSync(cacheFile(__dirname), script.createCachedData()));
