/** A source of numbers spread evenly over 0 … 1. */
export interface DitherSource {
  uniform(): number;
}

/** Rounds samples to integers and counts what did not fit. */
export interface Quantiser {
  /** Code of a value, whose full scale is ±1. */
  quantise(value: number): number;
  /** Codes limited so far. */
  clipped(): number;
}

/**
 * Quantiser of so many bits: full scale is −2^(bits−1) … 2^(bits−1) − 1, as two's complement has it.
 *
 * With a source it adds triangular dither two steps wide before it rounds: the error is then uncorrelated
 * with the signal and of variance step²/4, whatever the signal (S. Lipshitz, R. Wannamaker, J. Vanderkooy,
 * "Quantization and dither", J. Audio Eng. Soc. 40(5), 1992; from memory). Without one a signal below half
 * a step is lost.
 */
export function quantiser(bits: number, source?: DitherSource): Quantiser {
  const scale = 2 ** (bits - 1);
  let clipped = 0;
  return {
    quantise(value) {
      const dither = source === undefined ? 0 : source.uniform() - source.uniform();
      const code = Math.floor(value * scale + dither + 0.5);
      if (code >= -scale && code < scale) return code;
      clipped++;
      return code < 0 ? -scale : scale - 1;
    },
    clipped: () => clipped,
  };
}
