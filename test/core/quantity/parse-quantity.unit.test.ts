import { describe, expect, test } from 'vitest';
import { describeDimension } from '../../../packages/core/src/quantity/describe-dimension.ts';
import { type Dimension, dimensions, overDimension } from '../../../packages/core/src/quantity/dimension.ts';
import { parseQuantity } from '../../../packages/core/src/quantity/parse-quantity.ts';

const {
  ratio,
  voltage,
  current,
  time,
  temperature,
  frequency,
  resistance,
  conductance,
  capacitance,
  power,
  frequencyPerVolt,
  perKelvin,
} = dimensions;

describe('parseQuantity reads', () => {
  // Equal to the last bit: prefix and number are one decimal, rounded once.
  test.each<[string, Dimension, number]>([
    ['120 kΩ', resistance, 120e3],
    ['120 k\u2126', resistance, 120e3],
    ['120kohm', resistance, 120e3],
    ['120 kOhm', resistance, 120e3],
    ['390 ohms', resistance, 390],
    ['120k', resistance, 120e3],
    ['120 k', resistance, 120e3],
    ['3 M', resistance, 3e6],
    ['1 mΩ', resistance, 1e-3],
    ['1 MΩ', resistance, 1e6],
    ['470', resistance, 470],
    ['-12 V', voltage, -12],
    ['\u221212 V', voltage, -12],
    ['+5V', voltage, 5],
    ['10 mV', voltage, 10e-3],
    ['0.3mV', voltage, 0.3e-3],
    ['1e-3 V', voltage, 1e-3],
    ['1E\u22123 V', voltage, 1e-3],
    ['.5 V', voltage, 0.5],
    ['5. V', voltage, 5],
    ['5\u00a0V', voltage, 5],
    ['  5 V\n', voltage, 5],
    ['1 mA', current, 1e-3],
    ['100 uA', current, 100e-6],
    ['100 \u00b5A', current, 100e-6],
    ['100 \u03bcA', current, 100e-6],
    ['10 fA', current, 10e-15],
    ['1 nF', capacitance, 1e-9],
    ['330n', capacitance, 330e-9],
    ['2 s', time, 2],
    ['20 ms', time, 20e-3],
    ['1.5 min', time, 90],
    ['1 h', time, 3600],
    ['1.5 kHz', frequency, 1500],
    ['2 mS', conductance, 2e-3],
    ['250 mW', power, 0.25],
    ['25 °C', temperature, 298.15],
    ['-273.15 °C', temperature, 0],
    ['300 K', temperature, 300],
    ['50 %', ratio, 0.5],
    ['200 ppm', ratio, 200e-6],
    ['0.25', ratio, 0.25],
    ['0', ratio, 0],
    ['100 Hz/V', frequencyPerVolt, 100],
    ['1.5 kHz/V', frequencyPerVolt, 1500],
    ['2 Hz/mV', frequencyPerVolt, 2000],
    ['+3300 ppm/K', perKelvin, 3300e-6],
    ['-100 ppm/°C', perKelvin, -100e-6],
    ['0.0033 /K', perKelvin, 0.0033],
    ['0.5 V/µs', overDimension(voltage, time), 0.5e6],
  ])('%s', (text, want, value) => {
    expect(parseQuantity(text, want)).toBe(value);
  });

  test('bare numbers where they stand for ratios, resistances or where the place allows them', () => {
    expect(parseQuantity(0.5, ratio)).toBe(0.5);
    expect(parseQuantity(120e3, resistance)).toBe(120e3);
    expect(parseQuantity(440, frequency, { bare: true })).toBe(440);
    expect(parseQuantity('440', frequency, { bare: true })).toBe(440);
    expect(parseQuantity('440 Hz', frequency, { bare: true })).toBe(440);
  });

  test.each(Object.entries(dimensions))('the example its errors give for %s', (_name, want) => {
    const examples = describeDimension(want).split(' such as ')[1]!.split(' or ');
    for (const example of examples) expect(parseQuantity(example, want)).toBeGreaterThan(0);
  });
});

describe('parseQuantity refuses, with the cure', () => {
  test.each<[string | number, Dimension, string, string]>([
    [
      '10 kHz',
      resistance,
      'quantity-unit',
      '"10 kHz": "kHz" does not fit; wanted is a resistance in Ω such as 120 kΩ',
    ],
    ['10 mV', current, 'quantity-unit', '"10 mV": "mV" does not fit; wanted is a current in A such as 1 mA'],
    ['50 %', voltage, 'quantity-unit', '"%" does not fit; wanted is a voltage in V such as 10 mV'],
    [
      '120 KΩ',
      resistance,
      'quantity-unit',
      '"KΩ" is no unit; wanted is a resistance in Ω such as 120 kΩ or 4k7',
    ],
    ['10 nf', capacitance, 'quantity-unit', '"nf" is no unit; wanted is a capacitance in F such as 1 nF'],
    [
      '5 V',
      overDimension(voltage, time),
      'quantity-unit',
      '"V" does not fit; wanted is a quantity in V/s such as 1 V/s',
    ],
    ['5 V/', voltage, 'quantity-unit', '"V/" is no unit'],
    ['5', voltage, 'quantity-unit', '"5" lacks its unit; wanted is a voltage in V such as 10 mV'],
    [440, frequency, 'quantity-unit', '440 lacks its unit; wanted is a frequency in Hz such as 1.5 kHz'],
    [
      '0',
      temperature,
      'quantity-unit',
      '"0" lacks its unit; wanted is a temperature in °C or K such as 25 °C',
    ],
    ['5k', ratio, 'quantity-unit', '"k" is no unit; wanted is a plain number or a share such as 0.5 or 50 %'],
    ['1 m', resistance, 'quantity-unit', '"1 m" lacks its unit; 1 mΩ is 0.001 Ω; did you mean 1 MΩ?'],
    ['4m7', resistance, 'quantity-unit', '4.7 mΩ is 0.0047 Ω; did you mean 4.7 MΩ?'],
    ['100n', resistance, 'quantity-unit', '"100n" lacks its unit; write 100 nΩ'],
    ['10 M', capacitance, 'quantity-unit', '10 MF is 10000000 F; did you mean 10 mF or 10 µF?'],
    ['5 m', voltage, 'quantity-unit', '"5 m" lacks its unit; write 5 mV'],
    ['2e2 M', voltage, 'quantity-unit', '2e2 MV is 200000000 V; did you mean 2e2 mV or 2e2 µV?'],
    ['5 M', frequency, 'quantity-unit', '"5 M" lacks its unit; write 5 MHz'],
    ['4K7', temperature, 'quantity-unit', '"4K7": "k" is no unit; wanted is a temperature in °C or K'],
    ['0R1', ratio, 'quantity-unit', '"R" is no unit; wanted is a plain number or a share'],
    ['-300 °C', temperature, 'value-range', '-300 °C is below absolute zero; the lowest is -273.15 °C'],
    ['', voltage, 'quantity-text', 'the value is empty; write a number with its unit, such as 10 mV'],
    [' \t', voltage, 'quantity-text', 'the value is empty'],
    [
      'loud',
      voltage,
      'quantity-text',
      '"loud" does not start with a number; write one with its unit, such as 10 mV',
    ],
    ['k', resistance, 'quantity-text', '"k" does not start with a number'],
    ['5 V 3 V', voltage, 'quantity-text', '"5 V 3 V" holds more than one number; write one with its unit'],
    ['3V3', voltage, 'quantity-text', 'such as 3.3 V'],
    ['10 000 Hz', frequency, 'quantity-text', 'thousands closed up, such as 3.3 V or 10000 Hz'],
    ['1,5 kHz', frequency, 'quantity-text', '"1,5 kHz" is not clear; write decimals with a point'],
    ['1,500 Hz', frequency, 'quantity-text', 'thousands without a separator, such as 1.5 kHz'],
    ["1'500 Hz", frequency, 'quantity-text', 'thousands without a separator'],
    ['1e400 V', voltage, 'quantity-text', '1e400 V is too large to compute with'],
    [`1e${'9'.repeat(50)} V`, voltage, 'quantity-text', 'is too large to compute with'],
    [
      `${'1'.repeat(1000)} V`,
      voltage,
      'quantity-text',
      'is too long for a value; write a number with its unit',
    ],
    [
      Number.NaN,
      voltage,
      'quantity-text',
      'not a number is no value; wanted is a voltage in V such as 10 mV',
    ],
    [Number.POSITIVE_INFINITY, ratio, 'quantity-text', 'infinity is no value'],
    [null as unknown as string, voltage, 'value-kind', 'got null; wanted is a voltage in V such as 10 mV'],
    [[1] as unknown as string, voltage, 'value-kind', 'got object; wanted is a voltage in V such as 10 mV'],
  ])('%j', (input, want, code, message) => {
    expect(() => parseQuantity(input, want, { where: 'pad.top' })).toThrow(
      expect.objectContaining({
        name: 'TailpairError',
        code,
        where: 'pad.top',
        message: expect.stringMatching(/^pad\.top: .*[^.]$/),
      }),
    );
    expect(() => parseQuantity(input, want)).toThrow(message);
  });

  test('a bare text where only a number with a unit is allowed', () => {
    expect(() => parseQuantity('470', resistance, { bare: false })).toThrow('"470" lacks its unit');
    expect(() => parseQuantity(0.5, ratio, { bare: false })).toThrow('0.5 lacks its unit');
  });
});
