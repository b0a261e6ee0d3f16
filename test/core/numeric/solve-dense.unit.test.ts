import { describe, expect, test } from 'vitest';
import { solveDense } from '../../../packages/core/src/numeric/solve-dense.ts';

describe('solveDense(matrix, rhs, size)', () => {
  test('takes the largest pivot, also from below a zero', () => {
    const rhs = Float64Array.of(2, 3);
    expect(solveDense(Float64Array.of(0, 1, 1, 0), rhs, 2)).toBe(true);
    expect([...rhs]).toEqual([3, 2]);

    // Without the exchange of rows 1e-20 as a pivot swallows the 1 beside it and x comes out as 0.
    const small = Float64Array.of(1, 2);
    expect(solveDense(Float64Array.of(1e-20, 1, 1, 1), small, 2)).toBe(true);
    expect([...small]).toEqual([1, 1]);
  });

  test('uses only the first size² coefficients and size values', () => {
    const rhs = Float64Array.of(6, 8, 99);
    expect(solveDense(Float64Array.of(2, 0, 0, 4, 99), rhs, 2)).toBe(true);
    expect([...rhs]).toEqual([3, 2, 99]);
    expect(solveDense(new Float64Array(), new Float64Array(), 0)).toBe(true);
  });

  test.each<[string, number[], number[]]>([
    ['a zero matrix', [0, 0, 0, 0], [1, 1]],
    ['equal rows', [1, 2, 1, 2], [1, 1]],
    ['proportional columns', [1, 4, 2, 8], [1, 1]],
    ['a coefficient that is not a number', [1, 2, Number.NaN, 2], [1, 1]],
    ['an infinite right side', [1, 0, 0, 1], [1, Number.POSITIVE_INFINITY]],
    ['a solution beyond the largest number', [1e-300, 0, 0, 1], [1e300, 1]],
  ])('refuses %s', (_, matrix, rhs) => {
    expect(solveDense(Float64Array.from(matrix), Float64Array.from(rhs), 2)).toBe(false);
  });
});
