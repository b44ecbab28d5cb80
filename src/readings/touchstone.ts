import { add, type Complex, complex, divide, ONE, polar, scale, subtract } from "../numeric/complex.ts";
import { RADIANS_PER_DEGREE } from "../numeric/constants.ts";
import { dbToAmplitude } from "../numeric/decibels.ts";
import { TouchstoneFault } from "./touchstoneFault.ts";
import { numberOf, type Token, type TouchstoneParts, touchstoneParts } from "./touchstoneHead.ts";

export interface SweepPoint {
  readonly frequencyHz: number;
  readonly s11: Complex;
  readonly s21?: Complex;
  readonly s12?: Complex;
  readonly s22?: Complex;
}

export interface Sweep {
  readonly referenceOhm: number;
  readonly points: readonly SweepPoint[];
}

/**
 * A sweep of one or two ports from the text of a Touchstone file.
 *
 * Versions 1.0, 1.1, 2.0 and 2.1; formats MA, DB and RI; any unit, reference, order of the option line's items and
 * line ending; comments; lines that wrap; full, lower and upper matrices; 21 and 12 in either order. Noise data are
 * skipped. Impedances and admittances of one port are turned into S11; other parameters are refused.
 *
 * Source: IBIS Open Forum, Touchstone File Format Specification, versions 1.1 (2002) and 2.0 (2009)
 *
 * @param text   the whole file
 * @param ports  1 or 2, from the file's extension (.s1p, .s2p)
 * @returns referenceOhm [ohm], that of the first port, and the points, frequency rising strictly [Hz]; a one-port
 *          sweep has s11 alone
 * @throws TouchstoneFault, which tells the line, on anything that cannot be read
 */
export function readTouchstone(text: string, ports: 1 | 2): Sweep {
  const parts = touchstoneParts(text, ports);
  if (parts.parameter !== "S" && ports === 2) {
    throw new TouchstoneFault(
      1,
      `${parts.parameter} parameters of two ports are not read: export S parameters`,
    );
  }
  const layout = layoutOf(parts, ports);
  const width = 1 + 2 * (Math.max(...layout) + 1);
  const points: SweepPoint[] = [];
  for (let at = 0; at < parts.tokens.length; at += width) {
    const first = parts.tokens[at]!;
    // Rounded to 1 mHz, so that 10.4 GHz and 10400 MHz are the same number.
    const frequencyHz = Math.round(numberOf(first.text, first.line) * parts.unitHz * 1e3) / 1e3;
    if (frequencyHz < 0) throw new TouchstoneFault(first.line, `frequency ${first.text} is below 0`);
    if (!(frequencyHz > (points.at(-1)?.frequencyHz ?? -1))) {
      if (startsNoise(first, parts, ports)) break;
      throw new TouchstoneFault(first.line, `frequency ${first.text} does not rise`);
    }
    const [s11, s21, s12, s22] = layout.map((place) => valueAt(parts, at + 1 + 2 * place));
    if (ports === 1) points.push({ frequencyHz, s11: asReflection(s11!, parts) });
    else points.push({ frequencyHz, s11: s11!, s21: s21!, s12: s12!, s22: s22! });
  }
  if (points.length === 0) throw new TouchstoneFault(parts.lineCount, "no data");
  if (parts.announced !== undefined && parts.announced.count !== points.length) {
    const { count, line } = parts.announced;
    throw new TouchstoneFault(line, `${count} frequencies are announced, ${points.length} found`);
  }
  return { referenceOhm: parts.referenceOhm, points };
}

/** Which value of a record is s11, s21, s12, s22; half a matrix gives both transmissions the same one. */
function layoutOf({ matrix, order }: TouchstoneParts, ports: 1 | 2): readonly number[] {
  if (ports === 1) return [0];
  if (matrix !== "FULL") return [0, 1, 1, 2];
  return order === "21_12" ? [0, 1, 2, 3] : [0, 2, 1, 3];
}

/** In a two-port file of version 1 a line of five words whose frequency does not rise begins the noise data. */
function startsNoise({ place, wordsInLine }: Token, { version }: TouchstoneParts, ports: 1 | 2): boolean {
  return version === 1 && ports === 2 && place === 0 && wordsInLine === 5;
}

function valueAt({ tokens, format }: TouchstoneParts, at: number): Complex {
  const [a, b] = [tokens[at], tokens[at + 1]];
  if (a === undefined || b === undefined) {
    throw new TouchstoneFault(tokens.at(-1)!.line, "the last record is not complete");
  }
  const first = numberOf(a.text, a.line);
  const second = numberOf(b.text, b.line);
  if (format === "RI") return complex(first, second);
  return polar(format === "DB" ? dbToAmplitude(first) : first, second * RADIANS_PER_DEGREE);
}

/** S11 from an impedance or admittance of one port: version 1 has them in units of the reference, version 2 in ohm. */
function asReflection(value: Complex, { parameter, version, referenceOhm }: TouchstoneParts): Complex {
  if (parameter === "S") return value;
  const impedance = parameter === "Z";
  const unit = version === 1 ? 1 : impedance ? 1 / referenceOhm : referenceOhm;
  const relative = scale(value, unit);
  const [over, under] = [subtract(relative, ONE), add(relative, ONE)];
  return impedance ? divide(over, under) : scale(divide(over, under), -1);
}
