import { describe, expect, test } from 'vitest';
import { Decimator } from '../../../packages/core/src/engine/decimator.ts';

const factors = [1, 2, 4, 8, 16, 32];

describe.each(factors)('a decimator by %i', (factor) => {
  const run = (input: Float64Array) => {
    const output = new Float64Array(Math.ceil(input.length / factor));
    return output.subarray(0, new Decimator(factor, 48000).push(input, 0, input.length, output, 0));
  };

  test('gives output k as soon as the input reaches k·factor + latency', () => {
    const decimator = new Decimator(factor, 48000);
    const input = Float64Array.from({ length: decimator.latency + 20 * factor }, (_, i) => Math.sin(i));
    const output = new Float64Array(20);
    let written = 0;
    input.forEach((_, i) => {
      written += decimator.push(input, i, i + 1, output, written);
      expect(written).toBe(Math.max(0, Math.floor((i - decimator.latency) / factor) + 1));
    });
    expect(written).toBe(20);
  });

  test('holds the first value before the start, so a constant stays that constant', () => {
    const output = run(new Float64Array(3000).fill(-11.7));
    output.forEach((value) => {
      // Each of up to five stages rounds a few dozen partial sums, none larger than the value.
      expect(Math.abs(value / -11.7 - 1)).toBeLessThan(5 * 60 * 2 ** -53);
    });
  });

  test('takes a ramp to the same ramp: unit gain at zero frequency and no delay', () => {
    const output = run(Float64Array.from({ length: 6000 }, (_, i) => i));
    const settled = Math.ceil(new Decimator(factor, 48000).latency / factor);
    output.subarray(settled).forEach((value, k) => {
      // The same roundings, of values up to 6000.
      expect(Math.abs(value - (k + settled) * factor)).toBeLessThan(5 * 60 * 6000 * 2 ** -53);
    });
  });
});

test('writes from the given index and touches nothing else', () => {
  const decimator = new Decimator(4, 48000);
  const input = new Float64Array(decimator.latency + 13).fill(1);
  const output = new Float64Array(10).fill(7);
  expect(decimator.push(input, 0, 0, output, 3)).toBe(0);
  expect(decimator.push(input, 0, input.length, output, 3)).toBe(4);
  expect(output.map((value) => Math.round(value * 1e12) / 1e12)).toEqual(
    Float64Array.of(7, 7, 7, 1, 1, 1, 1, 7, 7, 7),
  );
});

test('divides by 1 by handing the samples through', () => {
  const output = new Float64Array(3);
  expect(new Decimator(1, 48000).push(Float64Array.of(1, 2, 3, 4), 1, 3, output, 1)).toBe(2);
  expect(output).toEqual(Float64Array.of(0, 2, 3));
});

test.each([
  [3, 48000, 'oversample: must be one of 1, 2, 4, 8, 16, 32, got 3'],
  [64, 48000, 'oversample: must be one of 1, 2, 4, 8, 16, 32, got 64'],
  [Number.NaN, 48000, 'oversample: must be one of 1, 2, 4, 8, 16, 32, got NaN'],
  [4, 0, 'rate: must be above 0 Hz, got 0 Hz'],
  [4, Number.POSITIVE_INFINITY, 'rate: must be finite, got infinity'],
])('refuses a factor of %d at %d Hz', (factor, rate, message) => {
  expect(() => new Decimator(factor, rate)).toThrow(
    expect.objectContaining({ code: 'value-range', message }),
  );
});
