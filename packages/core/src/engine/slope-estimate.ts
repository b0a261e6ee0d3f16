/**
 * Slope of a signal whose block does not state one (a plain kernel): the backward difference of
 * second order, (3x₀ − 4x₁ + x₂)/2h, which needs no sample from the future.
 */
export class SlopeEstimate {
  private readonly values: Float64Array;
  private readonly slopes: Float64Array;
  private readonly period: number;
  /** The sample before slot 0. */
  private before = 0;

  constructor(values: Float64Array, slopes: Float64Array, period: number) {
    this.values = values;
    this.slopes = slopes;
    this.period = period;
  }

  /** The first sample has no past: it is taken as at rest. */
  start(n: number): void {
    this.slopes[n] = 0;
    this.before = this.values[n]!;
  }

  run(from: number, to: number): void {
    const { values, slopes, period } = this;
    for (let n = from; n < to; n++) {
      const last = values[n - 1]!;
      slopes[n] = (3 * values[n]! - 4 * last + this.before) / (2 * period);
      this.before = last;
    }
  }
}
