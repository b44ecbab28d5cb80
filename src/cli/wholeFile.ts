import { closeSync, linkSync, openSync, renameSync, rmSync, type Stats, statSync, writeSync } from "node:fs";
import { UserError } from "./terminal.ts";

/** A file that is being written under another name. */
export interface Draft {
  readonly write: (text: string | Uint8Array) => void;
  /** Gives it its name; nothing is left under the other one. */
  readonly keep: () => void;
  /** Gives it up; harmless after `keep`. */
  readonly drop: () => void;
}

/**
 * Writes a file whole or not at all: under another name first, then renamed. An existing file is kept unless
 * `force` is set.
 */
export function writeWhole(file: string, text: string, force: boolean): void {
  const draft = openDraft(file, force);
  draft.write(text);
  draft.keep();
}

/** The same for a file that is written piece by piece. What fails to be written is given up. */
export function openDraft(file: string, force: boolean): Draft {
  const old = statusOf(file);
  if (old?.isDirectory()) throw new UserError(`${file} is a folder, expected the name of a file`);
  // A rename would put a file in the place of the device or pipe itself.
  if (old && !old.isFile()) throw new UserError(`${file} is no plain file and cannot be replaced by one`);
  if (old && !force) throw new UserError(`${file} exists already; --force replaces it`);
  const draft = `${file}.${process.pid}.part`;
  let descriptor: number | undefined;
  const close = () => {
    if (descriptor !== undefined) closeSync(descriptor);
    descriptor = undefined;
  };
  const drop = () => {
    close();
    rmSync(draft, { force: true });
  };
  const attempt = (work: () => void) => {
    try {
      work();
    } catch (error) {
      drop();
      throw inOurWords(file, error as NodeJS.ErrnoException);
    }
  };
  attempt(() => {
    descriptor = openSync(draft, "wx");
  });
  return {
    write: (text) =>
      attempt(() => {
        const bytes = typeof text === "string" ? Buffer.from(text) : text;
        for (let done = 0; done < bytes.length; ) done += writeSync(descriptor!, bytes, done);
      }),
    keep: () => {
      attempt(() => {
        close();
        if (force) renameSync(draft, file);
        else giveNewName(draft, file);
      });
      drop();
    },
    drop,
  };
}

/** Refuses to write over what is read, which `--force` is not meant for. */
export function notOver(file: string, inputs: readonly string[]): void {
  const place = statusOf(file);
  const same = (input: string) => {
    const one = statusOf(input);
    return one !== undefined && one.dev === place?.dev && one.ino === place.ino;
  };
  if (inputs.some(same)) throw new UserError(`${file} is one of the files read; it is not replaced`);
}

function statusOf(file: string): Stats | undefined {
  try {
    return statSync(file, { throwIfNoEntry: false });
  } catch (error) {
    throw inOurWords(file, error as NodeJS.ErrnoException);
  }
}

function inOurWords(file: string, { code, message }: NodeJS.ErrnoException): UserError {
  if (code === "EEXIST") return new UserError(`${file} exists already; --force replaces it`);
  if (code === "ENOENT") return new UserError(`${file} cannot be written: no such folder`);
  return new UserError(`${file} cannot be written (${code ?? message})`);
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
