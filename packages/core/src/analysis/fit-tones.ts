import type { Trace } from '../trace/trace.ts';
import { fitLines, type Tone } from './fit-lines.ts';
import { type Frequency, hertz } from './frequency.ts';
import { residualOf } from './tone-projection.ts';

/** Result of a fit of tones at known frequencies. */
export interface ToneFit {
  /** One per frequency, in the order asked for. */
  readonly tones: readonly Tone[];
  /** The constant part, in the unit of the trace. */
  readonly dc: number;
  /** Rms of what the fit leaves, in the unit of the trace. */
  readonly residual: number;
}

/**
 * Least-squares fit of a constant and of sinusoids at known frequencies over a whole record: the
 * three-parameter sine fit of IEEE Std 1057 (from memory) extended to many tones. The record need not
 * hold whole periods. What the record holds besides the tones biases them unless it does; list it too.
 *
 * On a record that holds nothing else the amplitudes are good to 1e-12 of the largest one.
 *
 * @param frequencies each above 0 Hz and below half the rate: texts with a unit, or bare numbers in hertz.
 * @throws TailpairError `record-short` where the record holds less than two periods of the smallest
 * spacing (also to DC and about half the rate), `value-range` for a frequency outside the band,
 * `record-invalid` for a frequency given twice or samples that are not finite.
 * @example fitTones(load.out, ['1 kHz', '3 kHz']).tones[1]?.amplitude
 */
export function fitTones(trace: Trace, frequencies: readonly Frequency[]): ToneFit {
  const where = 'fitTones';
  const lines = frequencies.map((frequency, index) => hertz(frequency, `${where}.frequencies[${index}]`));
  const { tones, projection } = fitLines(trace, lines, where);
  return { tones, dc: projection.constant, residual: residualOf(trace.samples, projection) };
}
