import { constant as level } from '@tailpair/blocks';
import { patch, simulate, stream, wire } from '@tailpair/core';
import { defineBlock, exp, select, solve, state, voltage, volts } from '@tailpair/core/block';
import { expect, test } from 'vitest';
import { tangent } from '../../../packages/core/src/equation/differentiate.ts';
import { evaluate } from '../../../packages/core/src/equation/evaluate.ts';
import { constant, leaf } from '../../../packages/core/src/equation/expression.ts';
import { solveScalar } from '../../../packages/core/src/equation/solve-scalar.ts';
import { dimensions } from '../../../packages/core/src/quantity/dimension.ts';

test('a state whose slope jumps at a value of its own is not taken for a linear one', async () => {
  const ramp = defineBlock({
    kind: 'test-two-speeds',
    summary: 'Rises by 20 V/s below a level, by 5 V/s above, for tests.',
    inputs: {},
    outputs: { out: voltage() },
    params: { turn: volts('1 V') },
    equations: ({ turn }) => ({
      out: state('0 V', (v) => select(v.lt(turn), 20, 5).mul('1 V').div('1 s')),
    }),
  });
  const built = patch({ blocks: { it: ramp() } }, () => []);
  const { samples } = (
    await simulate(built, { length: '0.1 s', probes: ['it.out'], oversample: 1, decimate: false })
  ).traces.it.out;
  samples.forEach((v, n) => {
    const t = n / 48000;
    // The bend lies between two samples: at most a sample of the difference of the slopes.
    expect(Math.abs(v - (t < 0.05 ? 20 * t : 1 + 5 * (t - 0.05)))).toBeLessThanOrEqual(15 / 48000 + 1e-12);
  });
});

test('second derivatives of an implicit equation are those of its solution', () => {
  const x = leaf('input', 'x', dimensions.ratio);
  const seeds = new Map([[x, constant(1)]]);
  const root = solve((y) => exp(y).add(y).sub(x), x.min(0));
  const second = tangent(tangent(root, seeds, dimensions.ratio), seeds, dimensions.ratio);
  for (const value of [-2, 0.3, 5]) {
    const y = evaluate(root, new Map([[x, value]]));
    // e^y + y = x gives y′ = 1/(1 + e^y), y″ = −e^y·y′³; good to rounding.
    const exact = -Math.exp(y) / (1 + Math.exp(y)) ** 3;
    expect(Math.abs(evaluate(second, new Map([[x, value]])) / exact - 1)).toBeLessThan(1e-12);
  }
});

test('a search that starts far away comes home', () => {
  // e^x = 10: from 300 by steps of two, from −100 first thrown to 1e44 and halved back.
  for (const guess of [300, -100]) {
    const root = solveScalar(guess, (x, out) => {
      out[0] = Math.exp(x) - 10;
      out[1] = Math.exp(x);
      out[2] = Math.exp(x);
    });
    expect(root).toBeCloseTo(Math.log(10), 12);
  }
});

test('a stream without a probe is refused rather than endless', async () => {
  const built = patch(
    {
      blocks: {
        a: level(),
        b: defineBlock({
          kind: 'test-wire',
          summary: '',
          inputs: { in: voltage() },
          outputs: { out: voltage() },
          params: {},
          equations: ({ in: v }) => ({ out: v }),
        })(),
      },
    },
    ({ a, b }) => [wire(a.out, b.in)],
  );
  await expect(stream(built, { length: '1 ms', probes: [] }).next()).rejects.toMatchObject({
    code: 'value-range',
  });
});
