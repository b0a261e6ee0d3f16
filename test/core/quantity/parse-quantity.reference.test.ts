import { describe, expect, test } from 'vitest';
import { dimensions } from '../../../packages/core/src/quantity/dimension.ts';
import { parseQuantity } from '../../../packages/core/src/quantity/parse-quantity.ts';

/**
 * IEC 60062:2016, Marking codes for resistors and capacitors (from memory): the letter is the
 * decimal point and the multiplier. Exact, as the codes are decimal.
 */
describe('letter codes of IEC 60062', () => {
  test.each<[string, number]>([
    ['R10', 0.1],
    ['0R1', 0.1],
    ['R47', 0.47],
    ['4R7', 4.7],
    ['100R', 100],
    ['1K0', 1e3],
    ['4K7', 4700],
    ['4k7', 4700],
    ['3K32', 3320],
    ['47K', 47e3],
    ['1M0', 1e6],
    ['2M2', 2.2e6],
    ['10M', 10e6],
    ['1G0', 1e9],
    ['1T0', 1e12],
  ])('resistance %s', (code, ohms) => {
    expect(parseQuantity(code, dimensions.resistance)).toBe(ohms);
  });

  test.each<[string, number]>([
    ['p33', 0.33e-12],
    ['3p32', 3.32e-12],
    ['4p7', 4.7e-12],
    ['150p', 150e-12],
    ['2n2', 2.2e-9],
    ['4n7', 4.7e-9],
    ['4\u00b57', 4.7e-6],
    ['4\u03bc7', 4.7e-6],
    ['4u7', 4.7e-6],
    ['4\u00b57F', 4.7e-6],
    ['1m5', 1.5e-3],
    ['1F0', 1],
  ])('capacitance %s', (code, farads) => {
    expect(parseQuantity(code, dimensions.capacitance)).toBe(farads);
  });

  test('mega is no capacitor code and milli no resistor code', () => {
    expect(() => parseQuantity('4M7', dimensions.capacitance)).toThrow('did you mean 4.7 mF or 4.7 µF?');
    expect(() => parseQuantity('4m7', dimensions.resistance)).toThrow('did you mean 4.7 MΩ?');
  });
});
