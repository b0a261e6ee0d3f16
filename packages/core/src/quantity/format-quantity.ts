import { type Dimension, dimensions, formatDimension, sameDimension } from './dimension.ts';
import { prefixes, readUnit } from './unit.ts';

/** One symbol per power of ten: of the three ways to write micro the micro sign. */
const symbols: ReadonlyMap<number, string> = new Map([
  [0, ''],
  ...[...prefixes]
    .filter(([symbol]) => symbol !== 'u' && symbol !== '\u03bc')
    .map(([symbol, exponent]) => [exponent, symbol] as const),
]);

function usualUnit(want: Dimension, value: number): string {
  if (sameDimension(want, dimensions.ratio)) return '';
  if (sameDimension(want, dimensions.perKelvin)) return 'ppm/K';
  // Below 0 K the value can only be a difference, and no °C would be read back.
  if (sameDimension(want, dimensions.temperature)) return value < 0 ? 'K' : '°C';
  return formatDimension(want);
}

/**
 * A value in text: `120 kΩ`, `-12 V`, `25 °C`, `3300 ppm/K`, `0 V`. `parseQuantity` reads it back.
 *
 * @param value in SI base units; temperatures in kelvin. What is not finite is written in words
 * @param want the dimension, or a unit to be used as it stands: `mV`, `%`, `K` (for a temperature
 *   difference); units without a prefix get one. Any other word (`dB`, `samples`) is put after the
 *   value unchanged
 * @param digits significant digits, 1 … 15; zeros at the end are left out
 */
export function formatQuantity(value: number, want: Dimension | string, digits = 4): string {
  if (Number.isNaN(value)) return 'not a number';
  if (!Number.isFinite(value)) return value > 0 ? 'infinity' : 'minus infinity';
  const symbol = typeof want === 'string' ? want : usualUnit(want, value);
  const unit = readUnit(symbol);
  const shown = unit ? (value - unit.offset) / unit.scale : value;
  // Rounded first, so that 999.96 V is 1 kV and not 1000 V.
  const [mantissa, power] = shown.toExponential(digits - 1).split('e') as [string, string];
  const exponent = Number(power) - (unit?.exponent ?? 0);
  const engineering = unit?.prefixable ? Math.floor(exponent / 3) * 3 : 0;
  // Nobody counts kiloseconds.
  const wanted = symbol === 's' ? Math.min(engineering, 0) : engineering;
  const prefix = symbols.get(wanted);
  if (prefix === undefined) return `${Number(mantissa)}e${exponent} ${symbol}`;
  const number = String(Number(`${mantissa}e${exponent - wanted}`)).replace('e+', 'e');
  return `${number} ${prefix}${symbol}`.trimEnd();
}
