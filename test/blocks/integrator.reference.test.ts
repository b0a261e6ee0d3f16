import { currentSource, load, oscillator, ota } from '@tailpair/blocks';
import { cut, patch, simulate, type Trace, wire } from '@tailpair/core';
import { fitTones } from '@tailpair/core/analysis';
import { expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';

const leak = 1e15;

/** A cell into a capacitor, the load's resistor a mere leak: an open integrator. */
async function integrator(bias: number, farads: number, frequency: number, peak: number): Promise<Trace> {
  const stage = patch(
    {
      blocks: {
        bell: oscillator({
          shape: frequency > 0 ? 'sine' : 'pulse',
          frequency: `${frequency} Hz`,
          amplitude: `${peak} V`,
        }),
        drive: currentSource({ current: `${bias} A` }),
        cell: ota(),
        load: load({ resistance: leak, capacitance: `${farads} F` }),
      },
    },
    ({ bell, drive, cell, load }) => [
      wire(bell.out, cell.plus),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  return (await simulate(stage, { length: '10 ms', probes: ['load.out'], decimate: false })).traces.load.out;
}

test('an over-driven cell slews its capacitor at I_B/C, up to its compliance', async () => {
  const errors: number[] = [];
  for (const [bias, farads] of [
    [100e-6, 10e-9],
    [10e-6, 1e-9],
    [1e-6, 1e-9],
  ] as const) {
    const { samples, rate } = await integrator(bias, farads, 0, 1);
    // 10 V/ms leaves 1.1 ms to the limit of 11 V.
    const n = Math.round(1e-3 * rate);
    errors.push(samples[n]! / ((bias / farads) * 1e-3) - 1);
    expect(samples.at(-1)).toBeCloseTo(Math.min(11, ((bias / farads) * (samples.length - 1)) / rate), 6);
  }
  claim({
    what: 'Slew rate I_B/C: 10 V/ms and 1 V/ms',
    source: 'definition of capacitance; tanh(19) is 1 to 16 digits',
    tolerance: 1e-9,
    because: 'the leak of 10¹⁵ Ω takes 5e-10 of the current at 10 V, half of that on average',
    errors,
  });
});

test('an integrator has unity gain at gm/2πC', async () => {
  const errors: number[] = [];
  const [kelvin, boltzmann, charge] = [298.15, 1.380649e-23, 1.602176634e-19];
  for (const [bias, farads] of [
    [10e-6, 10e-9],
    [1e-6, 10e-9],
  ] as const) {
    const unity = (bias * charge) / (2 * boltzmann * kelvin) / (2 * Math.PI * farads);
    const trace = await integrator(bias, farads, unity, 1e-5);
    const [tone] = fitTones(cut(trace, { from: '1 ms' }), [unity]).tones;
    errors.push(tone!.amplitude / 1e-5 - 1);
  }
  claim({
    what: 'Unity gain of an open gm-C integrator at gm/2πC: 3097.29 Hz for 10 µA into 10 nF, 309.73 Hz for 1 µA',
    source: 'gm = I_B/2V_T, gain gm/ωC (any text on gm-C filters)',
    tolerance: 3e-7,
    because: 'the cubic through the current, (ωh)⁴/720 = 1.5e-7 at 3.1 kHz; (V/2V_T)²/4 = 1e-8',
    errors,
  });
});
