import fc from 'fast-check';
import { expect, test } from 'vitest';
import { Decimator } from '../../../packages/core/src/engine/decimator.ts';
import { randomStream } from '../../../packages/core/src/numeric/random.ts';

const stream = randomStream(1, 'input');
const input = Float64Array.from({ length: 4000 }, () => stream.gaussian());
const factor = fc.constantFrom(1, 2, 4, 8, 16, 32);
const pieces = fc.array(fc.oneof(fc.integer({ min: 0, max: 9 }), fc.integer({ min: 0, max: 1000 })), {
  minLength: 1,
  maxLength: 60,
});

test('any division of the input into pieces gives the same bits', () => {
  fc.assert(
    fc.property(factor, fc.constantFrom(44100, 48000), pieces, (factor, rate, lengths) => {
      const whole = new Float64Array(input.length);
      const count = new Decimator(factor, rate).push(input, 0, input.length, whole, 0);

      const decimator = new Decimator(factor, rate);
      const pieced = new Float64Array(input.length);
      let from = 0;
      let written = 0;
      for (const length of [...lengths, input.length]) {
        const to = Math.min(from + length, input.length);
        written += decimator.push(input, from, to, pieced, written);
        from = to;
      }
      expect(written).toBe(count);
      expect(pieced).toEqual(whole);
    }),
    { seed: 1, numRuns: 150 },
  );
});
