#!/usr/bin/env node
import { runProgram } from "./codeCache.ts";

// Bundled to CommonJS, so that starting does not wait for the loader of modules.
runProgram(__dirname);
