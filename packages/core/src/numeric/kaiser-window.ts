/**
 * Value of the Kaiser window, I₀(β·√(1 − x²)) / I₀(β), at `position` x from −1 to 1; 1 in the middle.
 *
 * Source: J. F. Kaiser, Nonrecursive digital filter design using the I₀-sinh window function, Proc. IEEE
 * Int. Symp. Circuits and Systems, 1974, 20–23.
 */
export function kaiserWindow(position: number, beta: number): number {
  return besselI0(beta * Math.sqrt(1 - position * position)) / besselI0(beta);
}

/**
 * Kaiser's fit of the window's β to the rejection (dB) a low-pass filter shall have beyond its transition;
 * the ripple before the transition is as deep. Good to about 1 dB. Source: as {@link kaiserWindow}.
 */
export function kaiserBeta(rejection: number): number {
  if (rejection > 50) return 0.1102 * (rejection - 8.7);
  if (rejection > 21) return 0.5842 * (rejection - 21) ** 0.4 + 0.07886 * (rejection - 21);
  return 0;
}

/**
 * Rejection (dB) that Kaiser's formula N = (A − 7.95) / (2.285·Δω) expects of a filter of order N (its
 * length less one) with a `transition` of Δω radians per sample. Good to a few dB, worse where the
 * transition takes most of the band. Source: as {@link kaiserWindow}.
 */
export function kaiserRejection(order: number, transition: number): number {
  return 7.95 + 2.285 * transition * order;
}

/**
 * Modified Bessel function I₀ by its power series Σ (x/2)^2k / k!²: every term is positive, so no digit is
 * lost.
 */
function besselI0(x: number): number {
  const square = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; term > sum * Number.EPSILON; k++) {
    term *= square / (k * k);
    sum += term;
  }
  return sum;
}
