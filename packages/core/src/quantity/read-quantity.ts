import type { Dimension } from './dimension.ts';
import { TailpairError } from './error.ts';
import { quoted, type SplitQuantity, splitQuantity } from './split-quantity.ts';
import { readUnit, type Unit } from './unit.ts';

/** A value in SI base units and what it measures. */
export interface Quantity {
  readonly value: number;
  readonly dimension: Dimension;
}

/**
 * SI value of a number in a unit, correctly rounded: prefix and number become one decimal.
 *
 * @throws TailpairError `quantity-text` where it exceeds what a number can hold, `value-range`
 *   below absolute zero
 */
export function valueIn(
  unit: Unit,
  { mantissa, exponent, unit: symbol }: SplitQuantity,
  where?: string,
): number {
  const value = Number(`${mantissa}e${exponent + unit.exponent}`) * unit.scale + unit.offset;
  if (!Number.isFinite(value)) {
    const given = `${mantissa}e${exponent} ${symbol}`.trim();
    throw new TailpairError('quantity-text', `${given} is too large to compute with`, { where });
  }
  if (unit.offset > 0 && value < 0) {
    const message = `${mantissa} ${symbol} is below absolute zero; the lowest is -273.15 °C`;
    throw new TailpairError('value-range', message, { where });
  }
  return value;
}

/**
 * Reads a value that carries its own unit, whatever it measures; a bare number is a ratio.
 *
 * @throws TailpairError `quantity-text` where there is no number to read, `quantity-unit` where the
 *   unit is none, and as {@link valueIn}
 */
export function readQuantity(text: string, where?: string): Quantity {
  const split = splitQuantity(text, where);
  const unit = readUnit(split.unit);
  if (unit) return { value: valueIn(unit, split, where), dimension: unit.dimension };
  throw new TailpairError(
    'quantity-unit',
    `${quoted(text)}: ${quoted(split.unit)} is no unit; write it in full, such as 10 mV, 120 kΩ or 50 %`,
    { where },
  );
}
