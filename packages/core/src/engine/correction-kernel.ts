import { jetLength } from '../equation/jet/jet-arithmetic.ts';
import { kaiserWindow } from '../numeric/kaiser-window.ts';
import { solveDense } from '../numeric/solve-dense.ts';

/** Rows of the table for one sample: fractions of an edge's place between two samples. */
const rows = 32;
/** Coefficients of the cubic in each row. */
const cubic = 4;
/** Terms in the table: the impulse, and its integrals less those of the ideal one. */
const tableTerms = jetLength + 1;
/** Points and weights of the Gauss–Legendre rule of order 12 on [−1, 1] (any table). */
const gauss: readonly (readonly [number, number])[] = [
  [0.2386191860831969, 0.467913934572691],
  [0.6612093864662645, 0.3607615730481386],
  [0.9324695142031521, 0.1713244923791704],
].flatMap(([x, w]) => [[-x!, w!] as const, [x!, w!] as const]);

interface Design {
  /** Samples the kernel spans; even. */
  readonly length: number;
  /** Shape of the Kaiser window. */
  readonly beta: number;
  /** Cutoff in cycles per sample. */
  readonly cutoff: number;
}

/**
 * Kernels by oversampling. Each needs to be flat to 20 kHz and small where its images would fold
 * below 20 kHz; what lies between, the decimator removes.
 */
const designs: readonly (readonly [least: number, Design])[] = [
  [8, { length: 12, beta: 14, cutoff: 0.48 }],
  [4, { length: 16, beta: 20, cutoff: 0.46 }],
  [2, { length: 24, beta: 22, cutoff: 0.42 }],
  [1, { length: 64, beta: 16, cutoff: 0.5 }],
];

const kernels = new Map<number, CorrectionKernel>();

/**
 * What must be added to point samples of a waveform so that its jumps read as if it had been
 * band-limited: for a jump of the j-th derivative, the (j+1)-fold integral of a band-limiting
 * kernel h less that of the ideal impulse.
 *
 * h(t) = 2f·sinc(2ft)·Kaiser·(a₀ + a₁t² + a₂t⁴ + a₃t⁶), the polynomial chosen so that ∫h = 1 and
 * ∫t²h = ∫t⁴h = ∫t⁶h = 0: then every integral returns to zero outside the span, for jumps up to
 * the fifth derivative. After E. Brandt, "Hard sync without aliasing", ICMC 2001, and V. Välimäki,
 * J. Pekonen, J. Nam, J. Acoust. Soc. Am. 131(1), 2012, doi:10.1121/1.3651227.
 */
export class CorrectionKernel {
  /** Samples before and after an edge that it touches. */
  readonly reach: number;
  /** Row by row; in a row tap by tap, in a tap term by term (0: the impulse itself), in a term the cubic. */
  private readonly table: Float64Array;
  private readonly span: number;

  /** The kernel for an oversampling; tabulated once. */
  static for(oversample: number): CorrectionKernel {
    const kernel = kernels.get(oversample) ?? new CorrectionKernel(oversample);
    kernels.set(oversample, kernel);
    return kernel;
  }

  private constructor(oversample: number) {
    const design = designs.find(([least]) => oversample >= least)![1];
    this.span = design.length;
    this.reach = design.length / 2;
    this.table = tabulate(design);
  }

  /**
   * Adds the correction of one edge.
   *
   * @param line accumulator; the sample that ends the edge's cell is at `end`
   * @param slopes the same for the slope of the signal, per sample, or empty
   * @param at the edge's fraction of its cell, 0 < at ≤ 1
   * @param before jets at `index` of `before` and `after`
   */
  add(
    line: Float64Array,
    slopes: Float64Array,
    end: number,
    at: number,
    before: Float64Array,
    after: Float64Array,
    index: number,
  ): void {
    const { table, span, reach } = this;
    const place = (1 - at) * rows;
    const row = Math.min(Math.floor(place), rows - 1);
    const u = place - row;
    let factorial = 1;
    for (let j = 0; j < jetLength; j++) {
      if (j > 1) factorial *= j;
      jumps[j] = factorial * (after[index + j]! - before[index + j]!);
    }
    const terms = usefulTerms();
    const start = row * span * tableTerms * cubic;
    for (let tap = 0; tap < span; tap++) {
      const n = end - reach + tap;
      if (n < 0) continue;
      const entry = start + tap * tableTerms * cubic;
      let sum = 0;
      for (let j = 0; j < terms; j++) sum += jumps[j]! * cubicAt(table, entry + (j + 1) * cubic, u);
      line[n]! += sum;
      if (slopes.length === 0) continue;
      sum = 0;
      for (let j = 0; j < terms; j++) sum += jumps[j]! * cubicAt(table, entry + j * cubic, u);
      slopes[n]! += sum;
    }
  }
}

function cubicAt(table: Float64Array, entry: number, u: number): number {
  return table[entry]! + u * (table[entry + 1]! + u * (table[entry + 2]! + u * table[entry + 3]!));
}

const jumps = new Float64Array(jetLength);

/** A jump of one derivative more folds back by this factor less, about 1/2π for a line near the rate. */
const perDerivative = 1 / 5.6;

/**
 * How many terms to correct. Behind a pole faster than the samples the series of jumps grows
 * instead of fading; it is then cut at its smallest term, as an asymptotic series is.
 */
function usefulTerms(): number {
  let weight = 1;
  let smallest = Number.POSITIVE_INFINITY;
  let best = jetLength;
  let before = 0;
  let growing = 0;
  for (let j = 0; j < jetLength; j++) {
    const term = Math.abs(jumps[j]!) * weight;
    weight *= perDerivative;
    growing = term > before ? growing + 1 : 0;
    before = term;
    if (term > 0 && term < smallest) {
      smallest = term;
      best = j;
    }
  }
  return growing >= 2 ? best : jetLength;
}

/** Kernel values at the Gauss points of every fine cell of the right half, 0 … length/2. */
function tabulate(design: Design): Float64Array {
  const half = design.length / 2;
  const cells = half * rows;
  const impulse = bandLimited(design);
  const points = Array.from({ length: cells }, (_, cell) =>
    gauss.map(([x, weight]) => {
      const s = (cell + 0.5 + x / 2) / rows;
      return { s, mass: (weight / 2 / rows) * impulse(s) };
    }),
  );
  // Term j right of the edge at t = i/rows: −∫ₜ (t − s)^j/j!·h(s) ds; left of it the mirror image.
  const right = Array.from({ length: cells + 1 }, (_, i) => {
    const t = i / rows;
    const terms = new Float64Array(jetLength + 1);
    terms[0] = impulse(t);
    for (let cell = i; cell < cells; cell++) {
      for (const { s, mass } of points[cell]!) {
        let power = mass;
        for (let j = 0; j < jetLength; j++) {
          terms[j + 1]! -= power;
          power *= (t - s) / (j + 1);
        }
      }
    }
    return terms;
  });
  /** Term `j` (0: h itself) at grid point `i` of the whole span, seen from the right or the left. */
  const value = (i: number, j: number, fromRight: boolean): number => {
    const k = i - cells;
    if (k > 0 || (k === 0 && fromRight)) return right[k]![j]!;
    return (j % 2 === 0 ? 1 : -1) * right[-k]![j]!;
  };
  /** Slope of the impulse, by a difference good to nine digits. */
  const steepness = (i: number): number => {
    const t = i / rows - half;
    const step = 1e-4;
    return Math.abs(t) + step > half ? 0 : (impulse(t + step) - impulse(t - step)) / (2 * step);
  };
  const table = new Float64Array(rows * design.length * tableTerms * cubic);
  let entry = 0;
  for (let row = 0; row < rows; row++) {
    for (let tap = 0; tap < design.length; tap++) {
      const i = tap * rows + row;
      for (let j = 0; j <= jetLength; j++) {
        const a = value(i, j, true);
        const b = value(i + 1, j, false);
        const da = (j === 0 ? steepness(i) : value(i, j - 1, true)) / rows;
        const db = (j === 0 ? steepness(i + 1) : value(i + 1, j - 1, false)) / rows;
        table.set([a, da, 3 * (b - a) - 2 * da - db, 2 * (a - b) + da + db], entry);
        entry += cubic;
      }
    }
  }
  return table;
}

/** The impulse h, as a function of time in samples. */
function bandLimited({ length, beta, cutoff }: Design): (t: number) => number {
  const half = length / 2;
  const window = (t: number): number => {
    const x = 2 * cutoff * t;
    const sinc = x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x);
    return 2 * cutoff * sinc * kaiserWindow(t / half, beta);
  };
  const order = 4;
  // Moments of t^(2(i + j)), with t in half-lengths so that the system is well conditioned.
  const moment = (power: number): number => {
    let sum = 0;
    const fine = length * rows;
    for (let cell = 0; cell < fine; cell++) {
      for (const [x, weight] of gauss) {
        const t = -half + (cell + 0.5 + x / 2) / rows;
        sum += (weight / 2 / rows) * window(t) * (t / half) ** power;
      }
    }
    return sum;
  };
  const moments = Array.from({ length: 2 * order - 1 }, (_, i) => moment(2 * i));
  const matrix = Float64Array.from(
    { length: order * order },
    (_, i) => moments[Math.floor(i / order) + (i % order)]!,
  );
  const a = Float64Array.from([1, 0, 0, 0]);
  solveDense(matrix, a, order);
  return (t) => {
    const square = (t / half) ** 2;
    return window(t) * (a[0]! + square * (a[1]! + square * (a[2]! + square * a[3]!)));
  };
}
