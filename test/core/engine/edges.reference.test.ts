import { buffer, coupling, currentSource, lfo, load, mixer, oscillator, ota } from '@tailpair/blocks';
import { type Patch, patch, simulate, wire } from '@tailpair/core';
import { describe, expect, test } from 'vitest';
import { realSpectrum } from '../../../packages/core/src/numeric/fft.ts';

const size = 2 ** 15;
const rate = 48000;
/** Odd numbers of periods in the record: what folds back misses every harmonic that counts. */
const periods = [75, 301, 1205, 2861];

type Out = 'it.out';

/** Peak of each line of a record of whole periods, after the start has settled. */
async function lines(built: Patch<Out>, oversample = 4): Promise<Float64Array> {
  const settle = 4800;
  const { traces } = await simulate(built, {
    length: (size + settle) / rate,
    probes: ['it.out'],
    oversample,
    edges: 'carried',
  });
  const { re, im } = realSpectrum(traces.it.out.samples.slice(settle, settle + size));
  return re.map((a, bin) => (2 * Math.hypot(a, im[bin]!)) / size);
}

const audible = Math.floor((20000 * size) / rate);

/** Worst line below 20 kHz that is no harmonic, in dB below the fundamental. */
function worstInharmonic(spectrum: Float64Array, fundamental: number): number {
  let worst = 0;
  for (let bin = 1; bin <= audible; bin++) {
    if (bin % fundamental !== 0) worst = Math.max(worst, spectrum[bin]!);
  }
  return 20 * Math.log10(worst / spectrum[fundamental]!);
}

const hertz = (k: number, factor = 1): string => `${(factor * k * rate) / size} Hz`;

describe.each(periods)('at %i periods in 32768 samples', (k) => {
  // Fourier series of the ideal waveforms (any text): saw 2/πm, pulse 4/πm·sin πmd, triangle 8/(πm)², odd m.
  const shapes = {
    saw: (m: number) => 2 / (Math.PI * m),
    pulse: (m: number) => Math.abs((4 / (Math.PI * m)) * Math.sin(0.3 * Math.PI * m)),
    triangle: (m: number) => (m % 2 === 0 ? 0 : 8 / (Math.PI * m) ** 2),
  } as const;

  test.each(Object.entries(shapes))('%s', async (shape, amplitude) => {
    const it = oscillator({
      shape: shape as keyof typeof shapes,
      width: '30 %',
      frequency: hertz(k),
      amplitude: '1 V',
    });
    const spectrum = await lines(patch({ blocks: { it } }, () => []));
    // Nothing may be heard of the sampling: 160 dB is beyond 24 bits.
    expect(worstInharmonic(spectrum, k)).toBeLessThan(-160);
    for (let m = 1; m * k <= audible; m++) {
      // 0.001 dB: the kernel's pass band is flat to 0.00003 dB at 20 kHz, the decimator's to 1e-6.
      const expected = amplitude(m);
      if (expected > 1e-3)
        expect(Math.abs(20 * Math.log10(spectrum[m * k]! / expected)), `harmonic ${m}`).toBeLessThan(1e-3);
    }
  });

  test('hard sync', async () => {
    const built = patch(
      {
        blocks: {
          master: oscillator({ shape: 'saw', frequency: hertz(k) }),
          it: oscillator({ shape: 'saw', frequency: hertz(k, 2.37), amplitude: '1 V', syncThreshold: '0 V' }),
        },
      },
      ({ master, it }) => [wire(master.out, it.sync)],
    );
    expect(worstInharmonic(await lines(built), k)).toBeLessThan(-160);
  });

  test('a sine and a triangle that clip at the rails of a buffer', async () => {
    for (const shape of ['sine', 'triangle'] as const) {
      const tone = oscillator({ shape, frequency: hertz(k), amplitude: '15 V' });
      const built = patch({ blocks: { tone, it: buffer() } }, ({ tone: from, it }) => [
        wire(from.out, it.in),
      ]);
      expect(worstInharmonic(await lines(built), k), shape).toBeLessThan(-150);
    }
  });

  test('a saw of 100 mV into a cell, alone and into 10 kΩ and 1 nF', async () => {
    const source = {
      saw: oscillator({ shape: 'saw', frequency: hertz(k), amplitude: '100 mV' }),
      drive: currentSource({ current: '100 uA' }),
    };
    const bare = patch({ blocks: { ...source, it: ota() } }, ({ saw, drive, it }) => [
      wire(saw.out, it.plus),
      wire(drive.out, it.bias),
    ]);
    const spectrum = await lines(bare);
    expect(worstInharmonic(spectrum, k)).toBeLessThan(-150);
    // Fourier series of tanh(x·saw), x = 1.94608722481, by composite Gauss quadrature.
    const exact = [0.8837734474322274, 0.2887735109964177, 0.20651735401349727];
    exact.forEach((share, i) => {
      const m = i + 1;
      if (m * k <= audible)
        expect(Math.abs(20 * Math.log10(spectrum[m * k]! / (share * 1e-4)))).toBeLessThan(1e-3);
    });
    const loaded = patch(
      { blocks: { ...source, cell: ota({ offset: '1.5 mV' }), it: load({ capacitance: '1 nF' }) } },
      ({ saw, drive, cell, it }) => [
        wire(saw.out, cell.plus),
        wire(drive.out, cell.bias),
        wire(cell.out, it.in),
      ],
    );
    expect(worstInharmonic(await lines(loaded), k)).toBeLessThan(-150);
  });
});

/** Amplitude of harmonic `m` of tanh(x·saw), by the midpoint rule on its smooth period, to ten digits. */
function bentSaw(m: number, x: number): number {
  const points = 200_000;
  let re = 0;
  let im = 0;
  for (let i = 0; i < points; i++) {
    const turn = (i + 0.5) / points;
    const y = Math.tanh(x * (2 * turn - 1));
    re += y * Math.cos(2 * Math.PI * m * turn);
    im += y * Math.sin(2 * Math.PI * m * turn);
  }
  return (2 / points) * Math.hypot(re, im);
}

describe.each([301, 2861])('behind a load much faster than the samples, at %i periods', (k) => {
  const source = {
    saw: oscillator({ shape: 'saw', frequency: hertz(k), amplitude: '100 mV' }),
    drive: currentSource({ current: '100 uA' }),
    cell: ota(),
  };
  // 10 kΩ and 47 pF: 339 kHz.
  const gain = (frequency: number): number => 1 / Math.hypot(1, 2 * Math.PI * frequency * 10e3 * 47e-12);

  test('10 kΩ and 47 pF', async () => {
    const built = patch(
      { blocks: { ...source, it: load({ capacitance: '47 pF' }) } },
      ({ saw, drive, cell, it }) => [
        wire(saw.out, cell.plus),
        wire(drive.out, cell.bias),
        wire(cell.out, it.in),
      ],
    );
    const spectrum = await lines(built);
    expect(worstInharmonic(spectrum, k)).toBeLessThan(-160);
    for (let m = 1; m * k <= audible && m <= 12; m++) {
      const expected = bentSaw(m, 1.94608722481135) * gain((m * k * rate) / size);
      // The load sees the cubic through band-limited samples: 0.002 dB short at 20 kHz, (f/f_s)⁴ below.
      expect(Math.abs(20 * Math.log10(spectrum[m * k]! / expected)), `harmonic ${m}`).toBeLessThan(2.5e-3);
    }
  });

  test('and a coupling after it', async () => {
    const built = patch(
      { blocks: { ...source, load: load({ capacitance: '47 pF' }), it: coupling({ capacitance: '10 nF' }) } },
      ({ saw, drive, cell, load: between, it }) => [
        wire(saw.out, cell.plus),
        wire(drive.out, cell.bias),
        wire(cell.out, between.in),
        wire(between.out, it.in),
      ],
    );
    expect(worstInharmonic(await lines(built), k)).toBeLessThan(-120);
  });
});

describe('identities of waveforms', () => {
  const run = async (built: Patch<Out>, chunk = 128): Promise<Float64Array> =>
    (await simulate(built, { length: '50 ms', probes: ['it.out'], edges: 'carried', chunk })).traces.it.out
      .samples;
  const sum = (frequency: string, phases: readonly string[], signs: readonly number[]): Patch<Out> =>
    patch(
      {
        blocks: {
          a: oscillator({ shape: 'saw', frequency, amplitude: '1 V', phase: phases[0]! }),
          b: oscillator({ shape: 'saw', frequency, amplitude: '1 V', phase: phases[1]! }),
          turn: mixer({ feedback: '100k' }),
          it: mixer({ feedback: '100k' }),
        },
      },
      ({ a, b, turn, it }) => [
        wire(a.out, it.sum, { via: '100k' }),
        ...(signs[1] === 1
          ? [wire(b.out, it.sum, { via: '100k' })]
          : [wire(turn.out, it.sum, { via: '100k' })]),
        wire(b.out, turn.sum, { via: '100k' }),
      ],
    );

  test('two saws half a period apart are a saw of twice the frequency', async () => {
    const both = await run(sum('1234.5 Hz', ['0 %', '50 %'], [1, 1]));
    const one = await run(
      patch(
        { blocks: { it: oscillator({ shape: 'saw', frequency: '2469 Hz', amplitude: '1 V' }) } },
        () => [],
      ),
    );
    // The mixer inverts. Corrections go through a table good to 3e-8.
    both.forEach((x, n) => expect(Math.abs(x + one[n]!)).toBeLessThan(1e-7));
  });

  test('a pulse is the difference of two saws, and its mean', async () => {
    const saws = await run(sum('1234.5 Hz', ['0 %', '70 %'], [1, -1]));
    const pulse = await run(
      patch(
        {
          blocks: {
            it: oscillator({ shape: 'pulse', width: '30 %', frequency: '1234.5 Hz', amplitude: '1 V' }),
          },
        },
        () => [],
      ),
    );
    // saw(θ) − saw(θ − 0.3) is −1.4 in the first 30 % and 0.6 after; the mixer turns it round.
    saws.forEach((x, n) => expect(Math.abs(x - (pulse[n]! + 0.4))).toBeLessThan(1e-7));
  });

  test.each(['1 nF', '47 pF'])('chunks leave no trace where edges meet, into %s', async (capacitance) => {
    const built = patch(
      {
        blocks: {
          saw: oscillator({ shape: 'saw', frequency: '4181 Hz', amplitude: '100 mV' }),
          wobble: lfo({ shape: 'pulse', frequency: '1801 Hz', amplitude: '1 V' }),
          drive: currentSource({ current: '100 uA' }),
          cell: ota({ offset: '1 mV' }),
          it: load({ capacitance }),
        },
      },
      ({ saw, wobble, drive, cell, it }) => [
        wire(wobble.out, saw.pitch),
        wire(saw.out, cell.plus),
        wire(drive.out, cell.bias),
        wire(cell.out, it.in),
      ],
    ) as Patch<Out>;
    const whole = await run(built);
    for (const chunk of [1, 7, 1000]) expect(await run(built, chunk)).toEqual(whole);
  });
});
