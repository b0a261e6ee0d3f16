import { currentSource, load, mixer, oscillator, ota } from '@tailpair/blocks';
import { cut, patch, simulate, wire } from '@tailpair/core';
import { fitTones } from '@tailpair/core/analysis';
import { expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

/** Amplitudes of 1.9 kHz, of 1.8 kHz = 2·1.9 − 2 and of 5.7 kHz, relative to full output. */
async function products(millivolts: number): Promise<readonly number[]> {
  const pair = patch(
    {
      blocks: {
        bell: oscillator({ frequency: '1.9 kHz', amplitude: `${millivolts} mV` }),
        buoy: oscillator({ frequency: '2 kHz', amplitude: `${millivolts} mV` }),
        sum: mixer({ feedback: '100k' }),
        drive: currentSource({ current: '100 µA' }),
        cell: ota(),
        load: load({ resistance: '10k' }),
      },
    },
    ({ bell, buoy, sum, drive, cell, load }) => [
      wire(bell.out, sum.sum, { via: '100k' }),
      wire(buoy.out, sum.sum, { via: '100k' }),
      wire(sum.out, cell.plus),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  const { traces } = await simulate(pair, { length: '60 ms', probes: ['load.out'] });
  // Both tones, and all their products, are multiples of 100 Hz: the record holds whole periods of every line.
  const { tones } = fitTones(cut(traces.load.out, { from: '10 ms' }), ['1.9 kHz', '1.8 kHz', '5.7 kHz']);
  return tones.map(({ amplitude }) => amplitude);
}

test('two equal tones make the products of tanh', async () => {
  const errors: number[] = [];
  for (const [millivolts, ...expected] of table('tanh/intermodulation.csv')) {
    const measured = await products(millivolts!);
    errors.push(...measured.map((amplitude, i) => amplitude / expected[i]! - 1));
  }
  claim({
    what: 'Two tones of 1 … 50 mV peak each: the tone, 2f₁ − f₂ and 3f₁',
    source: 'double Fourier series of tanh by quadrature in 40 digits (test/reference/tanh)',
    tolerance: 1e-6,
    because: 'the pass band of the decimator is flat to 1e-6',
    errors,
  });
});

test('the third-order intercept of small tones lies at 4V_T', async () => {
  const [tone, product] = await products(1);
  const intercept = 1e-3 / Math.sqrt(product! / tone!);
  const thermalVoltage = (1.380649e-23 * 298.15) / 1.602176634e-19;
  claim({
    what: 'Third-order intercept 4V_T = 102.77 mV peak per tone, extrapolated from 1 mV',
    source: 'power series of the pair, k₁ = 1/2, k₃ = −1/24 (any text on the emitter-coupled pair)',
    tolerance: 3e-4,
    because: 'fifth-order terms, of the order of (1 mV/2V_T)² = 4e-4',
    errors: [intercept / (4 * thermalVoltage) - 1],
  });
  expect(intercept).toBeGreaterThan(0.1);
});
