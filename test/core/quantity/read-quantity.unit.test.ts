import { describe, expect, test } from 'vitest';
import { type Dimension, dimensions, sameDimension } from '../../../packages/core/src/quantity/dimension.ts';
import { readQuantity } from '../../../packages/core/src/quantity/read-quantity.ts';

describe('readQuantity', () => {
  test.each<[string, number, Dimension]>([
    ['1 mA', 1e-3, dimensions.current],
    ['25 °C', 298.15, dimensions.temperature],
    ['4k7Ω', 4700, dimensions.resistance],
    ['2', 2, dimensions.ratio],
    ['50 %', 0.5, dimensions.ratio],
    ['1 /K', 1, dimensions.perKelvin],
  ])('takes value and dimension from %s', (text, value, dimension) => {
    const read = readQuantity(text);
    expect(read.value).toBe(value);
    expect(sameDimension(read.dimension, dimension)).toBe(true);
  });

  test.each(['120k', '100R', '4k7', '4n7'])(
    'refuses %s: without its unit nothing says what it measures',
    (text) => {
      expect(() => readQuantity(text, 'ota.out')).toThrow(
        expect.objectContaining({
          code: 'quantity-unit',
          message: expect.stringMatching(
            /^ota\.out: "\w+": "\w" is no unit; write it in full, such as 10 mV/,
          ),
        }),
      );
    },
  );
});
