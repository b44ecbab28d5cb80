import { constants } from "node:os";

/** What a shell adds to a signal's number for the exit status. */
const SIGNALLED = 128;

/** A stop that the user or the system has asked for. */
export interface Stop {
  /** Aborted by the first signal; its reason is the exit status. */
  readonly signal: AbortSignal;
  /** Leaves signals to the system again. */
  readonly end: () => void;
}

/**
 * Ctrl-C and its kin end the work in order; the second one ends it at once.
 *
 * @param cleanUp  what must be done even then
 */
export function stopOnSignal(cleanUp: () => void): Stop {
  const controller = new AbortController();
  const names = ["SIGINT", "SIGTERM", "SIGHUP"] as const;
  const stop = (name: (typeof names)[number]) => {
    const status = SIGNALLED + constants.signals[name];
    if (controller.signal.aborted) {
      cleanUp();
      process.exit(status);
    }
    controller.abort(status);
  };
  for (const name of names) process.on(name, stop);
  return {
    signal: controller.signal,
    end: () => {
      for (const name of names) process.off(name, stop);
    },
  };
}
