/** Width below which a bracket, as a share of a cell, is as narrow as a double can tell. */
const narrow = 4e-16;
const mostSteps = 80;

/**
 * Instant at which a function rises through zero, to the last digit of a share of a cell: regula
 * falsi with the Anderson–Björck weight (N. Anderson, Å. Björck, BIT 13, 1973,
 * doi:10.1007/BF01933397). The answer lies on the risen side.
 *
 * @param low where the function is still below zero, or zero and about to fall
 * @param high where it has risen
 */
export function locate(
  low: number,
  lowValue: number,
  high: number,
  highValue: number,
  valueAt: (at: number) => number,
): number {
  let a = low;
  let fa = lowValue;
  let b = high;
  let fb = highValue;
  for (let count = 0; count < mostSteps && b - a > narrow && fb !== 0; count++) {
    const secant = fa < 0 ? b - (fb * (b - a)) / (fb - fa) : a;
    // A secant that lands on an end, or a start at zero, is replaced by the middle.
    const at = secant > a && secant < b ? Math.min(secant + narrow / 2, (secant + b) / 2) : (a + b) / 2;
    const f = valueAt(at);
    if (f >= 0) {
      const weight = 1 - f / fb;
      fa *= weight > 0 ? weight : 0.5;
      b = at;
      fb = f;
    } else {
      const weight = 1 - f / fa;
      fb *= weight > 0 ? weight : 0.5;
      a = at;
      fa = f;
    }
  }
  return b;
}
