import { type Dimension, dimensions, formatDimension, sameDimension } from './dimension.ts';

const descriptions: readonly (readonly [Dimension, string])[] = [
  [dimensions.ratio, 'a plain number or a share such as 0.5 or 50 %'],
  [dimensions.voltage, 'a voltage in V such as 10 mV'],
  [dimensions.current, 'a current in A such as 1 mA'],
  [dimensions.time, 'a time in s such as 20 ms'],
  [dimensions.temperature, 'a temperature in °C or K such as 25 °C'],
  [dimensions.frequency, 'a frequency in Hz such as 1.5 kHz'],
  [dimensions.resistance, 'a resistance in Ω such as 120 kΩ or 4k7'],
  [dimensions.conductance, 'a conductance in S such as 2 mS'],
  [dimensions.capacitance, 'a capacitance in F such as 1 nF'],
  [dimensions.power, 'a power in W such as 250 mW'],
  [dimensions.frequencyPerVolt, 'a frequency per voltage in Hz/V such as 100 Hz/V'],
  [dimensions.perKelvin, 'a temperature coefficient in 1/K such as 100 ppm/K'],
];

/** What a place asks for, with its unit and an example: `a voltage in V such as 10 mV`. */
export function describeDimension(want: Dimension): string {
  const known = descriptions.find(([dimension]) => sameDimension(dimension, want));
  if (known) return known[1];
  const unit = formatDimension(want);
  return `a quantity in ${unit} such as 1 ${unit}`;
}
