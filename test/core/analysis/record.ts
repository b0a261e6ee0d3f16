import type { Trace } from '../../../packages/core/src/trace/trace.ts';

/** How a test record is taken. */
export interface RecordOptions {
  readonly rate?: number;
  readonly length?: number;
  readonly start?: number;
}

/** Takes a record in volts of a function of time (s). One second at 48 kHz unless told otherwise. */
export function record(of: (time: number) => number, options: RecordOptions = {}): Trace {
  const { rate = 48_000, length = rate, start = 0 } = options;
  return {
    name: 'load.out',
    unit: 'V',
    rate,
    start,
    samples: Float64Array.from({ length }, (_, i) => of(start + i / rate)),
  };
}

/** 2π·frequency·time, less whole turns taken off before π comes in: keeps a sine exact far from time 0. */
export function turn(frequency: number, time: number): number {
  return 2 * Math.PI * ((frequency * time) % 1);
}
