import { describe, expect, test } from 'vitest';
import { realSpectrum } from '../../../packages/core/src/numeric/fft.ts';
import { randomStream } from '../../../packages/core/src/numeric/random.ts';

function noise(length: number): Float64Array {
  const stream = randomStream(1, 'record');
  return Float64Array.from({ length }, () => 2 * stream.uniform() - 1);
}

describe('realSpectrum(samples)', () => {
  test.each([2, 4, 8, 64, 512])('agrees with the defining sum over %i samples', (size) => {
    const samples = noise(size);
    const { re, im } = realSpectrum(samples);
    expect([re.length, im.length]).toEqual([size / 2 + 1, size / 2 + 1]);
    for (let k = 0; k <= size / 2; k++) {
      let sumRe = 0;
      let sumIm = 0;
      samples.forEach((x, n) => {
        const angle = (2 * Math.PI * ((k * n) % size)) / size;
        sumRe += x * Math.cos(angle);
        sumIm -= x * Math.sin(angle);
      });
      // Plain summation of `size` terms of at most 1 errs by size · 2^-53 · Σ|x| at most, the transform by
      // less.
      const bound = size * 2 ** -53 * size;
      expect(Math.abs(re[k]! - sumRe)).toBeLessThanOrEqual(bound);
      expect(Math.abs(im[k]! - sumIm)).toBeLessThanOrEqual(bound);
    }
  });

  test.each([2, 4, 1024, 2 ** 17])('keeps the energy of %i samples (Parseval)', (size) => {
    const samples = noise(size);
    const { re, im } = realSpectrum(samples);
    let energy = 0;
    re.forEach((value, k) => {
      const share = k === 0 || k === size / 2 ? 1 : 2;
      energy += share * (value ** 2 + im[k]! ** 2);
    });
    const expected = samples.reduce((sum, x) => sum + x * x, 0);
    // Energies are sums of squares, so rounding averages out: 17 stages and two long sums stay below 100 ·
    // 2^-53.
    expect(Math.abs(energy / size / expected - 1)).toBeLessThan(100 * 2 ** -53);
  });

  test('leaves its input as it is', () => {
    const samples = noise(16);
    const kept = samples.slice();
    realSpectrum(samples);
    expect(samples).toEqual(kept);
  });

  test.each([0, 1, 3, 6, 1000])('refuses %i samples', (size) => {
    expect(() => realSpectrum(new Float64Array(size))).toThrow(
      expect.objectContaining({
        code: 'record-invalid',
        message: `a spectrum takes 2, 4, 8, … samples, got ${size}: cut the record to a power of two`,
      }),
    );
  });
});
