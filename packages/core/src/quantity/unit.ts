import { zeroCelsius } from './constants.ts';
import { type Dimension, dimensions, overDimension } from './dimension.ts';

/**
 * A unit as a text may carry it. The SI value of a number n in it is
 * n · 10^exponent · scale + offset; the power of ten is kept apart so that it can join the decimal
 * text of n and the value comes out correctly rounded.
 */
export interface Unit {
  readonly dimension: Dimension;
  readonly exponent: number;
  readonly scale: number;
  readonly offset: number;
  /** Whether a prefix may be put before it. */
  readonly prefixable: boolean;
}

const withPrefix = (dimension: Dimension): Unit => ({
  dimension,
  exponent: 0,
  scale: 1,
  offset: 0,
  prefixable: true,
});

const fixed = (dimension: Dimension, conversion: Partial<Unit> = {}): Unit => ({
  ...withPrefix(dimension),
  prefixable: false,
  ...conversion,
});

const ohm = withPrefix(dimensions.resistance);

/** Micro sign and Greek mu, Greek omega and ohm sign look alike: both of each are read. */
const units: ReadonlyMap<string, Unit> = new Map([
  ['V', withPrefix(dimensions.voltage)],
  ['A', withPrefix(dimensions.current)],
  ['\u03a9', ohm],
  ['\u2126', ohm],
  ['ohm', ohm],
  ['Ohm', ohm],
  ['ohms', ohm],
  ['F', withPrefix(dimensions.capacitance)],
  ['S', withPrefix(dimensions.conductance)],
  ['W', withPrefix(dimensions.power)],
  ['Hz', withPrefix(dimensions.frequency)],
  ['s', withPrefix(dimensions.time)],
  ['min', fixed(dimensions.time, { scale: 60 })],
  ['h', fixed(dimensions.time, { scale: 3600 })],
  ['K', fixed(dimensions.temperature)],
  ['°C', fixed(dimensions.temperature, { offset: zeroCelsius })],
  ['%', fixed(dimensions.ratio, { exponent: -2 })],
  ['ppm', fixed(dimensions.ratio, { exponent: -6 })],
  ['', fixed(dimensions.ratio)],
]);

/** The SI prefixes that are read, with their power of ten. */
export const prefixes: ReadonlyMap<string, number> = new Map([
  ['f', -15],
  ['p', -12],
  ['n', -9],
  ['u', -6],
  ['\u00b5', -6],
  ['\u03bc', -6],
  ['m', -3],
  ['k', 3],
  ['M', 6],
  ['G', 9],
  ['T', 12],
]);

function readTerm(term: string): Unit | undefined {
  const plain = units.get(term);
  if (plain) return plain;
  const exponent = prefixes.get(term.charAt(0));
  const base = units.get(term.slice(1));
  if (exponent === undefined || !base?.prefixable) return undefined;
  return { ...base, exponent, prefixable: false };
}

/**
 * Reads a unit: `V`, `kΩ`, `%`, `kHz/V`, `ppm/K`, `/K`; no text is the unit of a bare number. Below a stroke a degree Celsius is a
 * difference and means a kelvin.
 *
 * @returns undefined where the text is no unit
 */
export function readUnit(text: string): Unit | undefined {
  const [first = '', ...below] = text.split('/').map((term) => term.trim());
  let unit = readTerm(first);
  for (const term of below) {
    const divisor = readTerm(term);
    if (!unit || !divisor || term === '') return undefined;
    unit = {
      dimension: overDimension(unit.dimension, divisor.dimension),
      exponent: unit.exponent - divisor.exponent,
      scale: unit.scale / divisor.scale,
      offset: 0,
      prefixable: unit.prefixable,
    };
  }
  return unit;
}
