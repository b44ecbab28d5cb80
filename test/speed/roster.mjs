import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { availableParallelism, tmpdir } from "node:os";
import { join } from "node:path";
import {
  loadScenario,
  mostDemandingFirst,
  ownCoverFirst,
  rosterCsvLines,
  rosterStudy,
} from "../../dist/index.js";

const program = new URL("../../dist/oilskin.cjs", import.meta.url).pathname;
const file = new URL("../../scenarios/hilltop-contest.yaml", import.meta.url).pathname;

const THREADED = 50_000;
const ROUNDS = 4;
const COUNTS = [100, 10_000, 100_000];

const median = (values) => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)];

/** Numbers that look random, the same every time. */
function numbers() {
  let state = 1;
  return () => {
    state = (Math.imul(state, 1_103_515_245) + 12_345) >>> 0;
    return state / 2 ** 32;
  };
}

/** Made-up stations up to some 500 km off. */
function stations(count) {
  const next = numbers();
  return Array.from({ length: count }, (_, i) => ({
    line: i + 2,
    name: `S${i}`,
    latitude: 50 + 7 * next(),
    longitude: -7 + 7 * next(),
    positionErrorKm: 0,
    groundM: Math.floor(600 * next()),
  }));
}

/** A long roster with two threads against one, whole processes run by turns. */
export function rosterThreads() {
  const folder = mkdtempSync(join(tmpdir(), "oilskin-"));
  const csv = join(folder, "roster.csv");
  const rows = stations(THREADED).map(
    ({ name, latitude, longitude, groundM }) => `${name},${latitude},${longitude},${groundM} m`,
  );
  writeFileSync(csv, `name,latitude,longitude,ground\n${rows.join("\n")}\n`);
  const seconds = (workers) => {
    const start = process.hrtime.bigint();
    const { status } = spawnSync(
      process.execPath,
      [program, "roster", file, csv, "--csv", "--workers", workers],
      {
        stdio: "ignore",
      },
    );
    if (status !== 0) throw new Error(`the roster ended with ${status}`);
    return Number(process.hrtime.bigint() - start) / 1e9;
  };
  const one = [];
  const two = [];
  for (let round = 0; round < ROUNDS; round++) {
    one.push(seconds("1"));
    two.push(seconds("2"));
  }
  rmSync(folder, { recursive: true });
  // The least of each: a second thread shows only while nobody else has the second core.
  const least = [Math.min(...one), Math.min(...two)];
  return (
    `roster of ${THREADED} stations: 1 thread / 2 threads = ${(least[0] / least[1]).toFixed(2)} ` +
    `(least ${least.map((time) => time.toFixed(1)).join(" and ")} s, medians ${median(one).toFixed(1)} and ` +
    `${median(two).toFixed(1)} s, ${availableParallelism()} cores, ${ROUNDS} rounds)`
  );
}

/** What a station costs in a short roster and in long ones, in one warm process. */
export async function rosterCost() {
  const { scenario } = await loadScenario(file);
  const study = await rosterStudy({
    scenario,
    folder: ".",
    sites: [{ name: "own", site: scenario.path.from, declinationDeg: 0 }],
    weathers: ["dry", "thunderstorm"],
    modes: mostDemandingFirst(scenario, Object.keys(scenario.modes)),
    covers: ownCoverFirst(scenario),
    bothWays: true,
    filter: {},
  });
  const microseconds = async (some) => {
    const start = process.hrtime.bigint();
    let characters = 0;
    for (const station of some) {
      for (const row of (await study(station)).rows) characters += rosterCsvLines(row).length;
    }
    if (characters < some.length) throw new Error("the result must be used");
    return Number(process.hrtime.bigint() - start) / 1000 / some.length;
  };
  await microseconds(stations(10_000));
  const short = [];
  for (let round = 0; round < 25; round++) short.push(await microseconds(stations(COUNTS[0])));
  const costs = [median(short)];
  for (const count of COUNTS.slice(1)) costs.push(await microseconds(stations(count)));
  const ratios = costs.map((cost) => (cost / costs[0]).toFixed(2)).join(" : ");
  return (
    `a station of a roster of ${COUNTS.join(", ")}: ${ratios} ` +
    `(${costs.map((cost) => cost.toFixed(0)).join(", ")} us with 5 own covers, 4 modes, dry and wet, both ways, as CSV)`
  );
}
