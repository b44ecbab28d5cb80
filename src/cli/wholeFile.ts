import { existsSync, linkSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { UserError } from "./terminal.ts";

/**
 * Writes a file whole or not at all: under another name first, then renamed. An existing file is kept unless
 * `force` is set.
 */
export function writeWhole(file: string, text: string, force: boolean): void {
  if (!force && existsSync(file)) throw new UserError(`${file} exists already; --force replaces it`);
  const draft = `${file}.${process.pid}.part`;
  try {
    writeFileSync(draft, text, { flag: "wx" });
    if (force) renameSync(draft, file);
    // A link fails where the file has come into being since; a rename would replace it.
    else linkSync(draft, file);
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    if (code === "EEXIST") throw new UserError(`${file} exists already; --force replaces it`);
    throw new UserError(`${file} cannot be written (${code ?? message})`);
  } finally {
    rmSync(draft, { force: true });
  }
}
