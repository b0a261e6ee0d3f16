import cephes from 'cephes';
import { beforeAll, describe, expect, test } from 'vitest';
import { randomStream } from '../../../packages/core/src/numeric/random.ts';

const count = 100_000;

/** Largest distance between the distribution of the draws and the given one, times √count. */
function kolmogorovDistance(draws: number[], distribution: (value: number) => number): number {
  const sorted = Float64Array.from(draws).sort();
  let worst = 0;
  sorted.forEach((value, i) => {
    const expected = distribution(value);
    worst = Math.max(worst, expected - i / count, (i + 1) / count - expected);
  });
  return worst * Math.sqrt(count);
}

beforeAll(() => cephes.compiled);

// Kolmogorov distribution, large samples: 1.95 is passed by one stream in a thousand (N. Smirnov, Table for
// estimating the goodness of fit of empirical distributions, Ann. Math. Statist. 19, 1948, 279–281,
// doi:10.1214/aoms/1177730256). Seeds are fixed, so the test never fails by chance.
describe.each(['noise', 'pitch', 'offset'])('the stream named %s', (name) => {
  test('uniform is evenly distributed', () => {
    const stream = randomStream(11, name);
    const draws = Array.from({ length: count }, () => stream.uniform());
    expect(kolmogorovDistance(draws, (value) => value)).toBeLessThan(1.95);
  });

  test('gaussian follows the normal distribution of a special-function library', () => {
    const stream = randomStream(12, name);
    const draws = Array.from({ length: count }, () => stream.gaussian());
    expect(kolmogorovDistance(draws, cephes.ndtr)).toBeLessThan(1.95);
  });

  test('draws next to each other are uncorrelated', () => {
    const stream = randomStream(13, name);
    let product = 0;
    let before = stream.gaussian();
    for (let i = 0; i < count; i++) {
      const value = stream.gaussian();
      product += value * before;
      before = value;
    }
    // Products of independent normal draws have variance 1: 3.3 standard deviations, one stream in a
    // thousand.
    expect(Math.abs(product) / Math.sqrt(count)).toBeLessThan(3.3);
  });
});
