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
  point.t = (clock.base + n) / clock.rate;
}
