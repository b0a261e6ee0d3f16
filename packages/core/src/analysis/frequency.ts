import { dimensions } from '../quantity/dimension.ts';
import { requireRange } from '../quantity/guard.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';

/** A frequency: a text with its unit (`'1 kHz'`), or a bare number, which means hertz. */
export type Frequency = string | number;

/**
 * A frequency in hertz.
 *
 * @throws TailpairError of the quantity family for a text that is no frequency, `value-range` for a
 * frequency that is not above 0 Hz.
 */
export function hertz(input: Frequency, where: string): number {
  const frequency = parseQuantity(input, dimensions.frequency, { where, bare: true });
  return requireRange(frequency, { where, above: 0, unit: 'Hz' });
}
