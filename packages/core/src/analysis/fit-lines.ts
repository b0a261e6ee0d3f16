import { TailpairError } from '../quantity/error.ts';
import type { Trace } from '../trace/trace.ts';
import { finiteRecord } from './finite-record.ts';
import { requireResolved } from './record-resolution.ts';
import { projectTones, type ToneProjection } from './tone-projection.ts';

/** One sinusoid of a fit: amplitude·sin(2π·frequency·t + phase), t on the clock of the run. */
export interface Tone {
  /** Hz. */
  readonly frequency: number;
  /** Peak, in the unit of the trace; never negative. */
  readonly amplitude: number;
  /** Phase of the sine at t = 0, rad, −π … π. */
  readonly phase: number;
}

/** Tones fitted on behalf of a measurement, and the projection they come from. */
export interface FittedLines {
  /** One per frequency, in the order asked for. */
  readonly tones: readonly Tone[];
  readonly projection: ToneProjection;
}

/** Fits frequencies (Hz) for the measurement `where`, whose name stands in messages; throws as `fitTones` does. */
export function fitLines(trace: Trace, frequencies: readonly number[], where: string): FittedLines {
  const samples = finiteRecord(trace, where);
  requireResolved(trace, frequencies, where);
  const projection = projectTones(samples, trace.rate, frequencies);
  if (projection === undefined) {
    const message = `the lines of ${trace.name} cannot be told apart; measure fewer or record longer`;
    throw new TailpairError('record-invalid', message, { where });
  }
  const middle = trace.start + (samples.length - 1) / 2 / trace.rate;
  const tones = frequencies.map((frequency, i): Tone => {
    const cos = projection.cos[i]!;
    const sin = projection.sin[i]!;
    const phase = phaseAtZero(Math.atan2(cos, sin), frequency, middle);
    return { frequency, amplitude: Math.hypot(cos, sin), phase };
  });
  return { tones, projection };
}

function phaseAtZero(phase: number, frequency: number, time: number): number {
  const turns = phase / (2 * Math.PI) - ((frequency * time) % 1);
  return 2 * Math.PI * (turns - Math.round(turns));
}
