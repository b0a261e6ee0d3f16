/** A recorded probe: evenly spaced samples of one port, in volts or amperes. */
export interface Trace {
  /** The probe: `block.port`. */
  readonly name: string;
  /** Unit of the samples. */
  readonly unit: 'V' | 'A';
  /** Samples per second, Hz. */
  readonly rate: number;
  /** Time of the first sample on the clock of the run, s. */
  readonly start: number;
  /** The recorded values; sample `i` belongs to the time `start + i / rate`. */
  readonly samples: Float64Array;
}

/** Length of a trace in seconds: the number of its samples over its rate. */
export function durationOf(trace: Trace): number {
  return trace.samples.length / trace.rate;
}
