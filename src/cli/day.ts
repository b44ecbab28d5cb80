import { UserError } from "./terminal.ts";

/**
 * A calendar day at noon, UTC, of the option `--date`; today where it is left out, so that a report is the same all day.
 *
 * @throws UserError on a day that no calendar has
 */
export function day(text = new Date().toISOString().slice(0, 10)): Date {
  const date = new Date(`${text}T12:00:00Z`);
  // A day that no month has (31 June) is carried into the next one.
  if (/^\d{4}-\d\d-\d\d$/.test(text) && date.getTime() > 0 && date.toISOString().startsWith(text))
    return date;
  throw new UserError(`--date: read "${text}", expected a day such as 2026-07-01`);
}
