import { lfo, oscillator } from '@tailpair/blocks';
import { patch, simulate, type Trace, wire } from '@tailpair/core';
import { fitTones, sidebands } from '@tailpair/core/analysis';
import cephes from 'cephes';
import { beforeAll, describe, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

/** A sine carrier whose frequency swings by β·(modulator frequency), linearly. */
async function modulated(carrier: number, modulator: number, beta: number): Promise<Trace> {
  const voice = patch(
    {
      blocks: {
        swing: lfo({ frequency: `${modulator} Hz`, amplitude: '1 V' }),
        horn: oscillator({
          frequency: `${carrier} Hz`,
          amplitude: '1 V',
          fmDepth: `${beta * modulator} Hz/V`,
        }),
      },
    },
    ({ swing, horn }) => [wire(swing.out, horn.fm)],
  );
  const { traces } = await simulate(voice, { length: '50 ms', probes: ['horn.out'], decimate: false });
  return traces.horn.out;
}

const chowning =
  'J. Chowning, The synthesis of complex audio spectra by means of frequency modulation, J. Audio Eng. Soc. 21(7), 1973 (from memory)';

describe('linear frequency modulation', () => {
  beforeAll(() => cephes.compiled);

  test('makes lines of J_n of the index', async () => {
    const errors: number[] = [];
    for (const [beta, ...bessel] of table('bessel/bessel-j.csv')) {
      for (const { order, amplitude } of sidebands(await modulated(10_000, 100, beta!), {
        carrier: 10_000,
        modulator: 100,
        orders: 12,
      })) {
        errors.push(amplitude - Math.abs(bessel[Math.abs(order)]!));
        errors.push(amplitude - Math.abs(cephes.jn(Math.abs(order), beta!)));
      }
    }
    claim({
      what: 'FM of 10 kHz by 100 Hz, index 0.1 … 10: the carrier and twelve lines on either side have the magnitude of J_n(β)',
      source: `${chowning}; J_n by mpmath (test/reference/bessel) and by the package cephes`,
      tolerance: 1e-11,
      because:
        'the phase is the integral of the cubic through the samples, off by β·(ωh)⁴/720 = 2e-13·β; adding 9600 steps rounds as much',
      errors,
    });
  });

  test('holds at audio rate, and folds at 0 Hz', async () => {
    const errors: number[] = [];
    const [carrier, modulator] = [3000, 1370];
    for (const beta of [0.5, 1, 2]) {
      const orders = Array.from({ length: 25 }, (_, i) => i - 12);
      const lines = orders.map((n) => Math.abs(carrier + n * modulator));
      const { tones } = fitTones(await modulated(carrier, modulator, beta), lines);
      orders.forEach((n, i) => {
        errors.push(tones[i]!.amplitude - Math.abs(cephes.jn(Math.abs(n), beta)));
      });
    }
    claim({
      what: 'FM of 3 kHz by 1.37 kHz, index 0.5 … 2: lines of order −12 … 12, those below 0 Hz folded',
      source: `${chowning}; J_n by the package cephes`,
      tolerance: 1e-7,
      because: 'the cubic through the modulator, β·(ωh)⁴/720 = 2e-8',
      errors,
    });
  });
});

describe('exponential frequency modulation', () => {
  /** A carrier of `ratio`·100 Hz whose pitch swings by `octaves`, 100 times a second. */
  async function swung(octaves: number, ratio: number): Promise<Trace> {
    const voice = patch(
      {
        blocks: {
          swing: lfo({ frequency: '100 Hz', amplitude: `${octaves} V` }),
          horn: oscillator({ frequency: `${ratio * 100} Hz`, amplitude: '1 V' }),
        },
      },
      ({ swing, horn }) => [wire(swing.out, horn.pitch)],
    );
    const { traces } = await simulate(voice, { length: '2.2 s', probes: ['horn.out'], decimate: false });
    return traces.horn.out;
  }

  test('raises the mean frequency to f₀·I₀(a), cycles counted over whole periods of the modulator', async () => {
    const errors: number[] = [];
    for (const [octaves, mean] of table('exponential-fm/mean.csv')) {
      // Saw of the same pitch: its value is the position in the period.
      const voice = patch(
        {
          blocks: {
            swing: lfo({ frequency: '100 Hz', amplitude: `${octaves} V` }),
            horn: oscillator({ shape: 'saw', frequency: '1 kHz', amplitude: '1 V' }),
          },
        },
        ({ swing, horn }) => [wire(swing.out, horn.pitch)],
      );
      const { traces } = await simulate(voice, { length: '0.101 s', probes: ['horn.out'], decimate: false });
      const { samples, rate } = traces.horn.out;
      const end = 0.1 * rate;
      let turns = (samples[end]! - samples[0]!) / 2;
      for (let n = 1; n <= end; n++) if (samples[n]! < samples[n - 1]!) turns += 1;
      errors.push(1200 * Math.log2(turns / 100 / mean!));
    }
    claim({
      what: 'Mean pitch of a carrier swung by ±0.1 … ±2 octaves: I₀(d·ln 2), 2.0788 … 749.02 cents above its own',
      source: 'mean of exp(a·sin), I₀(a) by mpmath (test/reference/exponential-fm)',
      tolerance: 1e-7,
      unit: 'cents',
      because:
        'the periodic trapezoid in its fourth-order form is exact here; adding 19200 steps rounds by 1e-13 of a turn in 100',
      errors,
    });
  });

  test('makes the unsymmetrical lines of its series', async () => {
    const errors: number[] = [];
    const means = new Map(table('exponential-fm/mean.csv').map(([octaves, mean]) => [octaves!, mean!]));
    for (const [octaves, ratio, ...expected] of table('exponential-fm/lines.csv')) {
      const centre = 100 * ratio! * means.get(octaves!)!;
      const lines = expected
        .map((share, i) => ({ share, frequency: Math.abs(centre + 100 * (i - 12)) }))
        .filter(({ share }) => share > 1e-9);
      const { tones } = fitTones(
        await swung(octaves!, ratio!),
        lines.map(({ frequency }) => frequency),
      );
      tones.forEach(({ amplitude }, i) => {
        errors.push(amplitude - lines[i]!.share);
      });
    }
    claim({
      what: 'Lines f₀·I₀(a) ± n·f_m of exponential FM, ±0.1 … ±1 octave, n to 12, as shares of the carrier',
      source: 'Fourier transform of the phase integrated term by term (test/reference/exponential-fm)',
      tolerance: 1e-8,
      because:
        'lines beyond the twelfth, which the fit does not know, are below 1e-5, and a record of 2.2 s leaks 1e-3 of them',
      errors,
    });
  });
});
