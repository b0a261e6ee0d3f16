/** Samples handled at one go: a table of this length serves the whole record by rotation. */
const blockLength = 256;

/**
 * Cosine and sine of one frequency over a record, on a time axis whose zero is the middle of the record.
 * Sample `j` of block `b` has the phase θ_b + φ_j: both are tabulated, and the addition theorem joins
 * them, so no phase is accumulated and every sample is good to a few units in the last place.
 */
export interface ToneBasis {
  readonly blockCos: Float64Array;
  readonly blockSin: Float64Array;
  readonly stepCos: Float64Array;
  readonly stepSin: Float64Array;
}

/** Tabulates one frequency (Hz) for a record of `length` samples at `rate` (Hz). */
export function toneBasis(frequency: number, rate: number, length: number): ToneBasis {
  const middle = (length - 1) / 2;
  const blocks = Math.ceil(length / blockLength);
  const steps = Math.min(blockLength, length);
  const basis: ToneBasis = {
    blockCos: new Float64Array(blocks),
    blockSin: new Float64Array(blocks),
    stepCos: new Float64Array(steps),
    stepSin: new Float64Array(steps),
  };
  for (let b = 0; b < blocks; b++) {
    const phase = 2 * Math.PI * fractionOfPeriod(frequency, b * blockLength - middle, rate);
    basis.blockCos[b] = Math.cos(phase);
    basis.blockSin[b] = Math.sin(phase);
  }
  for (let j = 0; j < steps; j++) {
    const phase = 2 * Math.PI * fractionOfPeriod(frequency, j, rate);
    basis.stepCos[j] = Math.cos(phase);
    basis.stepSin[j] = Math.sin(phase);
  }
  return basis;
}

/**
 * Periods passed after `index` samples, less the whole ones: within ±½. Whole periods are taken off
 * before the division, while the product is still exact for the usual whole-numbered frequencies.
 */
export function fractionOfPeriod(frequency: number, index: number, rate: number): number {
  const product = frequency * index;
  return (product - rate * Math.round(product / rate)) / rate;
}

/** Sums of samples times cosine and samples times sine. */
export function correlate(
  samples: Float64Array,
  basis: ToneBasis,
): { readonly cos: number; readonly sin: number } {
  const { blockCos, blockSin, stepCos, stepSin } = basis;
  let cos = 0;
  let sin = 0;
  for (let b = 0, at = 0; b < blockCos.length; b++, at += blockLength) {
    const steps = Math.min(blockLength, samples.length - at);
    let c = 0;
    let s = 0;
    for (let j = 0; j < steps; j++) {
      const value = samples[at + j]!;
      c += value * stepCos[j]!;
      s += value * stepSin[j]!;
    }
    cos += blockCos[b]! * c - blockSin[b]! * s;
    sin += blockSin[b]! * c + blockCos[b]! * s;
  }
  return { cos, sin };
}

/** Takes `cos`·cosine + `sin`·sine off the samples, in place. */
export function subtractTone(samples: Float64Array, basis: ToneBasis, cos: number, sin: number): void {
  const { blockCos, blockSin, stepCos, stepSin } = basis;
  for (let b = 0, at = 0; b < blockCos.length; b++, at += blockLength) {
    const steps = Math.min(blockLength, samples.length - at);
    const c = cos * blockCos[b]! + sin * blockSin[b]!;
    const s = sin * blockCos[b]! - cos * blockSin[b]!;
    for (let j = 0; j < steps; j++) samples[at + j]! -= c * stepCos[j]! + s * stepSin[j]!;
  }
}
