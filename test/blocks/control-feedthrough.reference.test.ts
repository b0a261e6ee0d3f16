import { currentDrive, lfo, load, ota } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { test } from 'vitest';
import { claim } from '../accuracy/claim.ts';

/** Step of the output of a silent cell when its bias current goes from 0 to `amperes` in 10 kΩ. */
async function thump(amperes: number, cell: Parameters<typeof ota>[0]): Promise<number> {
  const stage = patch(
    {
      blocks: {
        control: lfo({
          shape: 'pulse',
          frequency: '500 Hz',
          amplitude: `${amperes * 5000} V`,
          offset: `${amperes * 5000} V`,
        }),
        drive: currentDrive({ resistance: '10k' }),
        cell: ota(cell),
        load: load({ resistance: '10k' }),
      },
    },
    ({ control, drive, cell, load }) => [
      wire(control.out, drive.in),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  const { traces } = await simulate(stage, { length: '2 ms', probes: ['load.out'], decimate: false });
  const { samples, rate } = traces.load.out;
  // High for the first millisecond, low for the second.
  return samples[Math.round(0.5e-3 * rate)]! - samples[Math.round(1.5e-3 * rate)]!;
}

const thermalVoltage = (1.380649e-23 * 298.15) / 1.602176634e-19;

test('control feedthrough is ΔI·tanh(V_os/2V_T) and, for the mirrors, ΔI·ε/2', async () => {
  const errors: number[] = [];
  for (const amperes of [1e-4, 1.8875e-4, 5e-4]) {
    for (const millivolts of [0.1, 1, 5]) {
      const expected = amperes * 1e4 * Math.tanh(millivolts / 1000 / (2 * thermalVoltage));
      errors.push((await thump(amperes, { offset: `${millivolts} mV` })) / expected - 1);
    }
    const mismatch = 0.02;
    errors.push(
      (await thump(amperes, { outputOffset: mismatch / 2 })) / ((amperes * 1e4 * mismatch) / 2) - 1,
    );
  }
  claim({
    what: 'Control feedthrough of 0.1, 1 and 5 mV offset and of a 2 % mirror mismatch, 100 … 500 µA into 10 kΩ',
    source: 'large-signal law of the pair: ΔI·tanh(V_os/2V_T) + ε·ΔI/2',
    tolerance: 1e-12,
    because: 'rounding of a dozen operations, and of V_os against V_T',
    errors,
  });
});

test('1 mV at 188.75 µA into 10 kΩ is a step of 36.7278 mV', async () => {
  claim({
    what: '1 mV of offset, 188.75 µA, 10 kΩ: a thump of 36.727759905 mV, as much as a mirror mismatch of 3.9 %',
    source: 'computed with mpmath 1.3.0, 12 digits',
    tolerance: 1e-9,
    because: 'the twelfth digit of the value; the mismatch is rounded to 12 digits too',
    errors: [
      (await thump(1.8875e-4, { offset: '1 mV' })) / 36.727759905e-3 - 1,
      (await thump(1.8875e-4, { outputOffset: 0.0194584158437 })) / 36.727759905e-3 - 1,
    ],
  });
});
