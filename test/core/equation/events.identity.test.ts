import { constant as level, oscillator } from '@tailpair/blocks';
import { type Patch, patch, simulate, TailpairError, wire } from '@tailpair/core';
import {
  defineBlock,
  held,
  hertz,
  onCrossing,
  seconds,
  select,
  set,
  state,
  voltage,
  volts,
} from '@tailpair/core/block';
import { describe, expect, test } from 'vitest';

async function raw(built: Patch<'it.out'>, length: string, oversample = 1): Promise<Float64Array> {
  const { traces } = await simulate(built, { length, probes: ['it.out'], oversample, decimate: false });
  return traces.it.out.samples;
}

describe('events are located between samples', () => {
  /** A ramp of 1 V/s that keeps the time of the crossing in what it writes. */
  const ramp = defineBlock({
    kind: 'test-ramp',
    summary: 'For tests.',
    inputs: {},
    outputs: { out: voltage() },
    params: { level: volts('0.1 V') },
    equations: ({ level: limit, time }) => {
      const v = state('0 V', () => limit.div(limit).mul('1 V').div('1 s'));
      const seen = held('0 s');
      onCrossing(v.sub(limit), () => [set(seen, time)]);
      return { out: seen.mul('1 V').div('1 s') };
    },
  });

  test('at the closed form, to the last digits of the clock', async () => {
    for (const volt of [0.1, Math.SQRT2 / 20, 0.02 + 1 / 48000, 5 / 48000]) {
      const built = patch({ blocks: { it: ramp({ level: `${volt} V` }) } }, () => []);
      // v = t, so the crossing of the limit is at t = limit. A ramp of thousands of sums of 1/48000 V is
      // right to 1e-16 a step.
      expect(Math.abs((await raw(built, '0.15 s')).at(-1)! - volt)).toBeLessThan(1e-13);
    }
  });

  test('in the order of their declaration at one instant, each seeing what the last has written', async () => {
    const chain = defineBlock({
      kind: 'test-chain',
      summary: 'For tests.',
      inputs: {},
      outputs: { out: voltage() },
      params: { at: seconds('1.3 ms') },
      equations: ({ at, time }) => {
        const first = held(0);
        const second = held(0);
        onCrossing(time.sub(at), () => [set(first, 1)]);
        onCrossing(time.sub(at), () => [set(second, first.add(10))]);
        onCrossing(first.sub(0.5), () => [set(second, second.mul(2))]);
        return { out: second.mul('1 V') };
      },
    });
    const samples = await raw(
      patch({ blocks: { it: chain() } }, () => []),
      '3 ms',
    );
    expect([...new Set(samples)]).toEqual([0, 22]);
  });

  test('several within one sample', async () => {
    // 100 kHz at 48 kHz: two resets in most cells. The phase is f·t whatever falls between samples.
    const tone = patch(
      { blocks: { it: oscillator({ shape: 'saw', frequency: '100123 Hz', amplitude: '1 V' }) } },
      () => [],
    );
    (await raw(tone, '10 ms')).forEach((x, n) => {
      const turn = (100123 * n) / 48000;
      const off = Math.abs(x - (2 * (turn - Math.floor(turn)) - 1));
      expect(Math.min(off, 2 - off), `sample ${n}`).toBeLessThan(1e-10);
    });
  });

  test('at a negative frequency the period is passed backwards', async () => {
    const built = patch(
      {
        blocks: {
          bend: level({ voltage: '-2 V' }),
          it: oscillator({ shape: 'saw', frequency: '1 kHz', fmDepth: '1 kHz/V', amplitude: '1 V' }),
        },
      },
      ({ bend, it }) => [wire(bend.out, it.fm)],
    );
    // 1 kHz − 2 · 1 kHz: the saw falls.
    const samples = await raw(built, '5 ms');
    for (let n = 1; n < 40; n++) expect(samples[n]).toBeCloseTo(1 - (2 * n) / 48, 10);
  });
});

describe('a state with limits', () => {
  const bounded = defineBlock({
    kind: 'test-bounded',
    summary: 'For tests.',
    inputs: {},
    outputs: { out: voltage() },
    params: { frequency: hertz('7 Hz') },
    equations: ({ frequency, time }) => {
      const up = select(time.mul(frequency).lt(0.5), 1, -1);
      return { out: state('0 V', () => up.mul('40 V').div('1 s'), { min: '-1 V', max: '1 V' }) };
    },
  });

  test('is held while pushed outward and leaves at once when pulled back', async () => {
    const samples = await raw(
      patch({ blocks: { it: bounded() } }, () => []),
      '0.2 s',
    );
    const turn = 0.5 / 7;
    samples.forEach((v, n) => {
      const t = n / 48000;
      const free = t < turn ? 40 * t : 1 - 40 * (t - turn);
      // The turn is a jump of the slope, seen at the sample behind it: up to one sample of 40 V/s.
      expect(Math.abs(v - Math.min(1, Math.max(-1, free)))).toBeLessThan(40 / 48000 + 1e-12);
    });
    expect(Math.max(...samples)).toBe(1);
    expect(Math.min(...samples)).toBe(-1);
  });
});

describe('what cannot go on is refused', () => {
  const ring = defineBlock({
    kind: 'test-ring',
    summary: 'For tests.',
    inputs: {},
    outputs: { out: voltage() },
    params: { at: seconds('1 ms') },
    equations: ({ at, time }) => {
      const flag = held(0);
      onCrossing(time.sub(at), () => [set(flag, 1)]);
      onCrossing(flag.sub(0.5), () => [set(flag, 0)]);
      onCrossing(flag.sub(0.5).neg().add(time.sub(at).mul(0).div('1 s')), () => [set(flag, 1)]);
      return { out: flag.mul('1 V') };
    },
  });

  test('a ring of events, by name', async () => {
    const fault = await raw(
      patch({ blocks: { it: ring() } }, () => []),
      '3 ms',
    ).catch((error: unknown) => error);
    expect(fault).toBeInstanceOf(TailpairError);
    expect(fault).toMatchObject({ code: 'event-storm', where: 'it' });
    expect(String(fault)).toContain('more than 100 events fell on one instant');
  });

  test('a value that becomes infinite, by block, port and time', async () => {
    const hole = defineBlock({
      kind: 'test-hole',
      summary: 'For tests.',
      inputs: {},
      outputs: { out: voltage() },
      params: { at: seconds('1 ms') },
      equations: ({ at, time }) => ({
        out: select(time.lt(at), 0, 1)
          .mul('1 V')
          .div(select(time.lt(at), 1, 0)),
      }),
    });
    const fault = await raw(
      patch({ blocks: { it: hole() } }, () => []),
      '3 ms',
    ).catch((error: unknown) => error);
    expect(fault).toMatchObject({ code: 'not-finite', where: 'it.out' });
    expect(String(fault)).toContain('became Infinity V at 1 ms');
  });
});
