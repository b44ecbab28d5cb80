import { layeredSheet } from "../../dist/index.js";

/**
 * What one sheet of n layers takes in src/cover/layeredSheet.ts: a cosine of the angle, then for each layer one sine,
 * one cosine and five complex multiplications (Z H, P squared, P^2 (E - Z H), Y times the difference, the product of
 * all P), and two more at the end for G and T. Roots, exponentials, logarithms, quotients, checks and the object
 * returned are not in the bare loop: they are what the ratio shows.
 */
const LAYERS = 5;
const SHEETS = 40_000;
const ROUNDS = 31;

const layers = [
  { permittivity: 4.3, lossTangent: 0.02, thicknessMm: 0.3 },
  { permittivity: 1.045, lossTangent: 0.0004, thicknessMm: 6 },
  { permittivity: 2.45, lossTangent: 0.008, thicknessMm: 0.05 },
  { permittivity: 2.08, lossTangent: 0.0004, thicknessMm: 1 },
  { permittivity: 52.3, lossTangent: 0.73, thicknessMm: 0.05 },
];
const frequencyOf = (i) => 9 + (3 * i) / SHEETS;

/** A sum over what every sheet returns, so that nothing can be left out. */
function sheets() {
  let sum = 0;
  for (let i = 0; i < SHEETS; i++) {
    const sheet = layeredSheet({
      frequencyGHz: frequencyOf(i),
      incidenceDeg: 20,
      polarization: "te",
      layers,
    });
    sum += sheet.reflection.re + sheet.reflection.im + sheet.transmission.re + sheet.transmission.im;
    sum += sheet.transmissionLossDb + sheet.returnLossDb + sheet.absorbedFraction;
  }
  return sum;
}

/** The same number of sines, cosines and complex multiplications; as in a sheet, only these wait for each other. */
function bare() {
  let sum = 0;
  for (let i = 0; i < SHEETS; i++) {
    const wavenumber = frequencyOf(i);
    let re = Math.cos(wavenumber);
    let im = 0.5;
    for (let layer = 0; layer < LAYERS; layer++) {
      const phase = wavenumber * layers[layer].thicknessMm;
      const cosine = Math.cos(phase);
      const sine = Math.sin(phase);
      for (let product = 0; product < 5; product++) {
        const turned = re * cosine - im * sine;
        im = re * sine + im * cosine;
        re = turned;
      }
    }
    for (let product = 0; product < 2; product++) {
      const turned = re * 0.6 - im * 0.8;
      im = re * 0.8 + im * 0.6;
      re = turned;
    }
    sum += re + im;
  }
  return sum;
}

/** Time of one run [ms]. */
function timed(run) {
  const start = process.hrtime.bigint();
  const sum = run();
  if (!Number.isFinite(sum)) throw new Error("a sheet is no number");
  return Number(process.hrtime.bigint() - start) / 1e6;
}

const median = (values) => values.toSorted((a, b) => a - b)[Math.floor(values.length / 2)];

/** Sheets a second, and their time over that of the bare arithmetic, run by turns. */
export function sheetRate() {
  for (let round = 0; round < 5; round++) [timed(sheets), timed(bare)]; // until both are compiled
  const whole = [];
  const arithmetic = [];
  for (let round = 0; round < ROUNDS; round++) {
    whole.push(timed(sheets));
    arithmetic.push(timed(bare));
  }
  const ratio = median(whole) / median(arithmetic);
  const perSecond = (1e3 * SHEETS) / median(whole);
  return (
    `sheets of ${LAYERS} layers: ${(perSecond / 1e6).toFixed(2)} million a second; ` +
    `sheet / bare arithmetic = ${ratio.toFixed(2)} ` +
    `(least ${(Math.min(...whole) / Math.min(...arithmetic)).toFixed(2)}, ${ROUNDS} rounds)`
  );
}
