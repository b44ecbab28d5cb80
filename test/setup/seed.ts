import fc from "fast-check";

/** One seed for all random tests, so that a failure can be run again; OILSKIN_SEED tries another. */
fc.configureGlobal({ seed: Number(process.env["OILSKIN_SEED"] ?? 20261201) });
