#!/usr/bin/env node
import { bundleFor, runBundle } from "./codeCache.ts";

// Bundled to CommonJS, so that starting does not wait for the loader of modules.
runBundle(__dirname, bundleFor(process.argv[2]));
