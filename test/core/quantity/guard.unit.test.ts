import { describe, expect, test } from 'vitest';
import { dimensions } from '../../../packages/core/src/quantity/dimension.ts';
import {
  type Range,
  requireFinite,
  requireRange,
  requireWhole,
} from '../../../packages/core/src/quantity/guard.ts';

const bandwidth: Range = { where: 'horn.frequency', unit: dimensions.frequency, above: 0, max: 24000 };

describe('requireRange', () => {
  test('gives the value back', () => {
    expect(requireRange(440, bandwidth)).toBe(440);
    expect(requireRange(24000, bandwidth)).toBe(24000);
    expect(requireRange(1e-300, bandwidth)).toBe(1e-300);
    expect(requireRange(-5, { where: 'offset' })).toBe(-5);
    expect(requireRange(0, { where: 'offset', min: 0, below: 1 })).toBe(0);
  });

  test.each<[number, Range, string]>([
    [30000, bandwidth, 'horn.frequency: must be above 0 Hz and at most 24 kHz, got 30 kHz'],
    [0, bandwidth, 'horn.frequency: must be above 0 Hz and at most 24 kHz, got 0 Hz'],
    [24000.001, bandwidth, 'horn.frequency: must be above 0 Hz and at most 24 kHz, got 24.000001 kHz'],
    [-1, { where: 'pad.top', unit: 'Ω', min: 0 }, 'pad.top: must be at least 0 Ω, got -1 Ω'],
    [
      1.2,
      { where: 'width', unit: '%', min: 0, below: 1 },
      'width: must be at least 0 % and below 100 %, got 120 %',
    ],
    [Number.NaN, bandwidth, 'horn.frequency: must be finite, got not a number'],
    [
      Number.POSITIVE_INFINITY,
      { ...bandwidth, cure: 'check what it is divided by' },
      'horn.frequency: must be finite, got infinity: check what it is divided by',
    ],
  ])('refuses %d', (value, range, message) => {
    expect(() => requireRange(value, range)).toThrow(
      expect.objectContaining({ code: 'value-range', where: range.where, message }),
    );
  });
});

describe('requireFinite', () => {
  test('lets any finite number pass', () => {
    expect(requireFinite(-1e300, { where: 'x' })).toBe(-1e300);
  });

  test('tells a wrong kind from a wrong value', () => {
    expect(() => requireFinite('5' as unknown as number, { where: 'seed' })).toThrow(
      expect.objectContaining({ code: 'value-kind', message: 'seed: must be a number, got string' }),
    );
  });
});

describe('requireWhole', () => {
  test('lets whole numbers of the range pass', () => {
    expect(requireWhole(4, { where: 'oversample', min: 1, max: 64 })).toBe(4);
  });

  test.each([
    [2.5, 'oversample: must be a whole number, got 2.5'],
    [0, 'oversample: must be at least 1 and at most 64, got 0'],
  ])('refuses %d', (value, message) => {
    expect(() => requireWhole(value, { where: 'oversample', min: 1, max: 64 })).toThrow(
      expect.objectContaining({ code: 'value-range', message }),
    );
  });
});
