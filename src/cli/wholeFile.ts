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
    else giveNewName(draft, file);
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    if (code === "EEXIST") throw new UserError(`${file} exists already; --force replaces it`);
    if (code === "ENOENT") throw new UserError(`${file} cannot be written: no such folder`);
    throw new UserError(`${file} cannot be written (${code ?? message})`);
  } finally {
    rmSync(draft, { force: true });
  }
}

/** A link fails where the file has come into being since, which a rename would replace. */
function giveNewName(draft: string, file: string): void {
  try {
    linkSync(draft, file);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "EEXIST") throw error;
    renameSync(draft, file); // memory sticks and telephones know no links
  }
}
