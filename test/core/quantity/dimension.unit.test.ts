import { describe, expect, test } from 'vitest';
import {
  type Dimension,
  dimensions,
  formatDimension,
  isRatio,
  overDimension,
  powerDimension,
  sameDimension,
  timesDimension,
} from '../../../packages/core/src/quantity/dimension.ts';

const { ratio, voltage, current, time, resistance, conductance, capacitance, power, frequency } = dimensions;

describe('dimensions', () => {
  // The defining relations of the derived units (BIPM, The International System of Units, 9th ed., 2019).
  test.each<[string, Dimension, Dimension]>([
    ['Ω = V/A', overDimension(voltage, current), resistance],
    ['S = 1/Ω', overDimension(ratio, resistance), conductance],
    ['F = A·s/V', overDimension(timesDimension(current, time), voltage), capacitance],
    ['W = V·A', timesDimension(voltage, current), power],
    ['W = V²/Ω', overDimension(powerDimension(voltage, 2), resistance), power],
    ['Hz = 1/s', powerDimension(time, -1), frequency],
    ['s = Ω·F', timesDimension(resistance, capacitance), time],
  ])('%s', (_law, derived, named) => {
    expect(sameDimension(derived, named)).toBe(true);
  });

  test('a square root halves the exponents', () => {
    expect(sameDimension(powerDimension(powerDimension(voltage, 2), 0.5), voltage)).toBe(true);
  });

  test('only a bare number is a ratio', () => {
    expect(isRatio(overDimension(voltage, voltage))).toBe(true);
    expect(isRatio(voltage)).toBe(false);
  });

  test.each<[Dimension, string]>([
    [ratio, '1'],
    [resistance, 'Ω'],
    [dimensions.perKelvin, '1/K'],
    [overDimension(voltage, time), 'V/s'],
    [overDimension(voltage, powerDimension(current, 2)), 'V·A⁻²'],
    [powerDimension(voltage, 0.5), 'V⁰·⁵'],
  ])('%o is written %s', (dimension, text) => {
    expect(formatDimension(dimension)).toBe(text);
  });
});
