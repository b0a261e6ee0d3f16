/** Steps after which an equation counts as not solved. */
export const mostSteps = 400;

/** Relative size of a step after which, at third order, only the last bits could still move. */
export const closeEnough = 1e-6;

/** A step this small, in base units, that hardly helps is rounding: a picovolt, a picoampere. */
export const smallest = 1e-12;

/**
 * Root of one equation by Halley's method, from exact first and second derivatives (third order;
 * E. Halley 1694, in every numerical text). It is done when a further step could only move the
 * last bits: with third order a relative step of 1e-6 leaves an error near 1e-18, and where the
 * root is zero the step itself vanishes. A step that does not lower the residual went too far and
 * is halved, as an exponential asks for. A tiny step that does not even halve the residual shows
 * that its terms cancel and only their rounding is left.
 *
 * @param guess start value
 * @param terms writes residual, slope and curvature at `x`
 * @returns the root, or NaN where none was reached in 400 steps
 */
export function solveScalar(guess: number, terms: (x: number, out: Float64Array) => void): number {
  const out = new Float64Array(3);
  let x = guess;
  let step = Number.NaN;
  let least = Number.POSITIVE_INFINITY;
  for (let count = 0; count < mostSteps; count++) {
    terms(x, out);
    const size = Math.abs(out[0]!);
    if (Math.abs(step) <= smallest && size > 0.5 * least) return x;
    if (size < least) {
      least = size;
      step = halleyStep(out[0]!, out[1]!, out[2]!);
      x -= step;
      if (Math.abs(step) <= closeEnough * Math.abs(x) || step === 0) return x;
    } else {
      step *= 0.5;
      x += step;
    }
  }
  return Number.NaN;
}

/**
 * One step of Halley's method, r·s / (s² − ½r·c). Far from the root the correction of the plain
 * Newton step r/s is held within a factor of two, so that a strongly bent residual cannot turn
 * the step round.
 */
function halleyStep(residual: number, slope: number, curvature: number): number {
  if (residual === 0) return 0;
  const square = slope * slope;
  return (
    (residual * slope) / Math.min(Math.max(square - 0.5 * residual * curvature, 0.5 * square), 2 * square)
  );
}
