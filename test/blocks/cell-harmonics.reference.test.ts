import { currentSource, divider, load, oscillator, ota } from '@tailpair/blocks';
import { cut, patch, simulate, type Trace, wire } from '@tailpair/core';
import { dc, harmonics, thd } from '@tailpair/core/analysis';
import { describe, expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

/** A sine of this peak at a cell of 100 µA into 10 kΩ: the output in volts is tanh((offset + sine)/2V_T). */
async function output(millivolts: number, offset = 0): Promise<Trace> {
  const voice = patch(
    {
      blocks: {
        bell: oscillator({ frequency: '1 kHz', amplitude: `${100 * millivolts} mV` }),
        pad: divider({ top: '99k', bottom: '1k' }),
        drive: currentSource({ current: '100 µA' }),
        cell: ota({ offset: `${offset} mV` }),
        load: load({ resistance: '10k' }),
      },
    },
    ({ bell, pad, drive, cell, load }) => [
      wire(bell.out, pad.in),
      wire(pad.out, cell.plus),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  const { traces } = await simulate(voice, { length: '60 ms', probes: ['load.out'] });
  // The way down from the internal rate needs some milliseconds to forget the start.
  return cut(traces.load.out, { from: '10 ms' });
}

const quadrature = 'Fourier coefficients of tanh by quadrature in 40 digits (test/reference/tanh)';
const ripple = 'the pass band of the decimator is flat to 1e-6';
const fundamental = '1 kHz';

describe('a cell driven by a sine', () => {
  test('makes the harmonics of tanh, with and without offset', async () => {
    const errors: number[] = [];
    const means: number[] = [];
    for (const [offset, peak, mean, ...lines] of table('tanh/harmonics.csv')) {
      const trace = await output(peak!, offset);
      for (const { order, amplitude } of harmonics(trace, { fundamental, highest: lines.length })) {
        const expected = lines[order - 1]!;
        // −120 dBc
        if (expected > 1e-6 * lines[0]!) errors.push(amplitude / expected - 1);
      }
      means.push(dc(trace) - mean!);
    }
    claim({
      what: 'Each harmonic above −120 dBc of a sine of 1 … 100 mV peak at a cell of 0, 1 and 5 mV offset',
      source: quadrature,
      tolerance: 1e-6,
      because: ripple,
      errors,
    });
    claim({
      what: 'Mean output at these drives and offsets, as a share of the bias current',
      source: quadrature,
      tolerance: 1e-9,
      because: 'the record holds whole periods; its start is forgotten to −180 dB',
      errors: means,
    });
  });

  test('has the THD of tanh', async () => {
    const errors: number[] = [];
    for (const [peak, expected] of table('tanh/thd.csv'))
      errors.push(thd(await output(peak!), { fundamental, highest: 19 }) / expected! - 1);
    claim({
      what: 'THD_F at 1 … 100 mV peak',
      source: 'exact mean square of tanh of a sine, 40 digits (test/reference/tanh)',
      tolerance: 1e-6,
      because: `${ripple}; harmonics above the 19th add less`,
      errors,
    });
  });

  test('reaches a given THD at the drive computed for it', async () => {
    const errors: number[] = [];
    for (const [ratio, peak] of table('tanh/drive-for-thd.csv'))
      errors.push(thd(await output(peak!), { fundamental, highest: 19 }) / ratio! - 1);
    claim({
      what: 'THD_F at the drives for 0.01 … 10 %, such as 18.0723 mV peak for 1 %',
      source: 'root of the exact THD, 40 digits (test/reference/tanh)',
      tolerance: 1e-6,
      because: ripple,
      errors,
    });
  });

  test('has a third harmonic of (V/V_T)²/48 while the drive is small', async () => {
    const thermalVoltage = (1.380649e-23 * 298.15) / 1.602176634e-19;
    const errors: number[] = [];
    for (const millivolts of [1, 2, 5, 10]) {
      const [, , third] = harmonics(await output(millivolts), { fundamental, highest: 3 });
      errors.push(10 ** (third!.dBc / 20) / ((millivolts / 1000 / thermalVoltage) ** 2 / 48) - 1);
    }
    claim({
      what: 'HD3 = (V/V_T)²/48 at 1 … 10 mV peak',
      source:
        'power series of the pair: D. Pederson, K. Mayaram, Analog Integrated Circuits for Communication, 1991, ch. 2, doi:10.1007/978-1-4757-2128-7_2',
      tolerance: 0.01,
      because: 'the next term of the series, (V/2V_T)²/4, is 0.95 % at 10 mV',
      errors,
    });
    // The formula is the limit of small drive: its own error falls with the square of the drive.
    expect(Math.abs(errors[0]! / errors[3]!)).toBeCloseTo(0.01, 3);
  });
});
