import { hermiteSlope, hermiteValue } from './hermite.ts';
import type { KernelContext } from './kernel.ts';

/** Inputs and their slopes at an instant. */
export class Point {
  readonly u: Float64Array;
  readonly s: Float64Array;
  /** Time in seconds. */
  t = 0;

  constructor(inputs: number) {
    this.u = new Float64Array(inputs);
    this.s = new Float64Array(inputs);
  }

  /** Takes over another point. */
  copy({ u, s, t }: Point): void {
    this.u.set(u);
    this.s.set(s);
    this.t = t;
  }
}

/** Puts `point` at sample `n` of the buffers. A slope that is not carried reads as zero. */
export function readSample({ ports, clock }: KernelContext, n: number, point: Point): void {
  for (let i = 0; i < point.u.length; i++) {
    point.u[i] = ports.inputs[i]![n]!;
    point.s[i] = ports.inputSlopes[i]![n] ?? 0;
  }
  point.t = (clock.base + n) * clock.period;
}

/**
 * Puts `point` inside the cell that ends at sample `n`, at a fraction of it: every input is the
 * cubic through its two samples that carries its slopes.
 */
export function readInside(context: KernelContext, n: number, at: number, point: Point): void {
  if (at === 1) {
    readSample(context, n, point);
    return;
  }
  const { ports, clock } = context;
  const h = clock.period;
  for (let i = 0; i < point.u.length; i++) {
    const values = ports.inputs[i]!;
    const slopes = ports.inputSlopes[i]!;
    const da = h * (slopes[n - 1] ?? 0);
    const db = h * (slopes[n] ?? 0);
    point.u[i] = hermiteValue(values[n - 1]!, values[n]!, da, db, at);
    point.s[i] = hermiteSlope(values[n - 1]!, values[n]!, da, db, at) / h;
  }
  point.t = (clock.base + n - 1 + at) * h;
}
