import { deltaBullingtonLoss } from "../../dist/index.js";

const POINTS = 2000;
const ROUNDS = 15;
const CALLS = 200;

/** A hilly path of 100 km, made up: no draw of the horizon is the same as the last. */
const distancesKm = Float64Array.from({ length: POINTS }, (_, i) => (100 * i) / (POINTS - 1));
const heightsM = Float64Array.from(
  distancesKm,
  (km) => 120 + 90 * Math.sin(km / 3) + 40 * Math.sin(km * 1.7),
);
const profile = { distancesKm, heightsM };
const link = {
  frequencyGHz: 10.368,
  txHeightM: 10,
  rxHeightM: 10,
  effectiveRadiusKm: 8500,
  polarization: "vertical",
};

const median = (values) => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)];

function nanosecondsAPoint(work) {
  const start = process.hrtime.bigint();
  let sink = 0;
  for (let call = 0; call < CALLS; call++) sink += work();
  const spent = Number(process.hrtime.bigint() - start);
  if (!Number.isFinite(sink)) throw new Error("the result must be used and finite");
  return spent / (CALLS * POINTS);
}

/** The least that any method must do: read both arrays once. */
function barePass() {
  let sum = 0;
  for (let i = 0; i < POINTS; i++) sum += distancesKm[i] * heightsM[i];
  return sum;
}

/** Delta-Bullington over a profile against one pass over the same arrays, run by turns. */
export function diffraction() {
  const loss = () => deltaBullingtonLoss({ profile, ...link }).lossDb;
  nanosecondsAPoint(loss);
  nanosecondsAPoint(barePass);
  const model = [];
  const bare = [];
  for (let round = 0; round < ROUNDS; round++) {
    model.push(nanosecondsAPoint(loss));
    bare.push(nanosecondsAPoint(barePass));
  }
  const ratio = median(model) / median(bare);
  return (
    `delta-Bullington of ${POINTS} points: ${median(model).toFixed(1)} ns a point; ` +
    `diffraction / bare pass = ${ratio.toFixed(0)} (${ROUNDS} rounds)`
  );
}
