import { describe, expect, test } from 'vitest';
import { harmonics } from '../../../packages/core/src/analysis/harmonics.ts';
import { thd, thdR } from '../../../packages/core/src/analysis/thd.ts';
import { record, turn } from './record.ts';

// Fourier series of the ideal waveforms (textbook), cut off at the highest order measured.
const series = {
  square: (n: number): number => (n % 2 === 1 ? 1 / n : 0),
  saw: (n: number): number => 1 / n,
  triangle: (n: number): number => (n % 2 === 1 ? (-1) ** ((n - 1) / 2) / n ** 2 : 0),
};
const wave = (of: (n: number) => number, frequency: number): ReturnType<typeof record> =>
  record(
    (t) =>
      Array.from({ length: 20 }, (_, i) => of(i + 1) * Math.sin(turn(frequency * (i + 1), t))).reduce(
        (a, b) => a + b,
      ),
    {
      length: 20_011,
    },
  );

describe('THD of waveforms with a known series, on a record without whole periods', () => {
  // Closed forms to 14 digits: √(Σ 1/n²) over the odd orders 3 … highest.
  test.each([
    [5, 0.38873012632302],
    [9, 0.42879476837849],
    [20, 0.4568602752717598],
  ])('square wave, orders to %d', (highest, expected) => {
    expect(
      Math.abs(thd(wave(series.square, 1000.7), { fundamental: 1000.7, highest }) - expected),
    ).toBeLessThan(1e-12);
  });
  test('saw and triangle, orders to 9 by default', () => {
    for (const of of [series.saw, series.triangle]) {
      const expected = Math.hypot(...Array.from({ length: 8 }, (_, i) => of(i + 2)));
      expect(Math.abs(thd(wave(of, 1000.7), { fundamental: 1000.7 }) - expected)).toBeLessThan(1e-12);
    }
  });
  test('referred to the total, IEC 60268-3 (from memory): F/√(1 + F²)', () => {
    const trace = wave(series.square, 1000.7);
    const rms = (orders: number): number =>
      Math.hypot(...Array.from({ length: orders }, (_, i) => series.square(i + 1)));
    const expected = Math.hypot(...[3, 5, 7, 9].map(series.square)) / rms(9);
    expect(Math.abs(thdR(trace, { fundamental: 1000.7 }) - expected)).toBeLessThan(1e-12);
  });
});

describe('harmonics', () => {
  const triangle = wave(series.triangle, 440);
  test('table has order, frequency, amplitude, level and phase', () => {
    const table = harmonics(triangle, { fundamental: '440 Hz', highest: 3 });
    expect(table.map((line) => line.order)).toEqual([1, 2, 3]);
    expect(table[2]!.frequency).toBe(1320);
    expect(table[2]!.dBc).toBeCloseTo(20 * Math.log10(1 / 9), 10);
    // The third harmonic of a triangle starts downward.
    expect(Math.abs(table[2]!.phase)).toBeCloseTo(Math.PI, 10);
  });
  test('refuses orders above half the rate and says which are left', () => {
    expect(() => harmonics(triangle, { fundamental: '4186 Hz' })).toThrowError(
      expect.objectContaining({ code: 'value-range', message: expect.stringContaining('at most 5') }),
    );
    expect(() => harmonics(triangle, { fundamental: '4 kHz', highest: 6 })).toThrowError(/at most 5/);
  });
  test.each<[string, (time: number) => number]>([
    ['silence', () => 0],
    ['a steady voltage, whose fundamental is rounding', () => 1],
    ['another tone', (time) => Math.sin(turn(300, time))],
  ])('refuses %s, as there is no fundamental', (_, signal) => {
    expect(() => thd(record(signal), { fundamental: '1 kHz' })).toThrowError(
      expect.objectContaining({ code: 'record-invalid' }),
    );
  });
});
