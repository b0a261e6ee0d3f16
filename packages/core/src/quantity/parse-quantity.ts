import { describeDimension } from './describe-dimension.ts';
import { type Dimension, dimensions, formatDimension, isRatio, sameDimension } from './dimension.ts';
import { TailpairError } from './error.ts';
import { formatQuantity } from './format-quantity.ts';
import { valueIn } from './read-quantity.ts';
import { quoted, type SplitQuantity, splitQuantity } from './split-quantity.ts';
import { prefixes, readUnit } from './unit.ts';

/** How a value may be given. */
export interface ParseOptions {
  /** The place of the value, for error messages. */
  readonly where?: string | undefined;
  /** Whether a number without a unit is taken to be in the SI unit. Default: only ratios and resistances are. */
  readonly bare?: boolean;
}

/** Letters that stand for prefix and unit together on parts (IEC 60062:2016, from memory). */
const resistanceLetters = 'RkKMGT';
const capacitanceLetters = 'pnu\u00b5\u03bcm';

/** The unit a text means, where a part's letter code leaves it out. */
function fullUnit(unit: string, want: Dimension): string {
  if (unit.length !== 1) return unit;
  if (sameDimension(want, dimensions.resistance) && resistanceLetters.includes(unit)) {
    return `${unit.replace('R', '').replace('K', 'k')}Ω`;
  }
  if (sameDimension(want, dimensions.capacitance) && capacitanceLetters.includes(unit)) return `${unit}F`;
  return unit;
}

/** What may be meant by a prefix nobody is likely to mean there. Mega and milli are never guessed. */
function likelier(prefix: string, want: Dimension): readonly string[] {
  if (sameDimension(want, dimensions.resistance)) return prefix === 'm' ? ['M'] : [];
  return prefix === 'M' && !sameDimension(want, dimensions.frequency) ? ['m', '\u00b5'] : [];
}

/** The cure for a prefix that stands alone. */
function complete({ mantissa, exponent, unit: prefix }: SplitQuantity, want: Dimension): string {
  const symbol = formatDimension(want);
  const number = exponent === 0 ? mantissa : `${mantissa}e${exponent}`;
  const [literal = '', ...others] = [prefix, ...likelier(prefix, want)].map(
    (it) => `${number} ${it}${symbol}`,
  );
  if (others.length === 0) return `write ${literal}`;
  const value = Number(`${mantissa}e${exponent + prefixes.get(prefix)!}`);
  return `${literal} is ${value} ${symbol}; did you mean ${others.join(' or ')}?`;
}

function refusal(text: string, split: SplitQuantity, want: Dimension): string {
  const { unit } = split;
  const wanted = describeDimension(want);
  if (unit === '') return `${quoted(text)} lacks its unit; wanted is ${wanted}`;
  if (prefixes.has(unit) && readUnit(formatDimension(want))?.prefixable) {
    return `${quoted(text)} lacks its unit; ${complete(split, want)}`;
  }
  const verdict = readUnit(unit) ? 'does not fit' : 'is no unit';
  return `${quoted(text)}: ${quoted(unit)} ${verdict}; wanted is ${wanted}`;
}

/**
 * Reads a value with its unit: `120 kΩ`, `-12 V`, `25 °C`, `1e-3 V`, `50 %`, `3300 ppm/K`, and the
 * letter codes of parts: `4k7`, `0R1`, `2M2`, `4n7`, `4µ7F`. Resistances may leave the unit out
 * (`120k`), capacitances after a letter (`100n`).
 *
 * @param input the text, or a number in the SI unit where bare numbers are allowed
 * @param want the dimension the place asks for
 * @returns the value in SI base units; temperatures in kelvin
 * @throws TailpairError `quantity-text` where there is not one finite number to read,
 *   `quantity-unit` where the unit is missing or another, `value-range` below absolute zero,
 *   `value-kind` where the input is neither text nor number
 */
export function parseQuantity(input: string | number, want: Dimension, options: ParseOptions = {}): number {
  const { where, bare = isRatio(want) || sameDimension(want, dimensions.resistance) } = options;
  const wrongUnit = (message: string): TailpairError =>
    new TailpairError('quantity-unit', message, { where });
  if (typeof input === 'number') {
    if (!Number.isFinite(input)) {
      const message = `${formatQuantity(input, want)} is no value; wanted is ${describeDimension(want)}`;
      throw new TailpairError('quantity-text', message, { where });
    }
    if (bare) return input;
    throw wrongUnit(`${input} lacks its unit; wanted is ${describeDimension(want)}`);
  }
  if (typeof input !== 'string') {
    const message = `got ${input === null ? 'null' : typeof input}; wanted is ${describeDimension(want)}`;
    throw new TailpairError('value-kind', message, { where });
  }
  const split = splitQuantity(input, where);
  if (split.unit === '' && bare) return valueIn(readUnit('')!, split, where);
  const unit = readUnit(fullUnit(split.unit, want));
  if (unit && sameDimension(unit.dimension, want) && split.unit !== '') return valueIn(unit, split, where);
  throw wrongUnit(refusal(input.trim(), split, want));
}
