import { gate } from '@tailpair/blocks';
import { patch, simulate } from '@tailpair/core';
import { expect, test } from 'vitest';

async function edges(given: Parameters<typeof gate>[0], length: string): Promise<number[]> {
  const built = patch({ blocks: { gate: gate(given) } }, () => []);
  const { samples } = (
    await simulate(built, { length, probes: ['gate.out'], oversample: 1, decimate: false })
  ).traces.gate.out;
  return [...samples].flatMap((x, n) => (x === (samples[n - 1] ?? 0) ? [] : [n]));
}

test('pulses begin and end on the samples that stand for their times', async () => {
  const expected = Array.from({ length: 100 }, (_, i) => [240 * i, 240 * i + 96]).flat();
  expect(await edges({ held: '2 ms', period: '5 ms' }, '0.5 s')).toEqual(expected);
});

test('a delay and a count', async () => {
  expect(await edges({ delay: '1 ms', held: '2 ms', period: '5 ms', count: 2 }, '0.1 s')).toEqual([
    48, 144, 288, 384,
  ]);
});

test('a pulse that would not end before the next is refused', () => {
  expect(() => patch({ blocks: { gate: gate({ held: '1 s', period: '1 s' }) } }, () => [])).toThrow(
    'gate: held must be shorter than period, or the gate never falls',
  );
});
