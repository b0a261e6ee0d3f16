/**
 * A physical dimension as exponents of the four base units the library works in. Volt and ampere
 * are the natural base of a circuit: resistance is V/A, capacitance A·s/V, power V·A.
 */
export interface Dimension {
  readonly volt: number;
  readonly ampere: number;
  readonly second: number;
  readonly kelvin: number;
}

const dimension = (volt: number, ampere: number, second: number, kelvin: number): Dimension => ({
  volt,
  ampere,
  second,
  kelvin,
});

/** Names of {@link dimensions}. */
export type DimensionName =
  | 'ratio'
  | 'voltage'
  | 'current'
  | 'time'
  | 'temperature'
  | 'frequency'
  | 'resistance'
  | 'conductance'
  | 'capacitance'
  | 'power'
  | 'frequencyPerVolt'
  | 'perKelvin';

/** The dimensions that have a name of their own. */
export const dimensions: Readonly<Record<DimensionName, Dimension>> = {
  ratio: dimension(0, 0, 0, 0),
  voltage: dimension(1, 0, 0, 0),
  current: dimension(0, 1, 0, 0),
  time: dimension(0, 0, 1, 0),
  temperature: dimension(0, 0, 0, 1),
  frequency: dimension(0, 0, -1, 0),
  resistance: dimension(1, -1, 0, 0),
  conductance: dimension(-1, 1, 0, 0),
  capacitance: dimension(-1, 1, 1, 0),
  power: dimension(1, 1, 0, 0),
  frequencyPerVolt: dimension(-1, 0, -1, 0),
  perKelvin: dimension(0, 0, 0, -1),
};

/** Whether two dimensions are the same. */
export function sameDimension(a: Dimension, b: Dimension): boolean {
  return a.volt === b.volt && a.ampere === b.ampere && a.second === b.second && a.kelvin === b.kelvin;
}

/** Whether a dimension is that of a bare number. */
export function isRatio(a: Dimension): boolean {
  return sameDimension(a, dimensions.ratio);
}

/** Dimension of a product. */
export function timesDimension(a: Dimension, b: Dimension): Dimension {
  return dimension(a.volt + b.volt, a.ampere + b.ampere, a.second + b.second, a.kelvin + b.kelvin);
}

/** Dimension of a quotient. */
export function overDimension(a: Dimension, b: Dimension): Dimension {
  return dimension(a.volt - b.volt, a.ampere - b.ampere, a.second - b.second, a.kelvin - b.kelvin);
}

/** Dimension of a power; `exponent` may be fractional (a square root is ½). */
export function powerDimension(a: Dimension, exponent: number): Dimension {
  return dimension(a.volt * exponent, a.ampere * exponent, a.second * exponent, a.kelvin * exponent);
}

const named: readonly (readonly [Dimension, string])[] = [
  [dimensions.ratio, '1'],
  [dimensions.voltage, 'V'],
  [dimensions.current, 'A'],
  [dimensions.time, 's'],
  [dimensions.temperature, 'K'],
  [dimensions.frequency, 'Hz'],
  [dimensions.resistance, 'Ω'],
  [dimensions.conductance, 'S'],
  [dimensions.capacitance, 'F'],
  [dimensions.power, 'W'],
  [dimensions.frequencyPerVolt, 'Hz/V'],
  [dimensions.perKelvin, '1/K'],
];

const superscripts: Readonly<Record<string, string>> = {
  '-': '⁻',
  '.': '·',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
};

/** The unit of a dimension in text: `V`, `Ω`, `V/s`, or base units with exponents (`V·A⁻²`). */
export function formatDimension(a: Dimension): string {
  for (const [known, symbol] of named) if (sameDimension(known, a)) return symbol;
  const perSecond = timesDimension(a, dimensions.time);
  for (const [known, symbol] of named) if (sameDimension(known, perSecond)) return `${symbol}/s`;
  const parts = (['volt', 'ampere', 'second', 'kelvin'] as const).flatMap((base, index) => {
    const exponent = a[base];
    if (exponent === 0) return [];
    const symbol = 'VAsK'[index] as string;
    if (exponent === 1) return [symbol];
    return [symbol + [...String(exponent)].map((digit) => superscripts[digit] ?? digit).join('')];
  });
  return parts.join('·');
}
