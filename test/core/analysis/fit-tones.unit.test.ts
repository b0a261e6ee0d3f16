import { describe, expect, test } from 'vitest';
import { fitTones } from '../../../packages/core/src/analysis/fit-tones.ts';
import { record, turn } from './record.ts';

const tone = record((t) => Math.sin(turn(1000, t)), { length: 4800 });

describe('fitTones refuses', () => {
  test('a record too short for two lines, and says how long it must be', () => {
    expect(() => fitTones(tone, ['1 kHz', '1010 Hz'])).toThrowError(
      expect.objectContaining({
        code: 'record-short',
        message:
          'fitTones: 100 ms of load.out are too short to tell 1.01 kHz from 1 kHz; record at least 200 ms',
      }),
    );
  });
  test('a record too short for one line beside DC', () => {
    expect(() => fitTones(tone, ['19 Hz'])).toThrowError(expect.objectContaining({ code: 'record-short' }));
  });
  test('a line too near half the rate', () => {
    expect(() => fitTones(tone, [23_995])).toThrowError(/its image about half the rate/);
  });
  test.each(['24 kHz', '30 kHz'])('%s at 48 kHz', (frequency) => {
    expect(() => fitTones(tone, [frequency])).toThrowError(
      expect.objectContaining({
        code: 'value-range',
        message: expect.stringContaining('not below half the rate'),
      }),
    );
  });
  test.each([0, -5])('%d Hz', (frequency) => {
    expect(() => fitTones(tone, [frequency])).toThrowError(
      expect.objectContaining({ code: 'value-range', where: 'fitTones.frequencies[0]' }),
    );
  });
  test('a frequency given twice', () => {
    expect(() => fitTones(tone, ['1 kHz', 1000])).toThrowError(
      expect.objectContaining({ code: 'record-invalid' }),
    );
  });
  test('a sample that is not finite, and says where', () => {
    const samples = tone.samples.slice();
    samples[48] = Number.NaN;
    expect(() => fitTones({ ...tone, samples }, ['1 kHz'])).toThrowError(
      expect.objectContaining({
        code: 'record-invalid',
        message: expect.stringMatching(/sample 48 .* 1 ms is NaN/),
      }),
    );
  });
  test('a voltage where a frequency is due', () => {
    expect(() => fitTones(tone, ['1 V'])).toThrowError(expect.objectContaining({ code: 'quantity-unit' }));
  });
});

test('fitTones accepts two whole periods of the spacing', () => {
  expect(
    fitTones(
      record(() => 0, { length: 4800 }),
      ['1 kHz', '1020 Hz'],
    ).residual,
  ).toBe(0);
});

test('fitTones leaves the record alone', () => {
  const before = tone.samples.slice();
  fitTones(tone, ['1 kHz']);
  expect(tone.samples).toEqual(before);
});
