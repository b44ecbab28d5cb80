import { spawnSync } from "node:child_process";

const program = new URL("../../dist/oilskin.cjs", import.meta.url).pathname;
const scenario = new URL("../../scenarios/hilltop-contest.yaml", import.meta.url).pathname;
const ROUNDS = 25;

/** Wall time of one whole process [ms]. */
function once(args) {
  const start = process.hrtime.bigint();
  const { status, stderr } = spawnSync(process.execPath, args, { encoding: "utf8" });
  if (status !== 0) throw new Error(`${args.join(" ")} ended with ${status}: ${stderr}`);
  return Number(process.hrtime.bigint() - start) / 1e6;
}

const median = (values) => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)];

/** Start to finish of a margin report against an empty Node process, run by turns. */
export function coldStart() {
  const empty = [];
  const budget = [];
  for (let round = 0; round < ROUNDS; round++) {
    empty.push(once(["-e", "0"]));
    budget.push(once([program, "budget", scenario]));
  }
  const ratio = median(budget) / median(empty);
  return (
    `cold start: oilskin budget / node -e 0 = ${ratio.toFixed(1)} ` +
    `(medians ${median(budget).toFixed(0)} and ${median(empty).toFixed(0)} ms, ` +
    `least ${Math.min(...budget).toFixed(0)} and ${Math.min(...empty).toFixed(0)} ms, ${ROUNDS} rounds)`
  );
}
