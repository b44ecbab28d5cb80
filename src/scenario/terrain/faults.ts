import type { TerrainFault } from "./types.ts";

/** Lowest and highest ground that terrain may have: beyond it a height is a fault of the file [m]. */
export const LOWEST_M = -500;
export const HIGHEST_M = 9000;

/** A terrain file that turns out to be unusable while it is read. */
export class TerrainError extends Error {
  readonly fault: TerrainFault;

  constructor(file: string, code: string, message: string) {
    super(`${file}: ${message}`);
    this.fault = { file, code, message };
  }
}

/** What the system says of a file that it will not open or read. */
export function unreadable(file: string, error: unknown): TerrainError {
  const { code = "", message } = error as NodeJS.ErrnoException;
  if (code === "ENOENT" || code === "ENOTDIR") {
    return new TerrainError(file, "no_file", "no such file or folder of terrain");
  }
  if (code === "EACCES" || code === "EPERM") {
    return new TerrainError(file, "no_permission", "no permission to read it");
  }
  return new TerrainError(file, "unreadable", `cannot be read (${code || message})`);
}

/** The fault of an error that a terrain file caused; anything else is thrown on. */
export function faultOf(error: unknown): TerrainFault {
  if (error instanceof TerrainError) return error.fault;
  throw error;
}
