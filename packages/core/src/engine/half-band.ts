import { kaiserBeta, kaiserRejection, kaiserWindow } from '../numeric/kaiser-window.ts';

/**
 * Designs a half-band low-pass filter: an odd symmetric filter that passes up to `passEdge` and rejects
 * from ½ − `passEdge` on. Its middle tap is ½ and every second tap beside it is 0, so only those at the odd
 * distances 1, 3, 5, … are given, one side of the pair each. They sum to ¼, which makes the gain at zero
 * frequency 1. What it passes is as flat as the rejection is deep, since H(f) + H(½ − f) = 1.
 *
 * A Kaiser-windowed sinc of the fewest taps whose response, checked over the whole pass band, keeps the
 * rejection: Kaiser's formulas only say where to begin. The window ends at the first zero of the sinc
 * beyond the last tap. Half-band filters: P. P. Vaidyanathan, Multirate Systems and Filter Banks, 1993, §4.6.
 *
 * @param passEdge - cycles per input sample, between 0 and ¼
 * @param rejection - dB, at most 250 (rounding sets the floor near 300 dB)
 */
export function halfBandTaps(passEdge: number, rejection: number): Float64Array {
  const transition = 2 * Math.PI * (0.5 - 2 * passEdge);
  for (let pairs = 1; ; pairs++) {
    const expected = kaiserRejection(4 * pairs, transition);
    if (expected < rejection) continue;
    // The formulas are fits: where their β narrows the pass band a little too much, a slightly smaller one
    // may do.
    for (let slack = 0; slack <= 2; slack += 0.5) {
      const taps = windowedSinc(pairs, kaiserBeta(expected - slack));
      if (worstLeak(taps, passEdge) <= 10 ** (-rejection / 20)) return taps;
    }
  }
}

function windowedSinc(pairs: number, beta: number): Float64Array {
  const taps = Float64Array.from({ length: pairs }, (_, j) => {
    const distance = 2 * j + 1;
    const sinc = (j % 2 === 0 ? 1 : -1) / (Math.PI * distance);
    return sinc * kaiserWindow(distance / (2 * pairs), beta);
  });
  const scale = 0.25 / sumOf(taps);
  for (let j = 0; j < pairs; j++) taps[j]! *= scale;
  taps[0]! += 0.25 - sumOf(taps);
  return taps;
}

function sumOf(taps: Float64Array): number {
  return taps.reduce((sum, tap) => sum + tap, 0);
}

/**
 * Worst |1 − H(f)| up to the pass edge, which is the worst |H(½ − f)| too; 16 points per lobe miss 0.05 dB.
 */
function worstLeak(taps: Float64Array, passEdge: number): number {
  const points = 16 * taps.length;
  let worst = 0;
  for (let i = 0; i <= points; i++) {
    const angle = (2 * Math.PI * passEdge * i) / points;
    // cos((2j + 1)·angle) by its recurrence over j: a tenth of the time of the cosines themselves.
    const twice = 2 * Math.cos(2 * angle);
    let before = Math.cos(angle);
    let cosine = before;
    let gain = 0.5;
    for (const tap of taps) {
      gain += 2 * tap * cosine;
      const next = twice * cosine - before;
      before = cosine;
      cosine = next;
    }
    worst = Math.max(worst, Math.abs(1 - gain));
  }
  return worst;
}
