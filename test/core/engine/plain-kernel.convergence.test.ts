import { constant, coupling, currentSource } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { choice, defineBlock, isZero, node, ohms, voltage, volts } from '@tailpair/core/block';
import { describe, expect, test } from 'vitest';

/** A recording of a sine, as a loop over samples of its author's own. */
const recording = defineBlock({
  kind: 'test-recording',
  summary: 'For tests.',
  inputs: { in: voltage({ optional: true }) },
  outputs: { out: voltage() },
  params: { peak: volts('1 V'), word: choice(['plain', 'other'], 'plain') },
  kernel: ({ inputs: { in: added }, outputs: { out }, params: { peak }, dt }) => {
    let played = 0;
    return {
      run: (from, to) => {
        for (let n = from; n < to; n++) {
          const turn = 2 * Math.PI * 1000 * dt * played++;
          out![n] = (peak as number) * Math.sin(turn) + added![n]!;
        }
      },
    };
  },
});

describe('a plain kernel', () => {
  test('gets its values, its inputs and every sample once', async () => {
    const built = patch(
      { blocks: { shift: constant({ voltage: '2 V' }), it: recording({ peak: '3 V' }) } },
      (b) => [wire(b.shift.out, b.it.in)],
    );
    const run = { length: '5 ms', probes: ['it.out'], oversample: 1, decimate: false, chunk: 7 } as const;
    const { samples } = (await simulate(built, run)).traces.it.out;
    samples.forEach((x, n) => expect(x).toBeCloseTo(2 + 3 * Math.sin((2 * Math.PI * n) / 48), 12));
  });

  test('feeds a state through slopes that are estimated: second order', async () => {
    const built = patch({ blocks: { it: recording(), couple: coupling({ capacitance: '1.6 nF' }) } }, (b) => [
      wire(b.it.out, b.couple.in),
    ]);
    const tau = 100e3 * 1.6e-9;
    const w = 2 * Math.PI * 1000;
    // High-pass from rest: the sine's own answer and a transient that starts the capacitor at zero.
    const size = (w * tau) / Math.hypot(1, w * tau);
    const phase = Math.atan2(1, w * tau);
    const exact = (t: number): number =>
      size * Math.sin(w * t + phase) - size * Math.sin(phase) * Math.exp(-t / tau);
    const errors: number[] = [];
    for (const oversample of [4, 8, 16]) {
      const { samples, rate } = (
        await simulate(built, { length: '5 ms', probes: ['couple.out'], oversample, decimate: false })
      ).traces.couple.out;
      errors.push(samples.reduce((worst, x, n) => Math.max(worst, Math.abs(x - exact(n / rate))), 0));
    }
    // A backward difference of second order leaves h² in the slope, and that times h in a step, of which
    // there are 1/h: third order to be expected where nothing else speaks, second order promised.
    expect(errors[0]! / errors[1]!).toBeGreaterThan(3.8);
    expect(errors[1]! / errors[2]!).toBeGreaterThan(3.8);
    // At the start the estimate takes the signal as at rest: twice h²/12 times the slope that is missed, over τ.
    expect(errors[0]).toBeLessThan(((2 / 12) * w) / (4 * 48000) ** 2 / tau);
  });
});

test('a node sees the sum of its currents, of V/R and of 1/R', async () => {
  const passive = defineBlock({
    kind: 'test-node',
    summary: 'A resistor to ground at which things meet, for tests.',
    inputs: { meet: node() },
    outputs: { out: voltage() },
    params: { ground: ohms('10k') },
    equations: ({ meet, ground }) => {
      if (isZero(meet.conductance)) return { out: meet.current.mul(ground) };
      return { out: meet.current.add(meet.drive).div(meet.conductance.add(ground.div(ground).div(ground))) };
    },
  });
  const built = patch(
    {
      blocks: {
        one: constant({ voltage: '3 V' }),
        two: constant({ voltage: '-1 V' }),
        flow: currentSource({ current: '100 uA' }),
        more: currentSource({ current: '50 uA' }),
        it: passive(),
        alone: passive(),
      },
    },
    (b) => [
      wire(b.one.out, b.it.meet, { via: '20k' }),
      wire(b.two.out, b.it.meet, { via: '5k' }),
      wire(b.flow.out, b.it.meet),
      wire(b.more.out, b.alone.meet),
    ],
  );
  const { traces } = await simulate(built, { length: '1 ms', probes: ['it.out', 'alone.out'] });
  // Millman's theorem (any text on circuits): (3/20k − 1/5k + 100 µA)/(1/20k + 1/5k + 1/10k).
  expect(traces.it.out.samples[10]).toBeCloseTo(
    (3 / 20e3 - 1 / 5e3 + 1e-4) / (1 / 20e3 + 1 / 5e3 + 1 / 10e3),
    12,
  );
  expect(traces.alone.out.samples[10]).toBeCloseTo(0.5, 12);
});
