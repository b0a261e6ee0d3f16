import { coupling, currentDrive, currentSource, load, oscillator } from '@tailpair/blocks';
import { cut, patch, simulate, type Trace, wire } from '@tailpair/core';
import { fitTones } from '@tailpair/core/analysis';
import { describe, expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';

const frequencies = [20, 100, 500, 1000, 2000, 5000, 10_000, 15_000, 19_000, 20_000];

interface Response {
  readonly decibels: number;
  readonly degrees: number;
}

/** Amplitude and phase of a settled trace, relative to a sine of `peak`. */
function responseOf(trace: Trace, frequency: number, peak: number): Response {
  const [tone] = fitTones(cut(trace, { from: '60 ms', length: '0.1 s' }), [frequency]).tones;
  return { decibels: 20 * Math.log10(tone!.amplitude / peak), degrees: (tone!.phase * 180) / Math.PI };
}

/** Deviations from 1/(1 + jx) or jx/(1 + jx). */
function deviation({ decibels, degrees }: Response, x: number, highPass: boolean): [number, number] {
  const magnitude = (highPass ? x : 1) / Math.hypot(1, x);
  const phase = (highPass ? Math.PI / 2 : 0) - Math.atan(x);
  return [decibels - 20 * Math.log10(magnitude), degrees - (phase * 180) / Math.PI];
}

describe('frequency response', () => {
  const text = 'first-order low-pass and high-pass, 1/(1 + j2πfRC) and its complement (any text on circuits)';
  const cubic =
    'between samples a signal is the cubic through them: (ωh)⁴/720 = 2.5e-4, 0.0022 dB, at 20 kHz and 4 × 48 kHz';

  test('of a load is that of R ∥ C', async () => {
    const decibels: number[] = [];
    const degrees: number[] = [];
    for (const frequency of frequencies) {
      for (const farads of [47e-12, 1e-9, 10e-9]) {
        const stage = patch(
          {
            blocks: {
              // 0.1 … 0.9 mA: a current drive gives no negative current.
              bell: oscillator({ frequency: `${frequency} Hz`, amplitude: '4 V', offset: '5 V' }),
              drive: currentDrive({ resistance: '10k' }),
              load: load({ resistance: '10k', capacitance: `${farads} F` }),
            },
          },
          ({ bell, drive, load }) => [wire(bell.out, drive.in), wire(drive.out, load.in)],
        );
        const { traces } = await simulate(stage, { length: '0.17 s', probes: ['load.out'] });
        const response = responseOf(traces.load.out, frequency, 4);
        const [dB, degree] = deviation(response, 2 * Math.PI * frequency * 1e4 * farads, false);
        decibels.push(dB);
        degrees.push(degree);
      }
    }
    claim({
      what: 'Load of 10 kΩ with 47 pF, 1 nF, 10 nF, 20 Hz … 20 kHz: magnitude',
      source: text,
      tolerance: 0.005,
      unit: 'dB',
      because: cubic,
      errors: decibels,
    });
    claim({
      what: 'Load of 10 kΩ with 47 pF, 1 nF, 10 nF, 20 Hz … 20 kHz: phase',
      source: text,
      tolerance: 0.01,
      unit: '°',
      because: cubic,
      errors: degrees,
    });
  });

  async function couplings(picofarads: readonly number[], oversample: number) {
    const decibels: number[] = [];
    const degrees: number[] = [];
    for (const frequency of frequencies) {
      for (const farads of picofarads.map((value) => value * 1e-12)) {
        const stage = patch(
          {
            blocks: {
              bell: oscillator({ frequency: `${frequency} Hz`, amplitude: '4 V' }),
              coupling: coupling({ capacitance: `${farads} F`, resistance: '100k' }),
            },
          },
          ({ bell, coupling }) => [wire(bell.out, coupling.in)],
        );
        const { traces } = await simulate(stage, { length: '0.17 s', probes: ['coupling.out'], oversample });
        const response = responseOf(traces.coupling.out, frequency, 4);
        const [dB, degree] = deviation(response, 2 * Math.PI * frequency * 1e5 * farads, true);
        decibels.push(dB);
        degrees.push(degree);
      }
    }
    return { decibels, degrees };
  }

  test('of a coupling is that of C into R', async () => {
    const { decibels, degrees } = await couplings([150, 1000, 33_000], 4);
    claim({
      what: 'Coupling of 150 pF, 1 nF, 33 nF into 100 kΩ, 20 Hz … 20 kHz: magnitude',
      source: text,
      tolerance: 0.005,
      unit: 'dB',
      because: cubic,
      errors: decibels,
    });
    claim({
      what: 'Coupling of 150 pF, 1 nF, 33 nF into 100 kΩ, 20 Hz … 20 kHz: phase',
      source: text,
      tolerance: 0.01,
      unit: '°',
      because: cubic,
      errors: degrees,
    });
  });

  // A coupling with its corner above the audio band is a differentiator: it shows the second derivative of the
  // cubic, which is off by (ωh)²/12. The worst is RC = h/5: 0.07° at 20 kHz and 4 times, 0.01° at 8 times.
  test('of a coupling that differentiates needs twice the rate', async () => {
    const { decibels, degrees } = await couplings([1, 5, 20], 8);
    claim({
      what: 'Coupling of 1, 5, 20 pF into 100 kΩ, its corner at 80 kHz and above, oversampled 8 times: magnitude',
      source: text,
      tolerance: 0.005,
      unit: 'dB',
      because: cubic,
      errors: decibels,
    });
    claim({
      what: 'Coupling of 1, 5, 20 pF into 100 kΩ, its corner at 80 kHz and above, oversampled 8 times: phase',
      source: text,
      tolerance: 0.01,
      unit: '°',
      because:
        'curvature of the cubic, (ωh)²/12 of the second derivative, which a differentiator shows: 0.009° at worst',
      errors: degrees,
    });
  });
});

describe('step response from rest', () => {
  /** 0.5 mA from the start into R ∥ C, sample by sample, in volts. */
  async function charging(ohms: number, farads: number): Promise<Trace> {
    const stage = patch(
      {
        blocks: {
          source: currentSource({ current: `${5 / ohms} A` }),
          load: load({ resistance: ohms, capacitance: `${farads} F` }),
        },
      },
      ({ source, load }) => [wire(source.out, load.in)],
    );
    return (await simulate(stage, { length: '2 ms', probes: ['load.out'], decimate: false })).traces.load.out;
  }

  test('is the exponential', async () => {
    const errors: number[] = [];
    for (const farads of [1e-15, 1e-12, 100e-12, 1e-9, 10e-9, 1e-6, 1]) {
      const { samples, rate } = await charging(1e4, farads);
      samples.forEach((volts, n) => {
        errors.push(volts / 5 + Math.expm1(-n / rate / (1e4 * farads)));
      });
    }
    claim({
      what: 'A load of RC = 10 ps … 10⁴ s charging from rest, sample by sample, as shares of its end',
      source: '1 − exp(−t/RC) (any text on circuits)',
      tolerance: 1e-13,
      because: 'a linear state under a steady drive is stepped exactly; 384 steps round by 1e-16 each',
      errors,
    });
  });

  test('rises from 10 % to 90 % in ln 9·RC', async () => {
    const errors: number[] = [];
    for (const farads of [10e-9, 30e-9]) {
      const { samples, rate } = await charging(1e4, farads);
      // Between samples the exponential is straight in ln(1 − v).
      const crossing = (level: number): number => {
        const n = samples.findIndex((volts) => volts / 5 >= level);
        const [a, b, at] = [samples[n - 1]! / 5, samples[n]! / 5, level].map((v) => Math.log(1 - v));
        return (n - 1 + (at! - a!) / (b! - a!)) / rate;
      };
      errors.push((crossing(0.9) - crossing(0.1)) / (Math.log(9) * 1e4 * farads) - 1);
    }
    claim({
      what: 'Rise time of a load, 10 … 90 %: ln 9·RC = 2.1972·RC',
      source: 'any text on circuits',
      tolerance: 1e-12,
      because: 'rounding, magnified where the exponential is flat',
      errors,
    });
  });

  test('a coupling passes the step and forgets it', async () => {
    const [ohms, farads] = [1e5, 10e-9];
    const stage = patch(
      {
        blocks: {
          bell: oscillator({ shape: 'pulse', frequency: '0 Hz', amplitude: '5 V' }),
          coupling: coupling({ capacitance: `${farads} F`, resistance: ohms }),
        },
      },
      ({ bell, coupling }) => [wire(bell.out, coupling.in)],
    );
    const { traces } = await simulate(stage, { length: '5 ms', probes: ['coupling.out'], decimate: false });
    const { samples, rate } = traces.coupling.out;
    claim({
      what: 'A coupling of RC = 1 ms after a step, sample by sample, as shares of the step',
      source: 'exp(−t/RC) (any text on circuits)',
      tolerance: 1e-13,
      because: '960 exact steps round by 1e-16 each',
      errors: [...samples].map((volts, n) => volts / 5 - Math.exp(-n / rate / (ohms * farads))),
    });
  });

  test('a load much faster than a sample is the same as one without a capacitor', async () => {
    const loaded = (farads: number) =>
      patch(
        {
          blocks: {
            bell: oscillator({ frequency: '1 kHz', amplitude: '4 V', offset: '5 V' }),
            drive: currentDrive({ resistance: '10k' }),
            load: load({ resistance: '10k', capacitance: `${farads} F` }),
          },
        },
        ({ bell, drive, load }) => [wire(bell.out, drive.in), wire(drive.out, load.in)],
      );
    const run = { length: '2 ms', probes: ['load.out'], decimate: false } as const;
    const bare = (await simulate(loaded(0), run)).traces.load.out.samples;
    const tiny = (await simulate(loaded(1e-18), run)).traces.load.out.samples;
    // From rest the first sample is 0 V with a capacitor, however small.
    const errors = [...tiny.subarray(1)].map((volts, i) => volts / bare[i + 1]! - 1);
    expect(tiny[0]).toBe(0);
    claim({
      what: 'A load of RC = 10 fs follows its current as if there were no capacitor',
      source: 'limit RC → 0',
      tolerance: 1e-9,
      because: 'the lag itself: ωRC = 6e-11',
      errors,
    });
  });
});
