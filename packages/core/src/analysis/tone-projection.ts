import { solveDense } from '../numeric/solve-dense.ts';
import { correlate, fractionOfPeriod, subtractTone, type ToneBasis, toneBasis } from './tone-basis.ts';

/** Least-squares coefficients on the centred time axis of a record. */
export interface ToneProjection {
  readonly bases: readonly ToneBasis[];
  readonly constant: number;
  /** Coefficient of each frequency's cosine. */
  readonly cos: Float64Array;
  /** Coefficient of each frequency's sine. */
  readonly sin: Float64Array;
}

/**
 * Projects samples onto a constant and a cosine and sine of every frequency (Hz).
 *
 * The normal equations are set up in closed form: over evenly spaced, centred time every scalar product
 * is a Dirichlet kernel, and even and odd functions do not mix, so two systems of half the size are
 * solved. For resolved frequencies they are nearly diagonal and cost no digits.
 *
 * @returns `undefined` where the frequencies cannot be told apart on this record.
 */
export function projectTones(
  samples: Float64Array,
  rate: number,
  frequencies: readonly number[],
): ToneProjection | undefined {
  const count = frequencies.length;
  const size = count + 1;
  const bases = frequencies.map((frequency) => toneBasis(frequency, rate, samples.length));
  // The constant, then every cosine.
  const even = new Float64Array(size);
  // Every sine.
  const odd = new Float64Array(count);
  even[0] = samples.reduce((sum, value) => sum + value, 0);
  bases.forEach((basis, i) => {
    const { cos, sin } = correlate(samples, basis);
    even[i + 1] = cos;
    odd[i] = sin;
  });

  const evenProducts = new Float64Array(size * size);
  const oddProducts = new Float64Array(count * count);
  evenProducts[0] = samples.length;
  const product = (frequency: number): number => dirichlet(frequency, rate, samples.length);
  frequencies.forEach((f, i) => {
    const mean = product(f);
    evenProducts[i + 1] = mean;
    evenProducts[(i + 1) * size] = mean;
    frequencies.forEach((g, j) => {
      const difference = product(f - g) / 2;
      const sum = product(f + g) / 2;
      evenProducts[(i + 1) * size + j + 1] = difference + sum;
      oddProducts[i * count + j] = difference - sum;
    });
  });
  if (!solveDense(evenProducts, even, size) || !solveDense(oddProducts, odd, count)) return undefined;
  return { bases, constant: even[0]!, cos: even.subarray(1), sin: odd };
}

/** Rms of the samples less their projection. */
export function residualOf(samples: Float64Array, { bases, constant, cos, sin }: ToneProjection): number {
  const rest = samples.map((value) => value - constant);
  bases.forEach((basis, i) => {
    subtractTone(rest, basis, cos[i]!, sin[i]!);
  });
  return Math.sqrt(rest.reduce((sum, value) => sum + value * value, 0) / rest.length);
}

/** Sum of cos(2π·frequency·t) over the centred record: sin(Nθ/2)/sin(θ/2), θ = 2π·frequency/rate. */
function dirichlet(frequency: number, rate: number, length: number): number {
  if (frequency === 0) return length;
  const halfTurns = 2 * fractionOfPeriod(frequency, length / 2, rate);
  return Math.sin(Math.PI * halfTurns) / Math.sin((Math.PI * frequency) / rate);
}
