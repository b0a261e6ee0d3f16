import { describe, expect, test } from 'vitest';
import { dimensions } from '../../../packages/core/src/quantity/dimension.ts';
import { parsePart } from '../../../packages/core/src/quantity/parse-part.ts';

const { resistance, capacitance, ratio } = dimensions;

describe('parsePart', () => {
  test.each([
    ['120k 1%', 120e3, 0.01],
    ['120k ±1 %', 120e3, 0.01],
    ['120k±1%', 120e3, 0.01],
    ['120 kΩ 0.1 %', 120e3, 0.001],
    ['4k7 +/- .5 %', 4700, 0.005],
    ['390 5%', 390, 0.05],
    ['1R 0%', 1, 0],
  ])('%s', (text, value, tolerance) => {
    expect(parsePart(text, resistance)).toEqual({ value, tolerance });
  });

  test('leaves the tolerance out where none is given', () => {
    expect(parsePart('10 nF', capacitance)).toEqual({ value: 10e-9 });
    expect(parsePart(470, resistance)).toEqual({ value: 470 });
    expect(parsePart('50 %', ratio)).toEqual({ value: 0.5 });
    expect(parsePart('50 % 20 %', ratio)).toEqual({ value: 0.5, tolerance: 0.2 });
  });

  test.each([
    [
      '120k 100%',
      'value-range',
      'the tolerance in "120k 100%" must be below 100 %; write one such as 120k 1 %',
    ],
    ['120 kHz 1%', 'quantity-unit', '"120 kHz": "kHz" does not fit; wanted is a resistance in Ω'],
    ['1 m 5%', 'quantity-unit', 'did you mean 1 MΩ?'],
    ['120k -1%', 'quantity-text', '"120k -1%" holds more than one number'],
    ['1%', 'quantity-unit', '"%" does not fit; wanted is a resistance in Ω'],
    ['4k7J', 'quantity-unit', '"kJ" is no unit; wanted is a resistance in Ω'],
  ])('refuses %s', (text, code, message) => {
    expect(() => parsePart(text, resistance, 'bias.pin')).toThrow(
      expect.objectContaining({ code, where: 'bias.pin', message: expect.stringContaining(`bias.pin: `) }),
    );
    expect(() => parsePart(text, resistance)).toThrow(message);
  });
});
