import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { type Dimension, dimensions, overDimension } from '../../../packages/core/src/quantity/dimension.ts';
import { TailpairError } from '../../../packages/core/src/quantity/error.ts';
import { formatQuantity } from '../../../packages/core/src/quantity/format-quantity.ts';
import { parsePart } from '../../../packages/core/src/quantity/parse-part.ts';
import { parseQuantity } from '../../../packages/core/src/quantity/parse-quantity.ts';

const seed = 20260131;
const wanted: readonly Dimension[] = [
  ...Object.values(dimensions),
  overDimension(dimensions.voltage, dimensions.time),
];

const arbitraryText = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 200 }),
  // What values are made of, put together at random.
  fc
    .array(
      fc.constantFrom(
        ...[
          '4',
          '7',
          '00',
          '.',
          'e',
          '-',
          '\u2212',
          '+',
          ' ',
          '\u00a0',
          ',',
          '/',
          '%',
          '±',
          'k',
          'K',
          'm',
          'M',
        ],
        ...['µ', 'p', 'R', 'F', 'V', 'Ω', 'Hz', 's', 'K', '°C', 'ppm', 'min', '1e308', '\ud800', '__proto__'],
      ),
      { maxLength: 8 },
    )
    .map((parts) => parts.join('')),
);

describe('any text', () => {
  test.each([parseQuantity, parsePart])('%o gives a finite value or a TailpairError', (read) => {
    fc.assert(
      fc.property(arbitraryText, fc.constantFrom(...wanted), (text, want) => {
        try {
          const result = read(text, want);
          expect(Number.isFinite(typeof result === 'number' ? result : result.value)).toBe(true);
        } catch (error) {
          expect(error).toBeInstanceOf(TailpairError);
          expect((error as TailpairError).message).not.toMatch(/undefined|NaN|\.$/);
        }
      }),
      { seed, numRuns: 5000 },
    );
  });

  test('a long text costs next to nothing', () => {
    const hostile = [
      ' '.repeat(1e6),
      '1'.repeat(1e6),
      `1${' '.repeat(1e6)}%`,
      '1 '.repeat(5e5),
      '±'.repeat(1e6),
    ];
    const start = performance.now();
    for (const text of hostile) {
      expect(() => parseQuantity(text, dimensions.ratio)).toThrow(TailpairError);
      expect(() => parsePart(text, dimensions.ratio)).toThrow(TailpairError);
    }
    // Five megabytes trimmed and refused take milliseconds; a pattern that backtracks takes minutes.
    expect(performance.now() - start).toBeLessThan(2000);
  });
});

describe('formatQuantity and parseQuantity', () => {
  const sized = fc
    .tuple(
      fc.double({ min: 1, max: 10, noNaN: true }),
      fc.integer({ min: -22, max: 22 }),
      fc.constantFrom(1, -1),
    )
    .map(([mantissa, exponent, sign]) => sign * Number(`${mantissa}e${exponent}`));

  test('undo each other to 15 digits', () => {
    fc.assert(
      fc.property(sized, fc.constantFrom(...wanted), (value, want) => {
        const back = parseQuantity(formatQuantity(value, want, 15), want);
        // Half a unit of the fifteenth digit, at worst of 1.00000000000000: 5e-15. A temperature is
        // written in °C, where the digits count from 0 °C and the shift by 273.15 K rounds.
        const scale = want === dimensions.temperature ? Math.abs(value) + 273.15 : Math.abs(value);
        expect(Math.abs(back - value)).toBeLessThanOrEqual(6e-15 * scale);
      }),
      { seed, numRuns: 5000 },
    );
  });

  test('a text formatted once stays the same', () => {
    fc.assert(
      fc.property(
        sized,
        fc.constantFrom(...wanted),
        fc.integer({ min: 4, max: 12 }),
        (value, want, digits) => {
          // In °C a large temperature loses its last digits to the shift and a small one its first.
          fc.pre(want !== dimensions.temperature || (value > 1 && value < 1000));
          const text = formatQuantity(value, want, digits);
          expect(formatQuantity(parseQuantity(text, want), want, digits)).toBe(text);
        },
      ),
      { seed, numRuns: 5000 },
    );
  });

  test('a plain value with a prefix is read as the decimal it is', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: -99999, max: 99999 }),
        fc.constantFrom(-12, -9, -6, -3, 3, 6, 9),
        (count, power) => {
          const prefix = { '-12': 'p', '-9': 'n', '-6': 'µ', '-3': 'm', '3': 'k', '6': 'M', '9': 'G' }[
            String(power)
          ];
          expect(parseQuantity(`${count} ${prefix}V`, dimensions.voltage)).toBe(Number(`${count}e${power}`));
        },
      ),
      { seed },
    );
  });
});
