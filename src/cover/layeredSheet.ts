import { requirePositive, requireWithin } from "../numeric/check.ts";
import type { Complex } from "../numeric/complex.ts";
import { RADIANS_PER_DEGREE, SPEED_OF_LIGHT_M_PER_S } from "../numeric/constants.ts";

/** One homogeneous layer; permittivity is the real part eps', lossTangent is eps''/eps'. */
export interface Layer {
  readonly permittivity: number;
  readonly lossTangent: number;
  readonly thicknessMm: number;
}

/** What a cascade needs to know of a sheet: tangential E field, faces as reference planes. */
export interface SheetScattering {
  readonly reflection: Complex;
  readonly transmission: Complex;
}

export interface Sheet extends SheetScattering {
  readonly transmissionLossDb: number;
  readonly returnLossDb: number;
  readonly absorbedFraction: number;
}

export interface LayeredSheetInput {
  readonly frequencyGHz: number;
  readonly incidenceDeg: number;
  readonly polarization: "te" | "tm";
  readonly layers: readonly Layer[];
}

const DB_PER_NEPER = 20 / Math.LN10;
const RADIANS_PER_MM_AT_1_GHZ = (2 * Math.PI * 1e6) / SPEED_OF_LIGHT_M_PER_S;

/** Layer from a permittivity eps' - j eps'' as the models of water, ice and snow return it. */
export function layerOf(permittivity: { real: number; imaginary: number }, thicknessMm: number): Layer {
  const { real, imaginary } = permittivity;
  return { permittivity: real, lossTangent: imaginary / real, thicknessMm };
}

/**
 * Reflection and transmission of a plane wave at a stack of flat dielectric layers in air.
 *
 * Characteristic matrices, multiplied from the far side towards the feed. With d = k0 t q the complex phase
 * thickness, each matrix is taken times P = exp(-j d): P cos d = (1 + P^2)/2 and j P sin d = (1 - P^2)/2. So one
 * exponential serves both, a thick lossy layer never overflows, and the product of all P returns in T.
 * Reflection refers to the front face of the first layer; that from behind is the reversed stack's.
 *
 * Source: Born & Wolf, Principles of Optics, section 1.6 (from memory).
 * Valid:  passive layers of permittivity 1 or more, mu = 1, infinite extent; no layer or zero thickness is
 *         exactly air.
 *
 * @param frequencyGHz  frequency [GHz], above 0
 * @param incidenceDeg  angle in air from the normal [deg], 0 to 89.99
 * @param polarization  "te": E across the plane of incidence; "tm": E in it
 * @param layers        feed side first; permittivity at least 1, loss tangent and thickness [mm] at least 0
 * @returns reflection and transmission (tangential E), losses [dB] positive, absorbed share of the power;
 *          returnLossDb is Infinity where nothing is reflected
 * @throws RangeError on an argument outside these ranges
 */
export function layeredSheet({ frequencyGHz, incidenceDeg, polarization, layers }: LayeredSheetInput): Sheet {
  requirePositive("frequencyGHz", frequencyGHz);
  requireWithin("incidenceDeg", incidenceDeg, 0, 89.99);
  const wavenumber = RADIANS_PER_MM_AT_1_GHZ * frequencyGHz;
  const cosine = Math.cos(incidenceDeg * RADIANS_PER_DEGREE);
  const te = polarization === "te";
  // Admittances and H are in units of the air's, so that air leaves exact ones and zeros.
  const unit = te ? 1 / cosine : cosine;

  // Fields at the face reached so far; the air behind the stack has E = H = 1.
  let eRe = 1;
  let eIm = 0;
  let hRe = 1;
  let hIm = 0;
  let pRe = 1;
  let pIm = 0;
  let attenuationNeper = 0;
  for (let i = layers.length - 1; i >= 0; i--) {
    const layer = layers[i]!;
    const { permittivity, lossTangent, thicknessMm } = layer;
    if (!isPassive(layer)) refuse(i, layer);
    if (thicknessMm === 0) continue; // nothing, and without a trace of rounding
    const epsIm = -permittivity * lossTangent;

    // q = sqrt(eps - sin^2), written so that air gives exactly the cosine's square under the root.
    const squareRe = permittivity - 1 + cosine * cosine;
    const qRe = Math.sqrt((Math.sqrt(squareRe * squareRe + epsIm * epsIm) + squareRe) / 2);
    const qIm = epsIm / (2 * qRe);

    // Admittance Y (te: q, tm: eps/q) and its reciprocal Z.
    let yRe = unit * qRe;
    let yIm = unit * qIm;
    if (!te) {
      const scaling = unit / (qRe * qRe + qIm * qIm);
      yRe = scaling * (permittivity * qRe + epsIm * qIm);
      yIm = scaling * (epsIm * qRe - permittivity * qIm);
    }
    const yNorm = yRe * yRe + yIm * yIm;
    const zRe = yRe / yNorm;
    const zIm = -yIm / yNorm;

    const phase = wavenumber * thicknessMm * qRe;
    const neper = -wavenumber * thicknessMm * qIm;
    const decay = Math.exp(-neper);
    const stepRe = decay * Math.cos(phase);
    const stepIm = -decay * Math.sin(phase);
    const squaredRe = stepRe * stepRe - stepIm * stepIm;
    const squaredIm = 2 * stepRe * stepIm;

    // E <- ((E + Z H) + P^2 (E - Z H))/2,  H <- Y ((E + Z H) - P^2 (E - Z H))/2
    const zhRe = hRe * zRe - hIm * zIm;
    const zhIm = hRe * zIm + hIm * zRe;
    const onRe = eRe + zhRe;
    const onIm = eIm + zhIm;
    const backRe = squaredRe * (eRe - zhRe) - squaredIm * (eIm - zhIm);
    const backIm = squaredRe * (eIm - zhIm) + squaredIm * (eRe - zhRe);
    eRe = (onRe + backRe) / 2;
    eIm = (onIm + backIm) / 2;
    hRe = (yRe * (onRe - backRe) - yIm * (onIm - backIm)) / 2;
    hIm = (yRe * (onIm - backIm) + yIm * (onRe - backRe)) / 2;

    const productRe = pRe * stepRe - pIm * stepIm;
    pIm = pRe * stepIm + pIm * stepRe;
    pRe = productRe;
    attenuationNeper += neper;
  }

  // G = (E - H)/(E + H), T = 2 P/(E + H)
  const sumRe = eRe + hRe;
  const sumIm = eIm + hIm;
  const sumNorm = sumRe * sumRe + sumIm * sumIm;
  const differenceRe = eRe - hRe;
  const differenceIm = eIm - hIm;
  const reflection = {
    re: (differenceRe * sumRe + differenceIm * sumIm) / sumNorm,
    im: (differenceIm * sumRe - differenceRe * sumIm) / sumNorm,
  };
  const scaling = 2 / sumNorm;
  const transmission = {
    re: scaling * (pRe * sumRe + pIm * sumIm),
    im: scaling * (pIm * sumRe - pRe * sumIm),
  };
  const reflectedPower = (differenceRe * differenceRe + differenceIm * differenceIm) / sumNorm;
  const enteredPower = 4 / sumNorm;
  const passedPower = enteredPower * (pRe * pRe + pIm * pIm);
  return {
    reflection,
    transmission,
    // Not from |T|, which underflows in a very lossy stack; a passive sheet's rounding below 0 dB is cut.
    transmissionLossDb: Math.max(0, DB_PER_NEPER * (attenuationNeper - Math.log(enteredPower) / 2)),
    returnLossDb: Math.max(0, (-DB_PER_NEPER / 2) * Math.log(reflectedPower)),
    absorbedFraction: Math.max(0, 1 - reflectedPower - passedPower),
  };
}

function isPassive({ permittivity, lossTangent, thicknessMm }: Layer): boolean {
  const finite = permittivity < Infinity && lossTangent < Infinity && thicknessMm < Infinity;
  return finite && permittivity >= 1 && lossTangent >= 0 && thicknessMm >= 0;
}

function refuse(index: number, layer: Layer): never {
  throw new RangeError(
    `layers[${index}] must have permittivity of at least 1, lossTangent and thicknessMm of at least 0 and ` +
      `finite, got ${layer.permittivity}, ${layer.lossTangent}, ${layer.thicknessMm}`,
  );
}
