import { readFileSync } from 'node:fs';
import cephes from 'cephes';
import { beforeAll, describe, expect, test } from 'vitest';
import { decibels } from '../../../packages/core/src/analysis/decibels.ts';
import { harmonics } from '../../../packages/core/src/analysis/harmonics.ts';
import { modulationDepth } from '../../../packages/core/src/analysis/modulation-depth.ts';
import { sidebands } from '../../../packages/core/src/analysis/sidebands.ts';
import { record, turn } from './record.ts';

const rows = (path: string): number[][] =>
  readFileSync(new URL(`../../reference/${path}`, import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(',').map(Number));

// Sidebands of a sinusoidally amplitude-modulated carrier are m/2 each: any communications text
// (A. Carlson, Communication Systems; from memory).
describe('amplitude modulation', () => {
  for (const m of [0.1, 0.5, 1, 1.5]) {
    const whole = record((t) => (1 + m * Math.sin(turn(100, t))) * 2 * Math.sin(turn(1000, t)));
    const broken = record((t) => (1 + m * Math.sin(turn(97.3, t))) * 2 * Math.sin(turn(1003.7, t)), {
      length: 24_001,
    });

    test(`depth ${m}: sidebands are m/2 of the carrier`, () => {
      const [, lower, centre, upper] = sidebands(whole, { carrier: '1 kHz', modulator: '100 Hz' });
      // The carrier is exact to the rounding of the samples, 1e-16 of them; a dB is 0.1 in relative terms.
      expect(Math.abs(lower!.dBc - decibels(m / 2))).toBeLessThan(1e-11);
      expect(Math.abs(upper!.dBc - decibels(m / 2))).toBeLessThan(1e-11);
      expect(centre).toMatchObject({ order: 0, frequency: 1000, dBc: 0 });
    });
    test(`depth ${m}: found from the sidebands, over-modulated or not, whole periods or not`, () => {
      expect(Math.abs(modulationDepth(whole, { carrier: '1 kHz', modulator: '100 Hz' }) - m)).toBeLessThan(
        1e-11,
      );
      expect(Math.abs(modulationDepth(broken, { carrier: 1003.7, modulator: 97.3 }) - m)).toBeLessThan(1e-11);
    });
  }
});

// Lines of a frequency-modulated carrier are J_n(β): J. Chowning, "The synthesis of complex audio spectra by
// means of frequency modulation", J. Audio Eng. Soc. 21(7), 1973 (from memory).
describe('frequency modulation', () => {
  beforeAll(() => cephes.compiled);
  const orders = 8;

  for (const [beta, ...bessel] of rows('bessel/bessel-j.csv') as [number, ...number[]][]) {
    const lines = (): ReturnType<typeof sidebands> => {
      const trace = record((t) => Math.sin(turn(10_000, t) + beta * Math.sin(turn(100, t))));
      return sidebands(trace, { carrier: '10 kHz', modulator: '100 Hz', orders });
    };
    test(`index ${beta}: lines are J_n of the table`, () => {
      for (const { order, amplitude } of lines()) {
        // Rounding of the sine's argument, up to 16 rad, is 2e-15.
        expect(Math.abs(amplitude - Math.abs(bessel[Math.abs(order)]!))).toBeLessThan(1e-13);
      }
    });
    test(`index ${beta}: lines are J_n of a special-function library`, () => {
      for (const { order, amplitude } of lines()) {
        // The library states 4e-16 … 4e-15 absolute for its J_n; the rest is the rounding above.
        expect(Math.abs(amplitude - Math.abs(cephes.jn(Math.abs(order), beta)))).toBeLessThan(1e-13);
      }
    });
  }

  test('lines that would lie below 0 Hz appear folded', () => {
    const trace = record((t) => Math.sin(turn(300, t) + 2 * Math.sin(turn(250, t))));
    const [second] = sidebands(trace, { carrier: '300 Hz', modulator: '250 Hz' });
    expect(second).toMatchObject({ order: -2, frequency: 200 });
    expect(Math.abs(second!.amplitude - Math.abs(cephes.jn(2, 2)))).toBeLessThan(1e-13);
  });
});

describe('a limited tone under amplitude modulation', () => {
  const [drive, thermalVoltage] = [0.05, (1.380649e-23 * 298.15) / 1.602176634e-19];
  const trace = record(
    (t) =>
      (1 + 0.5 * Math.sin(turn(100, t))) *
      Math.tanh((drive / (2 * thermalVoltage)) * Math.sin(turn(1000, t))),
    { length: 4800 },
  );
  const reference = new Map(rows('modulation/am-of-tanh.csv').map(([hertz, , dB]) => [hertz!, dB!]));

  test.each([1, 3, 5])('harmonic %d carries sidebands of m/2 re itself', (order) => {
    const table = sidebands(trace, { carrier: 1000 * order, modulator: '100 Hz', orders: 1 });
    // The reference levels are good to 1e-9 dB.
    for (const line of [table[0]!, table[2]!]) {
      expect(
        Math.abs(line.dBc - (reference.get(line.frequency)! - reference.get(1000 * order)!)),
      ).toBeLessThan(1e-8);
    }
  });
  test('its harmonics stand at the levels of a Fourier transform', () => {
    for (const { order, dBc } of harmonics(trace, { fundamental: '1 kHz', highest: 5 })) {
      if (order % 2 === 1) expect(Math.abs(dBc - reference.get(1000 * order)!)).toBeLessThan(1e-8);
    }
  });
});
