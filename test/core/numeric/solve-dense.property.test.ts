import fc from 'fast-check';
import { expect, test } from 'vitest';
import { solveDense } from '../../../packages/core/src/numeric/solve-dense.ts';

const entry = fc.double({ min: -1, max: 1, noNaN: true });
const system = fc.integer({ min: 1, max: 12 }).chain((size) =>
  fc.record({
    size: fc.constant(size),
    matrix: fc.array(entry, { minLength: size * size, maxLength: size * size }),
    rhs: fc.array(entry, { minLength: size, maxLength: size }),
  }),
);

test('what is solved solves the system to rounding', () => {
  fc.assert(
    fc.property(system, ({ size, matrix, rhs }) => {
      const solution = Float64Array.from(rhs);
      if (!solveDense(Float64Array.from(matrix), solution, size)) return;
      const largest = solution.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
      for (let row = 0; row < size; row++) {
        let residual = rhs[row]!;
        for (let i = 0; i < size; i++) residual -= matrix[row * size + i]! * solution[i]!;
        // Backward error of partial pivoting: size² · growth · 2^-53 · ‖A‖ · ‖x‖, entries at most 1; growth
        // is below size in practice (N. J. Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed.,
        // 2002, theorem 9.5 and section 9.4).
        expect(Math.abs(residual)).toBeLessThanOrEqual(size ** 4 * 2 ** -53 * (largest + 1));
      }
    }),
    { seed: 1, numRuns: 500 },
  );
});
