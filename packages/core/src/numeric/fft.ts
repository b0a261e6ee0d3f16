import FFT from 'fft.js';
import { TailpairError } from '../quantity/error.ts';

/** One-sided spectrum: bins 0 (constant) to half the length (half the sampling rate), unscaled. */
export interface RealSpectrum {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Discrete Fourier transform of real samples, X[k] = Σ x[n]·exp(−2πi·kn/N) for k = 0 … N/2, without scaling.
 *
 * @param samples - N values, N a power of two from 2 on
 * @returns N/2 + 1 bins; errors are about 2^-53·log₂N of the rms bin
 * @throws TailpairError `record-invalid` for any other length
 */
export function realSpectrum(samples: Float64Array): RealSpectrum {
  const size = samples.length;
  if (size < 2 || !Number.isInteger(Math.log2(size))) {
    throw new TailpairError(
      'record-invalid',
      `a spectrum takes 2, 4, 8, … samples, got ${size}: cut the record to a power of two`,
    );
  }
  const interleaved = new Float64Array(2 * size);
  new FFT(size).realTransform(interleaved, samples);
  const bins = size / 2 + 1;
  const re = new Float64Array(bins);
  const im = new Float64Array(bins);
  for (let k = 0; k < bins; k++) {
    re[k] = interleaved[2 * k]!;
    im[k] = interleaved[2 * k + 1]!;
  }
  return { re, im };
}
