import { describe, expect, test } from 'vitest';
import { halfBandTaps } from '../../../packages/core/src/engine/half-band.ts';

/** H(f) of the whole filter by its defining sum, f in cycles per sample. */
function response(taps: Float64Array, frequency: number): number {
  let gain = 0.5;
  taps.forEach((tap, j) => {
    gain += 2 * tap * Math.cos(2 * Math.PI * frequency * (2 * j + 1));
  });
  return gain;
}

const designs = [
  [20 / 88.2, 150],
  [20 / 96, 150],
  [20 / 192, 150],
  [20 / 1536, 150],
  [0.1, 60],
  [0.24, 100],
] as const;

describe.each(designs)('halfBandTaps(%d, %d dB)', (passEdge, rejection) => {
  const taps = halfBandTaps(passEdge, rejection);

  test('keeps ripple and rejection on a dense grid', () => {
    const points = 200 * taps.length;
    let worst = 0;
    for (let i = 0; i <= points; i++) {
      const frequency = (passEdge * i) / points;
      worst = Math.max(
        worst,
        Math.abs(1 - response(taps, frequency)),
        Math.abs(response(taps, 0.5 - frequency)),
      );
    }
    // 0.05 dB is what the grid of the design may miss at the top of a lobe (cosine of 1/32 of a lobe's
    // period).
    expect(-20 * Math.log10(worst)).toBeGreaterThanOrEqual(rejection - 0.05);
  });

  test('has unit gain at zero frequency and a sum of mirrored gains of 1', () => {
    // The last tap added rounds once more.
    expect(Math.abs(taps.reduce((sum, tap) => sum + tap, 0) - 0.25)).toBeLessThanOrEqual(2 ** -54);
    // Partial sums between ½ and 1.2, each rounded to 2^-53 at most.
    expect(Math.abs(response(taps, 0) - 1)).toBeLessThanOrEqual(taps.length * 2 ** -53);
    for (const frequency of [0.01, 0.1, 0.2, 0.25]) {
      expect(Math.abs(response(taps, frequency) + response(taps, 0.5 - frequency) - 1)).toBeLessThan(
        taps.length * 2 ** -51,
      );
    }
  });

  test('alternates in sign and falls off, as a windowed sinc does', () => {
    taps.forEach((tap, j) => {
      expect(Math.sign(tap)).toBe(j % 2 === 0 ? 1 : -1);
      if (j > 0) expect(Math.abs(tap)).toBeLessThan(Math.abs(taps[j - 1]!));
    });
  });
});

// No linear-phase half-band filter is shorter than the equiripple one. Pairs of taps of that, by scipy
// 1.17.1 (`signal.remez` on the one-band prototype of P. P. Vaidyanathan, T. Q. Nguyen, A "trick" for the
// design of FIR half-band filters, IEEE Trans. Circuits Syst. 34, 1987, 297–300,
// doi:10.1109/TCS.1987.1086124).
test.each([
  [20 / 96, 29],
  [20 / 88.2, 52],
  [20 / 192, 8],
  [20 / 384, 5],
])(
  'a pass edge of %d needs at most two more pairs than the shortest filter of 150 dB',
  (passEdge, shortest) => {
    const pairs = halfBandTaps(passEdge, 150).length;
    expect(pairs).toBeGreaterThanOrEqual(shortest);
    // Kaiser's windows are a few per cent longer than equiripple filters; two pairs cover the widest
    // transitions.
    expect(pairs).toBeLessThanOrEqual(shortest + 2);
  },
);
