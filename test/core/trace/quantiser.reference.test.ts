import { describe, expect, test } from 'vitest';
import { randomStream } from '../../../packages/core/src/numeric/random.ts';
import { quantiser } from '../../../packages/core/src/trace/quantiser.ts';

const count = 2 ** 20;
const turns = (i: number): number => 2 * Math.PI * (((i * 997) % 48_000) / 48_000);

// S. Lipshitz, R. Wannamaker, J. Vanderkooy, "Quantization and dither", J. Audio Eng. Soc. 40(5), 1992 (from memory).
describe('triangular dither two steps wide', () => {
  const errors = (signal: (i: number) => number): { mean: number; variance: number; codes: Float64Array } => {
    const { quantise } = quantiser(16, randomStream(3, 'dither'));
    const codes = Float64Array.from({ length: count }, (_, i) => quantise(signal(i) / 2 ** 15));
    const mean = codes.reduce((sum, code, i) => sum + code - signal(i), 0) / count;
    const variance = codes.reduce((sum, code, i) => sum + (code - signal(i) - mean) ** 2, 0) / count;
    return { mean, variance, codes };
  };
  test.each([
    ['a constant of 0.3 steps', () => 0.3],
    ['a sine of a quarter step', (i: number) => 0.25 * Math.sin(turns(i))],
    ['a large sine', (i: number) => 20_000 * Math.sin(turns(i))],
  ])('leaves an error of variance step²/4 and no mean on %s', (_, signal) => {
    const { mean, variance } = errors(signal);
    // Spread of the variance of 2^20 errors is 0.1 % of it; of their mean 5e-4: ten and five times that.
    expect(Math.abs(variance / 0.25 - 1)).toBeLessThan(0.01);
    expect(Math.abs(mean)).toBeLessThan(2.5e-3);
  });
  test('keeps a sine of a quarter step, which is lost without it', () => {
    const recovered = (codes: Float64Array): number =>
      (2 / count) * codes.reduce((sum, code, i) => sum + code * Math.sin(turns(i)), 0);
    // Spread √(2·0.25/2^20) = 7e-4; five times that.
    expect(Math.abs(recovered(errors((i) => 0.25 * Math.sin(turns(i))).codes) - 0.25)).toBeLessThan(3.5e-3);
    const { quantise } = quantiser(16);
    expect(quantise(0.25 / 2 ** 15)).toBe(0);
    expect(quantise(-0.25 / 2 ** 15)).toBe(0);
  });
});

// Signal to noise of a full-scale sine, 6.02 dB·bits + 1.76 dB (IEEE Std 1241-2010, from memory), and the
// values of this very record computed with numpy 2.4.6 (`numpy.round`).
test.each([
  [8, 49.949603],
  [12, 74.028335],
  [16, 98.083561],
])('%d bits without dither: signal to noise of a sine', (bits, expected) => {
  const { quantise } = quantiser(bits);
  let signal = 0;
  let noise = 0;
  for (let i = 0; i < 2 ** 16; i++) {
    const value = Math.sin(2 * Math.PI * 997 * (i / 48_000) + 0.1) * (1 - 2 ** -(bits - 1));
    signal += value ** 2;
    noise += (quantise(value) / 2 ** (bits - 1) - value) ** 2;
  }
  const ratio = 10 * Math.log10(signal / noise);
  // Printed to six decimals; a sample that rounds the other way moves the 16-bit value by 1e-7 dB.
  expect(Math.abs(ratio - expected)).toBeLessThan(2e-6);
  // The record is not long enough to make the error fully even.
  expect(Math.abs(ratio - (20 * bits * Math.log10(2) + 10 * Math.log10(1.5)))).toBeLessThan(0.03);
});
