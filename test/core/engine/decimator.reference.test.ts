import { describe, expect, test } from 'vitest';
import { Decimator } from '../../../packages/core/src/engine/decimator.ts';

/** Ratio that stands for the rejection and for the ripple. */
const leak = 10 ** (-150 / 20);
const ripple = 1e-6;

function decimate(factor: number, rate: number, input: Float64Array): Float64Array {
  const output = new Float64Array(Math.ceil(input.length / factor));
  const written = new Decimator(factor, rate).push(input, 0, input.length, output, 0);
  return output.subarray(0, written);
}

/**
 * The impulse response of the whole streaming cascade, index 0 to twice the latency, gathered phase by
 * phase.
 */
function impulseResponse(factor: number, rate: number): Float64Array {
  const { latency } = new Decimator(factor, rate);
  const response = new Float64Array(2 * latency + 1);
  const middle = factor * Math.ceil(latency / factor + 1);
  for (let phase = 0; phase < factor; phase++) {
    const input = new Float64Array(3 * middle + factor);
    const place = middle + phase;
    input[place] = 1;
    decimate(factor, rate, input).forEach((value, k) => {
      const lag = k * factor - place;
      if (Math.abs(lag) <= latency) response[latency + lag] = value;
      else expect(value).toBe(0);
    });
  }
  return response;
}

/**
 * Worst of |H(f) − target| over a band in Hz, by the defining sum of a symmetric response, 16 points per
 * lobe.
 */
function worstOver(
  response: Float64Array,
  inputRate: number,
  band: [number, number],
  target: number,
): number {
  const latency = (response.length - 1) / 2;
  const points = Math.ceil((16 * response.length * (band[1] - band[0])) / inputRate) + 1;
  let worst = 0;
  for (let i = 0; i <= points; i++) {
    const angle = (2 * Math.PI * (band[0] + ((band[1] - band[0]) * i) / points)) / inputRate;
    let gain = response[latency]!;
    for (let n = 1; n <= latency; n++) gain += 2 * response[latency + n]! * Math.cos(angle * n);
    worst = Math.max(worst, Math.abs(gain - target));
  }
  return worst;
}

// Bars: ripple of 1e-6 (8e-6 dB) to the pass edge, and 150 dB on everything that folds below it; 150 dB is
// where a 24-bit mantissa ends. No wider than that: the sums of the test err by 1e-15.
describe.each([
  [2, 48000],
  [4, 48000],
  [8, 48000],
  [16, 48000],
  [32, 48000],
  [2, 44100],
  [4, 44100],
  [8, 44100],
  [4, 46000],
  [4, 96000],
  [8, 96000],
  [4, 192000],
  [4, 22050],
])('the cascade %i × %i Hz', (factor, rate) => {
  const { passEdge, latency } = new Decimator(factor, rate);
  const response = impulseResponse(factor, rate);
  const inputRate = factor * rate;

  test('has no phase: its response is symmetric about the instant of the output', () => {
    for (let n = 1; n <= latency; n++) {
      // The two sides are summed in the same order but through other partial sums: a few last bits of ½.
      expect(Math.abs(response[latency + n]! - response[latency - n]!)).toBeLessThan(2 ** -53);
    }
  });

  test('passes up to the pass edge', () => {
    expect(worstOver(response, inputRate, [0, passEdge], 1)).toBeLessThanOrEqual(ripple);
  });

  test('rejects all that folds below the pass edge', () => {
    for (let image = 1; image <= factor / 2; image++) {
      const top = Math.min(image * rate + passEdge, inputRate / 2);
      const worst = worstOver(response, inputRate, [image * rate - passEdge, top], 0);
      expect(worst).toBeLessThanOrEqual(leak);
    }
  });
});

test.each([
  [8000, 8000 * (5 / 12)],
  [44100, 20000],
  [46000, 20000],
  [48000, 20000],
  [96000, 40000],
])('at %i Hz the pass edge is %d Hz', (rate, edge) => {
  // One rounding each.
  expect(Math.abs(new Decimator(4, rate).passEdge - edge)).toBeLessThan(edge * 2 ** -52);
});

/**
 * Complex amplitude of a tone with whole periods in the record: there the least-squares fit is this
 * projection.
 */
function toneOf(samples: Float64Array, periods: number): { re: number; im: number } {
  let re = 0;
  let im = 0;
  samples.forEach((value, n) => {
    const angle = (2 * Math.PI * ((periods * n) % samples.length)) / samples.length;
    re += value * Math.cos(angle);
    im -= value * Math.sin(angle);
  });
  return { re: (2 * re) / samples.length, im: (2 * im) / samples.length };
}

describe.each([
  [2, 48000],
  [4, 48000],
  [8, 48000],
  [16, 48000],
  [4, 44100],
  [4, 96000],
])('sines through %i × %i Hz', (factor, rate) => {
  const record = 4800;
  const step = rate / record;
  const { passEdge, latency } = new Decimator(factor, rate);
  const lead = Math.ceil(latency / factor);
  const edgePeriods = Math.floor(passEdge / step);

  /** Steady output for a cosine of so many periods per record, phase zero at the record's first output. */
  function steady(periods: number): Float64Array {
    const length = factor * record;
    const input = Float64Array.from({ length: length + 2 * lead * factor }, (_, i) => {
      const n = (((periods * (i - lead * factor)) % length) + length) % length;
      return Math.cos((2 * Math.PI * n) / length);
    });
    return decimate(factor, rate, input).subarray(lead, lead + record);
  }

  test.each([1, 7, Math.floor(edgePeriods / 3), edgePeriods - 40, edgePeriods])(
    'a tone of %i steps is passed with amplitude and phase',
    (periods) => {
      const { re, im } = toneOf(steady(periods), periods);
      expect(Math.abs(re - 1)).toBeLessThan(ripple);
      // No phase but rounding: sums of a record of values near 1.
      expect(Math.abs(im)).toBeLessThan(1e-13);
    },
  );

  test('tones that fold below the pass edge are rejected', () => {
    for (let image = 1; image <= factor / 2; image++) {
      for (const folded of [1, 100, Math.floor(edgePeriods / 2), edgePeriods]) {
        for (const periods of [image * record - folded, image * record + folded]) {
          if (periods > (factor * record) / 2) continue;
          const { re, im } = toneOf(steady(periods), folded);
          expect(Math.hypot(re, im)).toBeLessThanOrEqual(leak);
        }
      }
    }
  });
});
