import { visible } from "./wording.ts";

/** What is wrong with a file of readings, and where; lines and columns count from 1. */
export interface FileFault {
  readonly code: string;
  readonly message: string;
  readonly file: string;
  readonly line: number;
  readonly column?: number;
}

/** Faults listed of one table; a million rows of another kind would fill the screen for minutes. */
export const MOST_FAULTS = 100;

export interface FaultList {
  /** Never fewer than those listed. */
  readonly count: () => number;
  readonly add: (code: string, line: number, message: string) => void;
  /** In the order found, with a last line that counts those beyond the limit. */
  readonly list: () => readonly FileFault[];
}

/** Collects the faults of one file, as many as a person will read. */
export function faultList(file: string): FaultList {
  const listed: FileFault[] = [];
  let count = 0;
  let lastLine = 1;
  return {
    count: () => count,
    add: (code, line, message) => {
      count++;
      lastLine = line;
      if (listed.length < MOST_FAULTS) listed.push({ code, message: visible(message), file, line });
    },
    list: () => {
      const more = count - listed.length;
      if (more === 0) return listed;
      const message = `${more} more like these, the last of them here`;
      return [...listed, { code: "more_faults", message, file, line: lastLine }];
    },
  };
}
