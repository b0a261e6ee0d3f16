import {
  buffer,
  constant,
  currentDrive,
  currentSource,
  divider,
  load,
  mixer,
  oscillator,
} from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';

const source = 'Ohm’s and Kirchhoff’s laws';
const because = 'rounding of a few operations';
const run = { length: '1 ms', decimate: false } as const;

test('a divider divides', async () => {
  const errors: number[] = [];
  for (const [top, bottom] of [
    [9e3, 1e3],
    [100e3, 390],
    [0, 10e3],
  ] as const) {
    const pad = patch(
      { blocks: { source: constant({ voltage: '5 V' }), pad: divider({ top, bottom }) } },
      ({ source, pad }) => [wire(source.out, pad.in)],
    );
    const { traces } = await simulate(pad, { ...run, probes: ['pad.out'] });
    errors.push(traces.pad.out.samples[0]! / ((5 * bottom) / (top + bottom)) - 1);
  }
  claim({ what: 'Divider: R₂/(R₁ + R₂)', source, tolerance: 1e-15, because, errors });
});

test('a mixer sums what meets at its virtual ground, and inverts', async () => {
  const mix = (volts: number) =>
    patch(
      {
        supply: ['-12 V', '12 V'],
        blocks: {
          a: constant({ voltage: `${volts} V` }),
          b: constant({ voltage: '-1.5 V' }),
          drive: currentSource({ current: '20 µA' }),
          sum: mixer({ feedback: '47k' }),
        },
      },
      ({ a, b, drive, sum }) => [
        wire(a.out, sum.sum, { via: '100k' }),
        wire(b.out, sum.sum, { via: '22k' }),
        wire(drive.out, sum.sum),
      ],
    );
  const errors: number[] = [];
  for (const volts of [-15, -3, 0, 2.5, 20]) {
    const { traces } = await simulate(mix(volts), { ...run, probes: ['sum.out'] });
    errors.push(traces.sum.out.samples[0]! / (-47e3 * (volts / 100e3 - 1.5 / 22e3 + 20e-6)) - 1);
  }
  claim({
    what: 'Mixer: −R_f·(ΣV/R + ΣI), two voltages and a current',
    source,
    tolerance: 1e-14,
    because: 'rounding of a sum that cancels to a tenth of its terms',
    errors,
  });
  // 1.5 V inside either rail.
  for (const [volts, limit] of [
    [-100, 10.5],
    [100, -10.5],
  ] as const) {
    const { traces } = await simulate(mix(volts), { ...run, probes: ['sum.out'] });
    expect(traces.sum.out.samples[0]).toBe(limit);
  }
});

test('a buffer has its gain, up to the rails', async () => {
  const stage = patch(
    {
      supply: ['-9 V', '15 V'],
      blocks: {
        bell: oscillator({ frequency: '1 kHz', amplitude: '8 V' }),
        amplifier: buffer({ gain: 2.5, headroomPositive: '1.2 V', headroomNegative: '0.4 V' }),
      },
    },
    ({ bell, amplifier }) => [wire(bell.out, amplifier.in)],
  );
  const { traces } = await simulate(stage, { ...run, probes: ['bell.out', 'amplifier.out'] });
  const { samples } = traces.amplifier.out;
  traces.bell.out.samples.forEach((volts, n) => {
    expect(samples[n]).toBe(Math.min(13.8, Math.max(-8.6, 2.5 * volts)));
  });
});

test('a current drive gives V/R from 0 V to its largest current, a load I·R to its compliance', async () => {
  const at = async (volts: number, ohms: number): Promise<number> => {
    const stage = patch(
      {
        blocks: {
          control: constant({ voltage: `${volts} V` }),
          drive: currentDrive({ resistance: '10k', max: '0.8 mA' }),
          load: load({ resistance: ohms, headroomPositive: '0.7 V' }),
        },
      },
      ({ control, drive, load }) => [wire(control.out, drive.in), wire(drive.out, load.in)],
    );
    return (await simulate(stage, { ...run, probes: ['load.out'] })).traces.load.out.samples[0]!;
  };
  expect(await at(-3, 1e3)).toBe(0);
  expect(await at(3, 1e3)).toBeCloseTo(0.3, 15);
  expect(await at(9, 1e3)).toBeCloseTo(0.8, 15);
  expect(await at(9, 100e3)).toBe(12 - 0.7);
});
