import seedrandom from 'seedrandom';

/** A stream of random numbers of its own. */
export interface RandomStream {
  /** Evenly distributed over [0, 1), 53 bits fine. */
  uniform(): number;
  /** Normally distributed with mean 0 and standard deviation 1. */
  gaussian(): number;
}

/**
 * Opens the stream that belongs to a seed and a path: the same names give the same numbers for ever, and
 * no stream moves when others are opened, read or left out.
 *
 * Generator: xor4096 (R. P. Brent, Some long-period random number generators using shifts and xors,
 * ANZIAM J. 48, 2007, C188–C202), seeded from the text of seed and path. `gaussian` uses the polar method
 * (G. Marsaglia, T. A. Bray, SIAM Review 6, 1964, 260–264, doi:10.1137/1006063). Not for secrets.
 *
 * @param seed - of the whole run; a number and its decimal text name the same seed
 * @param path - block path, then purpose: `'voice', 'horn', 'noise'`; numbers stand for their decimal text
 */
export function randomStream(seed: number | string, ...path: readonly (string | number)[]): RandomStream {
  // As JSON, so that no two lists of names run together into one text.
  const generator = seedrandom.xor4096(JSON.stringify([seed, ...path].map(String)));
  const uniform = (): number => generator.double();
  let spare: number | undefined;

  const gaussian = (): number => {
    if (spare !== undefined) {
      const value = spare;
      spare = undefined;
      return value;
    }
    for (;;) {
      const x = 2 * uniform() - 1;
      const y = 2 * uniform() - 1;
      const square = x * x + y * y;
      if (square === 0 || square >= 1) continue;
      const scale = Math.sqrt((-2 * Math.log(square)) / square);
      spare = y * scale;
      return x * scale;
    }
  };

  return { uniform, gaussian };
}
