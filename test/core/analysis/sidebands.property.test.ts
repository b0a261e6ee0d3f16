import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { harmonics } from '../../../packages/core/src/analysis/harmonics.ts';
import { sidebands } from '../../../packages/core/src/analysis/sidebands.ts';
import { cut } from '../../../packages/core/src/trace/cut.ts';
import type { Trace } from '../../../packages/core/src/trace/trace.ts';
import { record, turn } from './record.ts';

const [carrier, modulator] = [1003.3, 97.1];
const distorted = (t: number): number => Math.sin(turn(carrier, t)) + 0.1 * Math.sin(turn(3 * carrier, t));
const swinging = (t: number): number => (1 + 0.4 * Math.sin(turn(modulator, t) + 1)) * distorted(t);

const measures = [
  {
    name: 'sidebands',
    voice: record(swinging, { length: 6000 }),
    levels: (trace: Trace): number[] =>
      sidebands(trace, { carrier, modulator, orders: 1 }).map((line) => line.dBc),
  },
  {
    name: 'third harmonic',
    voice: record(distorted, { length: 6000 }),
    levels: (trace: Trace): number[] => [harmonics(trace, { fundamental: carrier, highest: 3 })[2]!.dBc],
  },
];

describe.each(measures)('levels in dBc of $name do not depend on', ({ voice, levels }) => {
  const part = (from: number): Trace => cut(voice, { from: from / voice.rate, length: 5000 / voice.rate });
  const expected = levels(part(0));
  const expectSame = (trace: Trace): void => {
    levels(trace).forEach((level, index) => {
      // 1e-9 dB is 1e-10 of a line, which leaves room for an offset of 10 V and a line of −24 dB.
      expect(Math.abs(level - expected[index]!)).toBeLessThan(1e-9);
    });
  };
  const map = (change: (value: number) => number): Trace => {
    const trace = part(0);
    return { ...trace, samples: trace.samples.map(change) };
  };
  const check = <T>(values: fc.Arbitrary<T>, of: (value: T) => Trace): void => {
    fc.assert(
      fc.property(values, (value) => expectSame(of(value))),
      { seed: 2026, numRuns: 20 },
    );
  };

  test('the scale', () => {
    check(fc.double({ min: 1e-6, max: 1e6, noNaN: true }), (by) => map((value) => value * by));
  });
  test('DC', () => {
    check(fc.double({ min: -10, max: 10, noNaN: true }), (by) => map((value) => value + by));
  });
  test('the part of the record that is measured', () => {
    check(fc.integer({ min: 1, max: 1000 }), part);
  });
  test('the time on the clock', () => {
    check(fc.double({ min: -1000, max: 1000, noNaN: true }), (start) => ({ ...part(0), start }));
  });
});
