/** A complex number in Cartesian form. Time convention of the project: exp(+j omega t). */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

const ZERO: Complex = { re: 0, im: 0 };
export const ONE: Complex = { re: 1, im: 0 };

export function complex(re: number, im = 0): Complex {
  return { re, im };
}

/** Magnitude and phase [rad] to Cartesian form. */
export function polar(magnitude: number, phaseRad: number): Complex {
  return { re: magnitude * Math.cos(phaseRad), im: magnitude * Math.sin(phaseRad) };
}

export function add(a: Complex, b: Complex): Complex {
  return { re: a.re + b.re, im: a.im + b.im };
}

export function subtract(a: Complex, b: Complex): Complex {
  return { re: a.re - b.re, im: a.im - b.im };
}

export function multiply(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

export function scale(a: Complex, factor: number): Complex {
  return { re: a.re * factor, im: a.im * factor };
}

/** Quotient, scaled by the larger part of the divisor so that it neither overflows nor loses digits. */
export function divide(a: Complex, b: Complex): Complex {
  if (Math.abs(b.re) >= Math.abs(b.im)) {
    const r = b.im / b.re;
    const d = b.re + b.im * r;
    return { re: (a.re + a.im * r) / d, im: (a.im - a.re * r) / d };
  }
  const r = b.re / b.im;
  const d = b.re * r + b.im;
  return { re: (a.re * r + a.im) / d, im: (a.im * r - a.re) / d };
}

export function abs(a: Complex): number {
  return Math.hypot(a.re, a.im);
}

/** Squared magnitude. */
export function abs2(a: Complex): number {
  return a.re * a.re + a.im * a.im;
}

/** Phase [rad], -pi to pi. */
export function arg(a: Complex): number {
  return Math.atan2(a.im, a.re);
}

/** Square root with non-negative real part (the principal branch). */
export function sqrt(a: Complex): Complex {
  const m = abs(a);
  const re = Math.sqrt((m + Math.abs(a.re)) / 2);
  if (re === 0) return ZERO;
  const other = Math.abs(a.im) / (2 * re);
  const [x, y] = a.re >= 0 ? [re, other] : [other, re];
  return { re: x, im: a.im < 0 ? -y : y };
}

export function exp(a: Complex): Complex {
  return polar(Math.exp(a.re), a.im);
}
