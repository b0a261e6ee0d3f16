import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { durationOf, type Trace } from '../trace/trace.ts';

/**
 * Smallest spacing of two lines that a record tells apart well, Hz: two periods of their beat must fit.
 * From there on the lines are nearly orthogonal; well below it a fit magnifies whatever it does not know.
 */
export function resolutionOf(trace: Trace): number {
  // Rounding in a length of exactly two periods must not refuse it.
  return (2 / durationOf(trace)) * (1 - 1e-9);
}

/** Whether two frequencies (Hz) differ by rounding only: they were computed to be the same. */
export function coincide(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b));
}

/**
 * Refuses frequencies (Hz) that a record cannot tell apart from each other, from DC, or from their own
 * image about half the rate.
 *
 * @throws TailpairError `value-range` for a frequency at or above half the rate, `record-invalid` for one
 * given twice, `record-short` where the record is too short, saying the length needed.
 */
export function requireResolved(trace: Trace, frequencies: readonly number[], where: string): void {
  const half = trace.rate / 2;
  const resolution = resolutionOf(trace);
  const sorted = Float64Array.from(frequencies).sort();
  let below = 0;
  for (const frequency of sorted) {
    if (frequency >= half) {
      throw new TailpairError(
        'value-range',
        `${show(frequency, 'Hz')} is not below half the rate of ${trace.name}, ${show(half, 'Hz')}; measure lower lines or record at a higher rate`,
        { where },
      );
    }
    if (coincide(frequency, below)) {
      throw new TailpairError(
        'record-invalid',
        `two lines fall on ${show(frequency, 'Hz')}; a record cannot tell them apart`,
        { where },
      );
    }
    requireSpacing(frequency - below, below === 0 ? 'DC' : `${show(below, 'Hz')}`, frequency);
    requireSpacing(2 * (half - frequency), 'its image about half the rate', frequency);
    below = frequency;
  }

  function requireSpacing(spacing: number, neighbour: string, frequency: number): void {
    if (spacing >= resolution) return;
    throw new TailpairError(
      'record-short',
      `${show(durationOf(trace), 's')} of ${trace.name} are too short to tell ${show(frequency, 'Hz')} from ${neighbour}; record at least ${show(2 / spacing, 's')}`,
      { where },
    );
  }
}

function show(value: number, unit: string): string {
  return formatQuantity(value, unit, 6);
}
