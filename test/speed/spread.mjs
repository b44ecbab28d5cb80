import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { cases, drawingOf, loadScenario, prepare } from "../../dist/index.js";

const scenarioFile = new URL("../../scenarios/hilltop-contest.yaml", import.meta.url).pathname;
const COVERS = ["bare", "film", "sheet", "lid"];
const WEATHERS = ["dry", "shower", "thunderstorm"];
const DRAWS = 200_000;
const ROUNDS = 9;
const COUNTED = ["exp", "log", "sqrt", "cos"];

const median = (values) => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)];

function timed(work) {
  const start = process.hrtime.bigint();
  if (!Number.isFinite(work())) throw new Error("the result must be used and finite");
  return Number(process.hrtime.bigint() - start) / 1e6;
}

/** How often a block calls each function: what the bare loop must do too. */
function callsOf(work) {
  const counts = {};
  const kept = {};
  for (const name of COUNTED) {
    counts[name] = 0;
    kept[name] = Math[name];
    Math[name] = (x) => {
      counts[name]++;
      return kept[name](x);
    };
  }
  work();
  for (const name of COUNTED) Math[name] = kept[name];
  return counts;
}

/** Drawn margins against a bare loop of the same random numbers and the same count of logarithms and exponentials. */
export async function spread() {
  const { scenario } = await loadScenario(scenarioFile);
  const link = prepare(scenario);
  const chosen = cases(link).filter(
    ({ mode, weather, transmitter, receiver }) =>
      mode === scenario.receiver.modes[0] &&
      WEATHERS.includes(weather) &&
      COVERS.includes(transmitter.cover) &&
      transmitter.cover === receiver.cover,
  );
  const { uniforms, margins, block, work } = drawingOf(link, chosen);
  const blocks = Math.ceil(DRAWS / block);
  const generator = xoroshiro128plus(1);
  const fill = () => {
    for (const column of uniforms) {
      for (let i = 0; i < block; i++) column[i] = ((generator.next() >>> 0) + 0.5) * 2 ** -32;
    }
  };
  fill();
  work();
  const counts = callsOf(work);
  const calls = Object.values(counts).reduce((sum, count) => sum + count, 0) / block;

  const drawn = () => {
    let sum = 0;
    for (let b = 0; b < blocks; b++) {
      fill();
      work();
      sum += margins[0][0];
    }
    return sum;
  };
  const logs = Math.round(counts.log / block);
  const others = Math.round(calls) - logs;
  const bare = () => {
    let sum = 0;
    for (let b = 0; b < blocks; b++) {
      fill();
      const column = uniforms[0];
      for (let i = 0; i < block; i++) {
        let x = column[i];
        for (let k = 0; k < logs; k++) x += Math.log(x + k + 1);
        for (let k = 0; k < others; k++) x += Math.exp(-x - k);
        sum += x;
      }
    }
    return sum;
  };
  const [whole, least] = [[], []];
  for (let round = 0; round < ROUNDS; round++) {
    whole.push(timed(drawn));
    least.push(timed(bare));
  }
  const ratio = median(whole) / median(least);
  return (
    `spread of ${chosen.length} cases, ${DRAWS} draws: ${median(whole).toFixed(0)} ms; ` +
    `draws / bare loop of the same ${uniforms.length} random numbers and ${calls.toFixed(0)} roots, logarithms and exponentials ` +
    `= ${ratio.toFixed(1)} (${ROUNDS} rounds)`
  );
}
