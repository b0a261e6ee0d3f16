import { describe, expect, test } from 'vitest';
import { fitTones } from '../../../packages/core/src/analysis/fit-tones.ts';
import { record, turn } from './record.ts';

// The samples themselves are rounded: to 1 part in 1e16, and their phase to 1e-16 of the turns passed.
const rounding = 1e-12;

describe('fitTones finds again what a record is made of', () => {
  const tones = [
    { frequency: 997, amplitude: 1.5, phase: 0.3 },
    { frequency: 1050.25, amplitude: 0.02, phase: -2 },
    { frequency: 17_003.7, amplitude: 3e-5, phase: 3 },
  ];
  for (const start of [0, 12.345]) {
    test(`three tones and DC, no whole number of periods, from ${start} s`, () => {
      const trace = record(
        (t) =>
          tones.reduce(
            (sum, tone) => sum + tone.amplitude * Math.sin(turn(tone.frequency, t) + tone.phase),
            0.25,
          ),
        { length: 40_001, start },
      );
      const fit = fitTones(trace, ['997 Hz', 1050.25, '17.0037 kHz']);
      fit.tones.forEach((tone, index) => {
        const made = tones[index]!;
        expect(Math.abs(tone.amplitude - made.amplitude)).toBeLessThan(rounding);
        // Time itself is rounded to 2⁻⁵² of itself.
        const clock = 2 * Math.PI * made.frequency * (start + 1) * 2 ** -52;
        expect(Math.abs(tone.phase - made.phase)).toBeLessThan(clock + rounding / made.amplitude);
      });
      expect(Math.abs(fit.dc - 0.25)).toBeLessThan(rounding);
      expect(fit.residual).toBeLessThan(10 * rounding);
    });
  }

  test('sixty tones as close as the record allows', () => {
    const length = 9600;
    const frequencies = Array.from({ length: 60 }, (_, i) => 100.3 + 10 * i);
    const trace = record(
      (t) => frequencies.reduce((sum, f, i) => sum + Math.sin(turn(f, t) + i) / (i + 1), -0.5),
      { length },
    );
    const { tones, dc } = fitTones(trace, frequencies);
    tones.forEach((tone, i) => {
      expect(Math.abs(tone.amplitude * (i + 1) - 1)).toBeLessThan(60 * rounding);
    });
    expect(Math.abs(dc + 0.5)).toBeLessThan(rounding);
  });

  test('a cosine at time 0 has a phase of a quarter turn', () => {
    const { tones } = fitTones(
      record((t) => Math.cos(turn(1000, t))),
      ['1 kHz'],
    );
    expect(tones[0]!.phase).toBeCloseTo(Math.PI / 2, 12);
  });

  test('the residual is the rms of what was not asked for', () => {
    const trace = record((t) => Math.sin(turn(1000, t)) + 0.01 * Math.sin(turn(3000, t)));
    // Both lines have whole periods in one second, so the second is orthogonal to the fit.
    expect(fitTones(trace, ['1 kHz']).residual).toBeCloseTo(0.01 / Math.SQRT2, 12);
  });

  test('order of the frequencies is kept', () => {
    const trace = record((t) => 2 * Math.sin(turn(3000, t)) + Math.sin(turn(1000, t)));
    const { tones } = fitTones(trace, ['3 kHz', '1 kHz']);
    expect(tones.map((tone) => tone.frequency)).toEqual([3000, 1000]);
    expect(tones[0]!.amplitude).toBeCloseTo(2, 12);
  });
});
