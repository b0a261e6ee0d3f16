import type { Dimension } from './dimension.ts';
import { TailpairError } from './error.ts';
import { parseQuantity } from './parse-quantity.ts';
import { quoted } from './split-quantity.ts';

/** The value of a part, with its tolerance where one is given. */
export interface PartValue {
  /** In SI base units. */
  readonly value: number;
  /** Half-width of the tolerance as a ratio of the value: 0.01 is ±1 %. */
  readonly tolerance?: number;
}

const toleranceAtEnd = /^(\S.*?)(?:\s+|\s*(?:±|\+\/-)\s*)(\d+\.?\d*|\.\d+)\s*%$/s;

/**
 * Reads a part as a parts list writes it: `120k`, `120k 1%`, `10 nF ±5 %`. Tolerance letters are
 * not read, as on a resistor `M` and `K` would be both multiplier and tolerance.
 *
 * @param input the text, or a number where the dimension allows bare numbers
 * @throws TailpairError as {@link parseQuantity}, and `value-range` for a tolerance of 100 % or more
 */
export function parsePart(input: string | number, want: Dimension, where?: string): PartValue {
  const match = typeof input === 'string' && input.length < 128 ? toleranceAtEnd.exec(input.trim()) : null;
  if (!match) return { value: parseQuantity(input, want, { where }) };
  const [, value = '', percent = ''] = match;
  const tolerance = Number(`${percent}e-2`);
  if (!(tolerance < 1)) {
    const message = `the tolerance in ${quoted(String(input))} must be below 100 %; write one such as ${value} 1 %`;
    throw new TailpairError('value-range', message, { where });
  }
  return { value: parseQuantity(value, want, { where }), tolerance };
}
