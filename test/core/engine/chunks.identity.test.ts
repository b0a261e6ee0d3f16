import { bias, coupling, divider, envelope, gate, lfo, load, oscillator, ota } from '@tailpair/blocks';
import { patch, simulate, stream, wire } from '@tailpair/core';
import { amperes, defineBlock, farads, state, tanh, voltage } from '@tailpair/core/block';
import { describe, expect, test } from 'vitest';

const follower = defineBlock({
  kind: 'test-follower',
  summary: 'Cell and capacitor as a follower, for tests: an implicit state.',
  inputs: { in: voltage() },
  outputs: { out: voltage() },
  params: { bias: amperes('10 uA'), capacitance: farads('1 nF') },
  equations: ({ in: u, bias: current, capacitance, thermalVoltage }) => ({
    out: state('0 V', (v) => current.mul(tanh(u.sub(v).div(thermalVoltage.mul(2)))).div(capacitance)),
  }),
});

/** A voice that meets everything chunks could cut: events, limits, implicit states, moving pitch. */
const voice = patch(
  {
    blocks: {
      drift: lfo({ shape: 'triangle', frequency: '30 Hz', amplitude: '200 mV' }),
      master: oscillator({ shape: 'saw', frequency: '97 Hz', amplitude: '2 V' }),
      saw: oscillator({ shape: 'saw', frequency: '440 Hz', syncThreshold: '0 V' }),
      pad: divider({ top: '99k', bottom: '1k' }),
      soft: follower(),
      key: gate({ held: '11 ms', period: '23 ms' }),
      contour: envelope({ attack: '2 ms', decay: '3 ms', release: '4 ms', rest: '-12 V', peak: '-2 V' }),
      pin: bias(),
      cell: ota({ offset: '0.5 mV' }),
      load: load({ resistance: '300k', capacitance: '1 nF' }),
      couple: coupling(),
    },
  },
  (b) => [
    wire(b.drift.out, b.saw.pitch),
    wire(b.drift.out, b.saw.fm),
    wire(b.master.out, b.saw.sync),
    wire(b.saw.out, b.pad.in),
    wire(b.pad.out, b.soft.in),
    wire(b.soft.out, b.cell.plus),
    wire(b.key.out, b.contour.gate),
    wire(b.contour.out, b.pin.pin, { via: '120k' }),
    wire(b.pin.out, b.cell.bias),
    wire(b.cell.out, b.load.in),
    wire(b.load.out, b.couple.in),
  ],
);
const probes = ['couple.out', 'load.out', 'soft.out'] as const;
const length = '60 ms';

const bytes = (samples: Float64Array): Uint8Array =>
  new Uint8Array(samples.buffer, samples.byteOffset, samples.byteLength);

describe('how a run is cut leaves no trace in the samples', async () => {
  const whole = (await simulate(voice, { length, probes })).traces;

  test('the voice does what it is here for', () => {
    expect(Math.max(...whole.load.out.samples)).toBeGreaterThan(10.9);
  });

  for (const chunk of [1, 2, 7, 64, 1000, 100_000]) {
    test(`chunks of ${chunk}`, async () => {
      const { traces } = await simulate(voice, { length, probes, chunk });
      expect(bytes(traces.couple.out.samples)).toEqual(bytes(whole.couple.out.samples));
      expect(bytes(traces.soft.out.samples)).toEqual(bytes(whole.soft.out.samples));
    });
  }

  for (const piece of [1, 100, 4096]) {
    test(`a stream in pieces of ${piece}`, async () => {
      const joined: number[] = [];
      for await (const { couple } of stream(voice, { length, probes, piece })) {
        expect(couple.out.start).toBe(joined.length / 48000);
        joined.push(...couple.out.samples);
      }
      expect(Float64Array.from(joined)).toEqual(whole.couple.out.samples);
    });
  }

  test('a probe more or less changes no other', async () => {
    const { traces } = await simulate(voice, { length, probes: ['couple.out'] });
    expect(traces.couple.out.samples).toEqual(whole.couple.out.samples);
  });

  test('progress ends at one, and a run can be stopped', async () => {
    const seen: number[] = [];
    await simulate(voice, { length, probes, onProgress: (done) => seen.push(done) });
    expect(seen.at(-1)).toBe(1);
    await expect(simulate(voice, { length, probes, signal: { aborted: true } })).rejects.toMatchObject({
      code: 'aborted',
    });
  });
});
