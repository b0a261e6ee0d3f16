import { bias, currentDrive, lfo, load, oscillator, ota } from '@tailpair/blocks';
import { patch, simulate, type Trace, wire } from '@tailpair/core';
import { modulationDepth, sidebands } from '@tailpair/core/analysis';
import { describe, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

// Sidebands of one harmonic of the tone never meet those of another, and 0.1 s hold whole periods of all lines.
const carrier = 1000;
const modulator = 90;
const run = { length: '0.1 s', probes: ['load.out'], decimate: false } as const;

/** 1 kHz, 50 mV peak at the cell, its bias current 100 µA·(1 + m·sin) through a current drive. */
async function driven(m: number): Promise<Trace> {
  const voice = patch(
    {
      blocks: {
        bell: oscillator({ frequency: `${carrier} Hz`, amplitude: '50 mV' }),
        swing: lfo({ frequency: `${modulator} Hz`, amplitude: `${m} V`, offset: '1 V' }),
        drive: currentDrive({ resistance: '10k' }),
        cell: ota(),
        load: load(),
      },
    },
    ({ bell, swing, drive, cell, load }) => [
      wire(bell.out, cell.plus),
      wire(swing.out, drive.in),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  return (await simulate(voice, run)).traces.load.out;
}

/** The same tone, the swing around `mean` volts through 120 kΩ into a bias pin. */
async function throughPin(mean: number, swing: number): Promise<Trace> {
  const voice = patch(
    {
      blocks: {
        bell: oscillator({ frequency: `${carrier} Hz`, amplitude: '50 mV' }),
        swing: lfo({ frequency: `${modulator} Hz`, amplitude: `${swing} V`, offset: `${mean} V` }),
        bias: bias(),
        cell: ota(),
        load: load(),
      },
    },
    ({ bell, swing, bias, cell, load }) => [
      wire(bell.out, cell.plus),
      wire(swing.out, bias.pin, { via: '120k' }),
      wire(bias.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  return (await simulate(voice, run)).traces.load.out;
}

const text = 'A. Carlson, Communication Systems (from memory)';
const record =
  'a fit of tones to whole periods is good to 1e-12 of the largest; the sidebands of 5 kHz are 1e-3 of it';

describe('a bias current that follows 1 + m·sin', () => {
  test('gives every harmonic of the tone sidebands of m/2', async () => {
    const errors: number[] = [];
    for (const m of [0.1, 0.5, 1]) {
      const trace = await driven(m);
      for (const order of [1, 3, 5]) {
        const [lower, centre, upper] = sidebands(trace, { carrier: order * carrier, modulator, orders: 1 });
        for (const side of [lower!, upper!]) errors.push(side.amplitude / centre!.amplitude / (m / 2) - 1);
      }
    }
    claim({
      what: 'AM through the bias current, m = 0.1, 0.5, 1: sidebands of the tone and of its harmonics are m/2 of them',
      source: text,
      tolerance: 1e-10,
      because: record,
      errors,
    });
  });

  test('cuts off where it would turn negative', async () => {
    const errors: number[] = [];
    for (const m of [1.2, 1.5]) {
      // A cut-off sine, conducting from −c to π + c: its mean and fundamental in closed form.
      const c = Math.asin(1 / m);
      const mean = (Math.PI + 2 * c + 2 * m * Math.cos(c)) / (2 * Math.PI);
      const first = (2 * Math.cos(c) + (m * (Math.PI + 2 * c - Math.sin(2 * c))) / 2) / Math.PI;
      const [lower, centre, upper] = sidebands(await driven(m), { carrier, modulator, orders: 1 });
      for (const side of [lower!, upper!])
        errors.push(side.amplitude / centre!.amplitude / (first / mean / 2) - 1);
    }
    claim({
      what: 'Over-modulation, m = 1.2, 1.5: first-order sidebands of a bias current that stops at zero',
      source: 'Fourier series of a sine cut off at a level (any text on class B and C stages)',
      tolerance: 1e-6,
      because:
        'point samples of a signal with corners: what folds back is of the order of 1/N² at 2133 samples a period',
      errors,
    });
  });
});

describe('a swing through a resistor into the bias pin', () => {
  test('gives the sidebands that the law of the pin has', async () => {
    const errors: number[] = [];
    for (const [mean, swing, , ...expected] of table('worked-example/modulation.csv')) {
      const lines = sidebands(await throughPin(mean!, swing!), { carrier, modulator, orders: 4 });
      const centre = lines[4]!.amplitude;
      for (const { order, amplitude } of lines)
        if (order !== 0) errors.push(amplitude / centre - expected[Math.abs(order) - 1]!);
    }
    claim({
      what: 'AM through 120 kΩ into the bias pin, ±6 V, ±11 V and −0.35 ± 11.65 V: sidebands of order 1 … 4, as shares of the carrier',
      source:
        'Fourier transform of the law by the Wright omega function of scipy (test/reference/worked-example)',
      tolerance: 1e-10,
      because: 'the table is good to 1e-12, the fit too; the rest is rounding in 20 operations',
      errors,
    });
  });

  test('is as deep as the swing over the voltage left above the diode, within what the knee bends', async () => {
    const errors: number[] = [];
    for (const swing of [6, 11]) {
      const depth = modulationDepth(await throughPin(0, swing), { carrier, modulator });
      errors.push(depth / (swing / (12 - 0.55)) - 1);
    }
    claim({
      what: 'Depth of AM through the bias pin, ±6 V and ±11 V around 0 V: swing/(12 V − 0.55 V)',
      source:
        'common practice: a resistor-fed bias current is the voltage above one junction over the resistor',
      tolerance: 0.005,
      because: 'the junction drops 0.45 … 0.6 V over the swing, 0.05 V of 11.5 V',
      errors,
    });
  });
});
