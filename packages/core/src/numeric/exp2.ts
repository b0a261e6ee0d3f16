const reach = 64;
const powers = Float64Array.from({ length: 2 * reach + 1 }, (_, i) => 2 ** (i - reach));

/**
 * Two to the power of x for inner loops: the whole part from a table, the rest, at most ½, as an
 * exponential. Within 4e-16 relative of the exact value.
 */
export function exp2(x: number): number {
  const whole = Math.round(x);
  const known = powers[whole + reach];
  return known === undefined ? 2 ** x : known * Math.exp((x - whole) * Math.LN2);
}
