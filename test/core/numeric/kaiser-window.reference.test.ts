import { describe, expect, test } from 'vitest';
import {
  kaiserBeta,
  kaiserRejection,
  kaiserWindow,
} from '../../../packages/core/src/numeric/kaiser-window.ts';

// I₀(β√(1 − x²))/I₀(β) by mpmath 1.3.0 `besseli` in 30-digit arithmetic, rounded to double.
test.each([
  [0.25, 0.5, 0.9962146042710255],
  [0.99, 0.5, 0.9414760628405737],
  [0.75, 2, 0.6526373064907594],
  [0.25, 6.28, 0.8332024321110907],
  [0.99, 6.28, 0.013885769823308611],
  [0.25, 14.27, 0.6461737503857623],
  [0.75, 14.27, 0.009856093972114824],
  [0.99, 20, 9.707565802032014e-8],
  [0.75, 30, 4.78247640294827e-5],
  [0.99, 30, 1.7683620512640467e-11],
])('kaiserWindow(%d, %d) agrees with a multiple-precision Bessel function', (position, beta, expected) => {
  // d ln I₀/dx < 1, so the last bit of an argument up to 30 weighs 30 · 2^-53; 30-odd positive terms add as
  // much.
  expect(Math.abs(kaiserWindow(position, beta) / expected - 1)).toBeLessThan(60 * 2 ** -53);
});

test('the window is even, 1 in the middle and 1/I₀(β) at its ends', () => {
  expect(kaiserWindow(0, 14)).toBe(1);
  expect(kaiserWindow(-0.6, 14)).toBe(kaiserWindow(0.6, 14));
  expect(kaiserWindow(0.3, 0)).toBe(1);
  // I₀(2) = 2.2795853023360673 (M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions, 1964,
  // table 9.8 gives e^-2·I₀(2) = 0.3085083225 to ten digits).
  expect(Math.abs(Math.exp(-2) / kaiserWindow(1, 2) - 0.3085083225)).toBeLessThan(6e-11);
});

// scipy 1.17.1, `signal.kaiser_beta` and `signal.kaiser_atten` (whose width is in units of half the rate),
// printed to 16 digits: the same published formulas, so only rounding may differ.
describe('the design formulas agree with a general signal-processing library', () => {
  test.each([
    [15, 0],
    [30, 2.1166248611409806],
    [50, 4.533514120981248],
    [60, 5.65326],
    [90, 8.95926],
    [150, 15.571260000000002],
  ])('kaiserBeta(%d dB)', (rejection, expected) => {
    expect(Math.abs(kaiserBeta(rejection) - expected)).toBeLessThan(1e-14);
  });

  test.each([
    [30, 0.2, 51.02123528071608],
    [118, 1 / 6, 149.1279378645693],
    [34, 7 / 12, 150.32436106681143],
  ])('kaiserRejection(%i, %d·π)', (order, width, expected) => {
    expect(Math.abs(kaiserRejection(order, Math.PI * width) - expected)).toBeLessThan(1e-12);
  });
});
