import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { requireWhole } from '../quantity/guard.ts';
import type { Trace } from '../trace/trace.ts';
import { accompany } from './accompany.ts';
import { decibels } from './decibels.ts';
import { fitLines } from './fit-lines.ts';
import { type Frequency, hertz } from './frequency.ts';
import { peak } from './peak.ts';

/** What to measure harmonics of. */
export interface HarmonicsOptions {
  /** The fundamental: a text with its unit, or a bare number in hertz. */
  readonly fundamental: Frequency;
  /** Highest order measured; 9 unless given. It must lie below half the rate. */
  readonly highest?: number;
}

/** One harmonic. */
export interface Harmonic {
  /** Multiple of the fundamental; 1 is the fundamental itself. */
  readonly order: number;
  /** Hz. */
  readonly frequency: number;
  /** Peak, in the unit of the trace. */
  readonly amplitude: number;
  /** Level relative to the fundamental, dB; −∞ where there is nothing. */
  readonly dBc: number;
  /** Phase of its sine at t = 0 of the run, rad, −π … π. */
  readonly phase: number;
}

/** Harmonics beyond those asked for that are considered, so that they bias nothing. */
const spareHarmonics = 256;

/** Share of the peak below which a fitted tone is rounding and nothing else. */
const rounding = 1e-12;

/**
 * Table of the harmonics of a trace, from the fundamental up to the order asked for. Harmonics above
 * that order are fitted along with them, so that they bias nothing on a record of no whole number of
 * periods; lines that are no harmonics are not.
 *
 * @throws TailpairError `value-range` where the highest order is no whole number above 0 or lies at or above
 * half the rate, `record-short` for less than two periods, `record-invalid` where there is no fundamental.
 * @example console.table(harmonics(load.out, { fundamental: '110 Hz', highest: 5 }))
 */
export function harmonics(trace: Trace, options: HarmonicsOptions): readonly Harmonic[] {
  const where = 'harmonics';
  const { highest = 9 } = options;
  const fundamental = hertz(options.fundamental, `${where}.fundamental`);
  const below = Math.ceil(trace.rate / 2 / fundamental) - 1;
  const cure = `orders above ${below} lie at or above half the rate`;
  requireWhole(highest, { where: `${where}.highest`, min: 1, max: below, cure });
  const count = Math.min(below, highest + spareHarmonics);
  const multiples = Array.from({ length: count }, (_, index) => (index + 1) * fundamental);
  const lines = accompany(trace, multiples.slice(0, highest), multiples.slice(highest));
  const { tones } = fitLines(trace, lines, where);
  const reference = tones[0]!.amplitude;
  if (!(reference > rounding * peak(trace))) {
    throw new TailpairError(
      'record-invalid',
      `${trace.name} has nothing at the fundamental, ${formatQuantity(fundamental, 'Hz')}; look at its frequency and level`,
      { where },
    );
  }
  return tones.slice(0, highest).map(({ frequency, amplitude, phase }, index): Harmonic => {
    return { order: index + 1, frequency, amplitude, dBc: decibels(amplitude / reference), phase };
  });
}
