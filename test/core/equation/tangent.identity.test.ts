import fc from 'fast-check';
import { expect, test } from 'vitest';
import { tangent } from '../../../packages/core/src/equation/differentiate.ts';
import { evaluate } from '../../../packages/core/src/equation/evaluate.ts';
import { constant, type Expression, leaf } from '../../../packages/core/src/equation/expression.ts';
import {
  cos,
  exp,
  exp2,
  floor,
  log,
  select,
  sin,
  sqrt,
  tanh,
} from '../../../packages/core/src/equation/functions.ts';
import { solve } from '../../../packages/core/src/equation/solve.ts';
import { dimensions } from '../../../packages/core/src/quantity/dimension.ts';

const x = leaf('input', 'x', dimensions.ratio);

/** One expression an operator, smooth where it is tested. */
const cases: Record<string, Expression> = {
  sum: x.add(2).sub(x.mul(3)),
  product: x.mul(x).mul(x.add(1)),
  quotient: x.div(x.mul(x).add(2)),
  negative: x.neg(),
  magnitude: x.sub(7).abs().mul(x),
  smaller: x.min(x.mul(x).add(3)),
  larger: x.mul(x).max(x.sub(5)),
  whole: floor(x.add(100)).mul(0).add(x),
  root: sqrt(x.mul(x).add(1)),
  exponential: exp(x.mul(0.7)),
  'power of two': exp2(x.mul(1.3)),
  logarithm: log(x.mul(x).add(2)),
  sine: sin(x.mul(2)),
  cosine: cos(x.mul(2)),
  tanh: tanh(x.mul(0.9)),
  choice: select(x.lt(-50), constant(0), x.mul(x)),
  'implicit equation': solve((y) => exp(y).add(y).sub(x), x.min(0)),
  nested: tanh(exp(sin(x)).div(x.mul(x).add(3))).mul(solve((y) => y.mul(y).mul(y).add(y).sub(x), x)),
};

test.each(Object.entries(cases))(
  'the derivative of a %s is that of its difference quotient',
  (_, expression) => {
    const slope = tangent(expression, new Map([[x, constant(1)]]), dimensions.ratio);
    const at = (value: number): number => evaluate(expression, new Map([[x, value]]));
    fc.assert(
      fc.property(fc.double({ min: -3, max: 3, noNaN: true }), (value) => {
        // Fourth-order central difference: truncation h⁴ ≈ 1e-12 and rounding 1e-16/h ≈ 1e-13, times
        // derivatives of at most a few hundred.
        const h = 1e-3;
        const quotient =
          (8 * (at(value + h) - at(value - h)) - (at(value + 2 * h) - at(value - 2 * h))) / (12 * h);
        const exact = evaluate(slope, new Map([[x, value]]));
        expect(Math.abs(exact - quotient)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(exact)));
      }),
      { seed: 20261201, numRuns: 40 },
    );
  },
);

test('dimensions follow: a slope in time is per second, and terms that vanish are gone', () => {
  const v = leaf('input', 'v', dimensions.voltage);
  const rate = leaf('input-slope', "v'", { ...dimensions.voltage, second: -1 });
  const slope = tangent(v.mul(3).add('1 V'), new Map([[v, rate]]), dimensions.time);
  expect(slope.toString()).toBe("v' · 3");
});
