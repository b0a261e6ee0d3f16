import type { Dimension } from './dimension.ts';
import { TailpairError } from './error.ts';
import { formatQuantity } from './format-quantity.ts';

/** What a guard says about the place it guards. */
export interface Guard {
  /** The place: `block.parameter`, an option's name. */
  readonly where: string;
  /** Dimension or unit the value is shown with; none for counts. */
  readonly unit?: Dimension | string;
  /** What to do, where the allowed range does not say it already. */
  readonly cure?: string;
}

/** The range a value must keep, in SI base units: `min` and `max` belong to it, `above` and `below` do not. */
export interface Range extends Guard {
  readonly min?: number;
  readonly max?: number;
  readonly above?: number;
  readonly below?: number;
}

/** Enough digits to tell a value from the limit it passes by a little. */
const digits = 10;

function refuse(value: number, demand: string, { where, unit = '', cure }: Guard): TailpairError {
  const got = `must be ${demand}, got ${formatQuantity(value, unit, digits)}`;
  return new TailpairError('value-range', cure === undefined ? got : `${got}: ${cure}`, { where });
}

/**
 * Returns the value if it is a finite number.
 *
 * @throws TailpairError `value-range` where it is infinite or not a number, `value-kind` where it
 *   is something else (scripts without types)
 */
export function requireFinite(value: number, guard: Guard): number {
  if (typeof value !== 'number') {
    throw new TailpairError('value-kind', `must be a number, got ${typeof value}`, { where: guard.where });
  }
  if (!Number.isFinite(value)) throw refuse(value, 'finite', guard);
  return value;
}

/**
 * Returns the value if it is finite and within the range.
 *
 * @throws TailpairError as {@link requireFinite}, and `value-range` outside the range
 */
export function requireRange(value: number, range: Range): number {
  requireFinite(value, range);
  const { min = -Infinity, max = Infinity, above = -Infinity, below = Infinity, unit = '' } = range;
  if (value >= min && value <= max && value > above && value < below) return value;
  const demands = [
    ['at least', range.min],
    ['above', range.above],
    ['at most', range.max],
    ['below', range.below],
  ] as const;
  const demand = demands
    .filter(([, limit]) => limit !== undefined)
    .map(([word, limit]) => `${word} ${formatQuantity(limit as number, unit, digits)}`);
  throw refuse(value, demand.join(' and '), range);
}

/**
 * Returns the value if it is a whole number within the range.
 *
 * @throws TailpairError as {@link requireRange}, and `value-range` for a fraction
 */
export function requireWhole(value: number, range: Range): number {
  requireRange(value, range);
  if (!Number.isInteger(value)) throw refuse(value, 'a whole number', range);
  return value;
}
