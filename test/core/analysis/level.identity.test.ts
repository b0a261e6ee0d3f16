import { describe, expect, test } from 'vitest';
import { dc } from '../../../packages/core/src/analysis/dc.ts';
import { level } from '../../../packages/core/src/analysis/level.ts';
import { peak } from '../../../packages/core/src/analysis/peak.ts';
import { record, turn } from './record.ts';

const sine = record((t) => -0.4 + 3 * Math.sin(turn(1000, t)));

describe('a sine on DC over whole periods', () => {
  test('level is amplitude/√2, without DC', () => expect(level(sine)).toBeCloseTo(3 / Math.SQRT2, 13));
  test('dc is the mean', () => expect(dc(sine)).toBeCloseTo(-0.4, 14));
  test('peak is the largest magnitude, with DC', () => expect(peak(sine)).toBeCloseTo(3.4, 14));
});

// Crest factors of the ideal waveforms (textbook): the saw's and the triangle's is √3, a square's 1.
test('level of a triangle and a square', () => {
  const phase = (t: number): number => (t * 480 + 0.005) % 1;
  const square = record((t) => (phase(t) < 0.5 ? 1 : -1));
  expect(peak(square) / level(square)).toBeCloseTo(1, 14);
  // 100 mid-point samples per period miss the mean square by 1/(100²) of itself at most.
  const saw = record((t) => 2 * phase(t) - 1);
  expect(Math.abs(1 / level(saw) - Math.sqrt(3))).toBeLessThan(1e-4 * Math.sqrt(3));
});

test('dc keeps its digits beside a large offset', () => {
  expect(Math.abs(dc(record((t) => 1e6 + Math.sin(turn(50, t)))) - 1e6)).toBeLessThan(1e-9);
});

test.each([dc, level, peak])('%o refuses an empty record and one that is not finite', (measure) => {
  expect(() => measure({ ...sine, samples: new Float64Array(0) })).toThrowError(
    expect.objectContaining({ code: 'record-short' }),
  );
  expect(() => measure({ ...sine, samples: Float64Array.of(0, Infinity) })).toThrowError(
    expect.objectContaining({ code: 'record-invalid' }),
  );
});
