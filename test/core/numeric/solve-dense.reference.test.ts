import { expect, test } from 'vitest';
import { solveDense } from '../../../packages/core/src/numeric/solve-dense.ts';

// Sum of the entries of the inverse of the n × n Hilbert matrix: n² (M.-D. Choi, Tricks or treats with the
// Hilbert matrix, Amer. Math. Monthly 90, 1983, 301–312, doi:10.2307/2975779). A backward stable solver
// loses condition number × 2^-53; condition numbers 5.2e2 for 3, 4.8e5 for 5 and 1.5e10 for 8 (N. J.
// Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed., 2002, table 28.1).
test.each([
  [3, 5.24e2],
  [5, 4.77e5],
  [8, 1.53e10],
])('the Hilbert system of size %i is solved as far as its condition allows', (size, condition) => {
  const matrix = Float64Array.from(
    { length: size * size },
    (_, i) => 1 / (Math.floor(i / size) + (i % size) + 1),
  );
  const ones = new Float64Array(size).fill(1);
  expect(solveDense(matrix, ones, size)).toBe(true);
  const sum = ones.reduce((total, value) => total + value, 0);
  expect(Math.abs(sum / size ** 2 - 1)).toBeLessThan(condition * 2 ** -53 * size);
});
