import { constant, lfo, oscillator } from '@tailpair/blocks';
import { cut, patch, simulate, type Trace, wire } from '@tailpair/core';
import { fitTones, harmonics } from '@tailpair/core/analysis';
import { describe, expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';

type Shape = 'sine' | 'triangle' | 'saw' | 'pulse';

/** The ideal waveforms by their position in the period: zero and rising, or high, at its start; the saw starts at −1. */
const ideal: Record<Shape, (turn: number) => number> = {
  sine: (x) => Math.sin(2 * Math.PI * x),
  triangle: (x) => (2 / Math.PI) * Math.asin(Math.sin(2 * Math.PI * x)),
  saw: (x) => 2 * x - 1,
  pulse: (x) => (x < 0.5 ? 1 : -1),
};
const shapes = Object.keys(ideal) as Shape[];
const fraction = (x: number): number => x - Math.floor(x);
/** Whether a position stands so close to a jump or corner that rounding may put it on either side. */
const atEdge = (turn: number): boolean => Math.abs(2 * turn - Math.round(2 * turn)) < 1e-6;

const raw = { length: '50 ms', probes: ['wave.out'], decimate: false } as const;
const definition = 'definition of the waveforms';

describe('samples of the ideal waveforms', () => {
  test('of an oscillator and an lfo', async () => {
    const errors: number[] = [];
    for (const shape of shapes) {
      const settings = { shape, frequency: '441.7 Hz', amplitude: '2 V', offset: '1 V', phase: '15 %' };
      for (const wave of [oscillator(settings), lfo(settings)]) {
        const { samples, rate } = (
          await simulate(
            patch({ blocks: { wave } }, () => []),
            raw,
          )
        ).traces.wave.out;
        samples.forEach((volts, n) => {
          const turn = fraction(0.15 + (441.7 * n) / rate);
          if (!atEdge(turn)) errors.push((volts - 1) / 2 - ideal[shape](turn));
        });
      }
    }
    claim({
      what: 'Sine, triangle, saw and pulse of 441.7 Hz from a phase of 15 %, sample by sample, as shares of the peak',
      source: definition,
      tolerance: 1e-11,
      because: 'adding 9600 steps of phase rounds by 1e-16 of a turn each, 2π of that in the sine',
      errors,
    });
  });

  test('of an oscillator that another one restarts between samples', async () => {
    const [master, slave] = [211.3, 977.1];
    const errors: number[] = [];
    for (const shape of shapes) {
      const synced = patch(
        {
          blocks: {
            lead: oscillator({ frequency: `${master} Hz`, amplitude: '5 V' }),
            wave: oscillator({ shape, frequency: `${slave} Hz`, amplitude: '1 V' }),
          },
        },
        ({ lead, wave }) => [wire(lead.out, wave.sync)],
      );
      const { samples, rate } = (await simulate(synced, raw)).traces.wave.out;
      // A sine of 5 V passes 1 V upward at arcsin(0.2).
      const first = Math.asin(0.2) / (2 * Math.PI * master);
      samples.forEach((volts, n) => {
        const since = n / rate - first;
        const turn = fraction(slave * (since < 0 ? n / rate : fraction(since * master) / master));
        if (!atEdge(turn)) errors.push(volts - ideal[shape](turn));
      });
    }
    claim({
      what: 'Hard sync of 977.1 Hz by a sine of 211.3 Hz through 1 V, sample by sample, as shares of the peak',
      source: definition,
      tolerance: 1e-9,
      because:
        'the threshold is met on the cubic through the sine, (ωh)⁴/384 = 6e-12 of 1/ω, 4 turns of the saw a period',
      errors,
    });
  });

  test('of an lfo that is reset', async () => {
    const reset = patch(
      {
        blocks: {
          lead: lfo({ shape: 'triangle', frequency: '73 Hz', amplitude: '5 V' }),
          wave: lfo({ shape: 'saw', frequency: '190 Hz', amplitude: '1 V', phase: '25 %' }),
        },
      },
      ({ lead, wave }) => [wire(lead.out, wave.reset)],
    );
    const { samples, rate } = (await simulate(reset, raw)).traces.wave.out;
    // A triangle of 5 V passes 1 V upward after a twentieth of its period.
    const first = 0.05 / 73;
    const errors: number[] = [];
    samples.forEach((volts, n) => {
      const since = n / rate - first;
      const turn = fraction(0.25 + 190 * (since < 0 ? n / rate : fraction(since * 73) / 73));
      if (!atEdge(turn)) errors.push(volts - ideal.saw(turn));
    });
    claim({
      what: 'Reset of an lfo of 190 Hz to 25 % by a triangle of 73 Hz through 1 V, sample by sample, as shares of the peak',
      source: definition,
      tolerance: 1e-11,
      because: 'rounding: the triangle is straight where it passes the threshold',
      errors,
    });
  });
});

// Any text on Fourier series.
const series: Record<Exclude<Shape, 'sine'>, (m: number, width: number) => number> = {
  saw: (m) => 2 / (Math.PI * m),
  triangle: (m) => (m % 2 === 0 ? 0 : 8 / (Math.PI * m) ** 2),
  pulse: (m, width) => Math.abs((4 / (Math.PI * m)) * Math.sin(Math.PI * m * width)),
};

/** Levels, dB, of the harmonics below 20 kHz over the series, of those that are there. */
function levels(trace: Trace, frequency: number, expected: (m: number) => number): number[] {
  const highest = Math.floor(20_000 / frequency);
  return harmonics(cut(trace, { from: '20 ms' }), { fundamental: frequency, highest }).flatMap(
    ({ order, amplitude }) => {
      const wanted = expected(order);
      return wanted > 1e-9 ? [20 * Math.log10(amplitude / wanted)] : [];
    },
  );
}

describe('harmonics in the audio band', () => {
  const ripple = 'the correction of an edge is flat to 3e-5 dB at 20 kHz, the decimator to 8e-6 dB';

  test('with edges carried, are those of the series', async () => {
    const errors: number[] = [];
    for (const shape of ['saw', 'triangle', 'pulse'] as const) {
      // 0.2 s hold whole periods of these, and of what folds back between 20 kHz and 24 kHz.
      for (const frequency of [110, 440, 1760, 4180]) {
        const wave = oscillator({ shape, frequency: `${frequency} Hz`, amplitude: '1 V' });
        const run = { length: '0.22 s', probes: ['wave.out'], edges: 'carried' } as const;
        const { traces } = await simulate(
          patch({ blocks: { wave } }, () => []),
          run,
        );
        errors.push(...levels(traces.wave.out, frequency, (m) => series[shape](m, 0.5)));
      }
    }
    claim({
      what: 'Harmonics to 20 kHz of saw, triangle and square, 110 Hz … 4180 Hz, edges carried',
      source: 'Fourier series 2/πm, 8/(πm)², 4/πm (any text)',
      tolerance: 1e-3,
      unit: 'dB',
      because: ripple,
      errors,
    });
  });

  test('of a pulse follow its width, a tenth of a period per volt', async () => {
    const errors: number[] = [];
    for (const volts of [-4, -2.5, 0, 1, 3]) {
      const widened = patch(
        {
          blocks: {
            control: constant({ voltage: `${volts} V` }),
            wave: oscillator({ shape: 'pulse', frequency: '440 Hz', amplitude: '1 V' }),
          },
        },
        ({ control, wave }) => [wire(control.out, wave.width)],
      );
      const run = { length: '0.22 s', probes: ['wave.out'], edges: 'carried' } as const;
      const { wave } = (await simulate(widened, run)).traces;
      const width = 0.5 + volts / 10;
      errors.push(...levels(wave.out, 440, (m) => series.pulse(m, width)));
      // The mean of a pulse is 2d − 1.
      const all = Array.from({ length: 50 }, (_, i) => 440 * (i + 1));
      expect(fitTones(cut(wave.out, { from: '20 ms' }), all).dc).toBeCloseTo(2 * width - 1, 6);
    }
    claim({
      what: 'Harmonics to 20 kHz of a pulse of 440 Hz, 10 % … 80 % wide by −4 … 3 V, edges carried',
      source: 'Fourier series 4/πm·sin πmd (any text)',
      tolerance: 1e-3,
      unit: 'dB',
      because: ripple,
      errors,
    });
  });

  test('of point samples stray by what sampling folds back', async () => {
    const errors: number[] = [];
    const frequency = 1000;
    for (const shape of ['saw', 'triangle', 'pulse'] as const) {
      // 1536 samples a period at 32 times 48 kHz; half a sample of phase keeps the jumps between them.
      const wave = oscillator({ shape, frequency: '1 kHz', amplitude: '1 V', phase: 0.5 / 1536 });
      const run = { length: '10 ms', probes: ['wave.out'], decimate: false, oversample: 32 } as const;
      const { traces } = await simulate(
        patch({ blocks: { wave } }, () => []),
        run,
      );
      const orders = Array.from({ length: 20 }, (_, i) => i + 1);
      const { tones } = fitTones(
        traces.wave.out,
        orders.map((m) => m * frequency),
      );
      orders.forEach((m, i) => {
        const wanted = series[shape](m, 0.5);
        if (wanted > 1e-9) errors.push(tones[i]!.amplitude / wanted - 1);
      });
    }
    claim({
      what: 'Harmonics 1 … 20 of point samples of saw, triangle and square of 1 kHz, 1536 a period',
      source: 'Fourier series 2/πm, 8/(πm)², 4/πm (any text)',
      tolerance: 6e-4,
      because:
        'aliases of all the jumps’ harmonics: (πm/N)²/6 for steps and twice that for corners, at m = 20',
      errors,
    });
  });
});
