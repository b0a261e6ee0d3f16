import { solveDense } from '../../numeric/solve-dense.ts';

/** Right-hand sides and jacobian of a group, with its states set to `own` among all states. */
export type GroupField = (
  point: 0 | 1 | 2,
  own: Float64Array,
  f: Float64Array,
  jacobian: Float64Array,
) => void;

const mostSteps = 25;
/** A step below this share of the value leaves its square as error: under the last bit. */
const closeEnough = 1e-8;
/** Floor of the value the step is compared with, in base units: a picovolt, a picoampere. */
const smallest = 1e-12;

/**
 * One step of a group of coupled states by an implicit rule of fourth order with the points
 * 0, ½, 1 of the interval, solved by Newton's method with the exact jacobian.
 *
 * `smooth` is the three-stage Lobatto IIIA rule; `damped` is Lobatto IIIC, which also damps
 * what is much faster than the step (L-stable). Both: E. Hairer, G. Wanner, "Solving Ordinary
 * Differential Equations II", 2nd ed., 1996, section IV.5, doi:10.1007/978-3-642-05221-7.
 */
export class ImplicitStep {
  private readonly size: number;
  private readonly f: readonly Float64Array[];
  private readonly jacobian: readonly Float64Array[];
  private readonly stage: readonly Float64Array[];
  private readonly matrix: Float64Array;
  private readonly residual: Float64Array;
  /** Size against which the last digits of each state are judged. */
  private readonly scale: Float64Array;

  constructor(size: number) {
    const three = (length: number): Float64Array[] => [0, 1, 2].map(() => new Float64Array(length));
    this.size = size;
    this.f = three(size);
    this.jacobian = three(size * size);
    this.stage = three(size);
    this.matrix = new Float64Array(9 * size * size);
    this.residual = new Float64Array(3 * size);
    this.scale = new Float64Array(size);
  }

  /**
   * Steps `start` over `length` seconds into `end`.
   *
   * @returns length times the largest norm of the jacobian met: how stiff the step was;
   *   infinite where Newton's method did not settle
   */
  smooth(field: GroupField, start: Float64Array, length: number, end: Float64Array): number {
    const { size, residual, matrix } = this;
    const [f0, fm, f1] = this.f as [Float64Array, Float64Array, Float64Array];
    const [j0, jm, j1] = this.jacobian as [Float64Array, Float64Array, Float64Array];
    const middle = this.stage[1]!;
    field(0, start, f0, j0);
    this.measure(start, f0, length);
    for (let i = 0; i < size; i++) end[i] = start[i]! + length * f0[i]!;
    for (let count = 0; count < mostSteps; count++) {
      field(2, end, f1, j1);
      for (let i = 0; i < size; i++)
        middle[i] = 0.5 * (start[i]! + end[i]!) + (length / 8) * (f0[i]! - f1[i]!);
      field(1, middle, fm, jm);
      for (let i = 0; i < size; i++) {
        residual[i] = end[i]! - start[i]! - (length / 6) * (f0[i]! + 4 * fm[i]! + f1[i]!);
        for (let j = 0; j < size; j++) {
          let through = 0;
          for (let k = 0; k < size; k++) through += jm[i * size + k]! * j1[k * size + j]!;
          const own = i === j ? 1 : 0;
          const sum = 2 * jm[i * size + j]! - (length / 2) * through + j1[i * size + j]!;
          matrix[i * size + j] = own - (length / 6) * sum;
        }
      }
      if (!solveDense(matrix, residual, size)) return Number.POSITIVE_INFINITY;
      if (this.correct(end, 0)) return length * Math.max(this.norm(j0), this.norm(jm), this.norm(j1));
    }
    return Number.POSITIVE_INFINITY;
  }

  /** The same step by the damped rule, for groups much faster than the step; `true` if it settled. */
  damped(field: GroupField, start: Float64Array, length: number, end: Float64Array): boolean {
    const { size, residual, matrix, stage } = this;
    const width = 3 * size;
    for (const y of stage) y.set(start);
    field(0, start, this.f[0]!, this.jacobian[0]!);
    this.measure(start, this.f[0]!, 0);
    for (let count = 0; count < 2 * mostSteps; count++) {
      stage.forEach((y, s) => field(s as 0 | 1 | 2, y, this.f[s]!, this.jacobian[s]!));
      for (let s = 0; s < 3; s++) {
        for (let i = 0; i < size; i++) {
          const row = s * size + i;
          residual[row] = stage[s]![i]! - start[i]!;
          for (let r = 0; r < 3; r++) {
            const share = (length * dampedRule[s * 3 + r]!) / 12;
            residual[row]! -= share * this.f[r]![i]!;
            for (let j = 0; j < size; j++) {
              const own = row === r * size + j ? 1 : 0;
              matrix[row * width + r * size + j] = own - share * this.jacobian[r]![i * size + j]!;
            }
          }
        }
      }
      if (!solveDense(matrix, residual, width)) return false;
      let settled = true;
      for (let s = 0; s < 3; s++) settled = this.correct(stage[s]!, s * size) && settled;
      if (settled) {
        end.set(stage[2]!);
        return true;
      }
    }
    return false;
  }

  private measure(start: Float64Array, f: Float64Array, length: number): void {
    for (let i = 0; i < this.size; i++) {
      this.scale[i] = Math.max(Math.abs(start[i]!), Math.abs(length * f[i]!), smallest);
    }
  }

  /** Takes the Newton step from `values`; whether it was too small to matter. */
  private correct(values: Float64Array, offset: number): boolean {
    let settled = true;
    for (let i = 0; i < this.size; i++) {
      const step = this.residual[offset + i]!;
      values[i]! -= step;
      if (!(Math.abs(step) <= closeEnough * Math.max(Math.abs(values[i]!), this.scale[i]!))) settled = false;
    }
    return settled;
  }

  private norm(matrix: Float64Array): number {
    let largest = 0;
    for (let i = 0; i < this.size; i++) {
      let row = 0;
      for (let j = 0; j < this.size; j++) row += Math.abs(matrix[i * this.size + j]!);
      largest = Math.max(largest, row);
    }
    return largest;
  }
}

/** Twelve times the coefficients of Lobatto IIIC with three stages. */
const dampedRule: readonly number[] = [2, -4, 2, 2, 5, -1, 2, 8, 2];
