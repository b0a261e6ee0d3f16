import { describe, expect, test } from 'vitest';
import { foghorn, main, measure } from '../../examples/foghorn.ts';

describe('the foghorn', () => {
  test('shows what the textbook says', async () => {
    // Expected values stand beside the figures in the example: the Fourier series of tanh, and AM
    // sidebands of m/2 (any communications text; A. Carlson, Communication Systems; from memory).
    // The fit over whole periods is good to 1e-9; 1e-6 leaves room for the last of the envelope.
    for (const { figure, measured, expected } of await measure()) {
      expect(Math.abs(measured / expected - 1), figure).toBeLessThan(1e-6);
    }
  });

  test('loads no source', () => {
    expect(foghorn({ shape: 'saw', frequency: '110 Hz' }).warnings).toEqual([]);
  });

  test('prints a caution first, then its file and its figures', async () => {
    const lines: string[] = [];
    await main((line) => lines.push(line));
    expect(lines[0]).toMatch(/^Caution/);
    expect(lines[1]).toMatch(/foghorn\.wav: 4 s, peak 4\.\d+ V/);
    expect(lines.filter((line) => line.includes('sideband'))).toHaveLength(2);
  });
});
