import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import {
  boltzmannConstant,
  elementaryCharge,
  thermalVoltage,
  zeroCelsius,
} from '../../../packages/core/src/quantity/constants.ts';

// test/reference/thermal-voltage/SOURCE.md. Each double operation rounds by at most 1.1e-16 and five
// at most are chained; a constant wrong in its last printed digit would show at 1e-10.
const relative = 1e-14;

const rows = readFileSync(
  new URL('../../reference/thermal-voltage/thermal-voltage.csv', import.meta.url),
  'utf8',
)
  .trim()
  .split('\n')
  .slice(1)
  .map((line) => line.split(',').map(Number) as [number, number, number, number, number, number, number]);

describe('constants', () => {
  test('are those of the SI (BIPM, The International System of Units, 9th ed., 2019; from memory)', () => {
    expect(boltzmannConstant).toBe(1.380649e-23);
    expect(elementaryCharge).toBe(1.602176634e-19);
    expect(zeroCelsius).toBe(273.15);
  });

  test.each(rows)('thermalVoltage at %d °C agrees with 40-digit arithmetic', (...row) => {
    const [celsius, kelvin, volts, twice, perVolt, octave, decade] = row;
    expect(celsius + zeroCelsius).toBeCloseTo(kelvin, 10);
    const value = thermalVoltage(kelvin);
    const pairs = [
      [value, volts],
      [2 * value, twice],
      [1 / (2 * value), perVolt],
      [value * Math.LN2, octave],
      [value * Math.LN10, decade],
    ] as const;
    for (const [got, wanted] of pairs) expect(Math.abs(got / wanted - 1)).toBeLessThanOrEqual(relative);
  });
});
