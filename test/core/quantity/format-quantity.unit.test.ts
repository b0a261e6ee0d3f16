import { describe, expect, test } from 'vitest';
import {
  type Dimension,
  dimensions,
  overDimension,
  powerDimension,
} from '../../../packages/core/src/quantity/dimension.ts';
import { formatQuantity } from '../../../packages/core/src/quantity/format-quantity.ts';

const { ratio, voltage, current, time, temperature, frequency, resistance, capacitance } = dimensions;

describe('formatQuantity', () => {
  test.each<[number, Dimension | string, string]>([
    [120e3, resistance, '120 kΩ'],
    [-12, voltage, '-12 V'],
    [0, voltage, '0 V'],
    [-0, voltage, '0 V'],
    [4.7e-6, capacitance, '4.7 \u00b5F'],
    [0.33e-12, capacitance, '330 fF'],
    [1e-14, current, '10 fA'],
    [189.04321e-6, current, '189 \u00b5A'],
    [999.96, voltage, '1 kV'],
    [0.0009999949, voltage, '1 mV'],
    [1e20, voltage, '1e20 V'],
    [-3e-20, current, '-3e-20 A'],
    [5400, time, '5400 s'],
    [0.02, time, '20 ms'],
    [298.15, temperature, '25 °C'],
    [0, temperature, '-273.1 °C'],
    [-5, temperature, '-5 K'],
    [1 / 3, ratio, '0.3333'],
    [1e-9, ratio, '1e-9'],
    [2.5e30, ratio, '2.5e30'],
    [0.0033, dimensions.perKelvin, '3300 ppm/K'],
    [1500, dimensions.frequencyPerVolt, '1.5 kHz/V'],
    [500e3, overDimension(voltage, time), '500 kV/s'],
    [1000, overDimension(voltage, powerDimension(current, 2)), '1000 V·A⁻²'],
    [0.012, 'mV', '12 mV'],
    [12e-6, 'mV', '0.012 mV'],
    [0.5, '%', '50 %'],
    [0, '%', '0 %'],
    [90, 'min', '1.5 min'],
    [5, 'K', '5 K'],
    [-40.25, 'dB', '-40.25 dB'],
    [96000, 'samples', '96000 samples'],
    [1500, 'Hz', '1.5 kHz'],
    [12, '', '12'],
    [Number.NaN, voltage, 'not a number'],
    [Number.POSITIVE_INFINITY, frequency, 'infinity'],
    [Number.NEGATIVE_INFINITY, voltage, 'minus infinity'],
  ])('writes %d in %o as %s', (value, want, text) => {
    expect(formatQuantity(value, want)).toBe(text);
  });

  test('rounds to the digits asked for', () => {
    expect(formatQuantity(1.23456789, voltage, 7)).toBe('1.234568 V');
    expect(formatQuantity(1.23456789, voltage, 1)).toBe('1 V');
  });
});
