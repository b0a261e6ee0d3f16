import { weightsPerGroup } from './memory.ts';

const seriesLimit = 2;
const seriesTerms = 28;

/**
 * Weights of the exact step of dx/dt = rate·x + b(t) over `length` seconds, where b is the cubic
 * with given values and slopes at both ends:
 * x₁ = w₀·x₀ + w₁·b₀ + w₂·b₁ + w₃·b₀′ + w₄·b₁′.
 *
 * With z = rate·length the cubic's powers integrate to ψₖ(z) = ∫₀¹ e^{z(1−θ)} θᵏ dθ, k = 0 … 3
 * (exponential integrators; M. Hochbruck, A. Ostermann, Acta Numerica 19, 2010,
 * doi:10.1017/S0962492910000048). For |z| < 2 the highest is summed as a series and the others
 * follow downward, ψₖ₋₁ = (1 + zψₖ)/k; above, upward, which is then the stable direction.
 */
export function linearWeights(rate: number, length: number, out: Float64Array, at: number): void {
  const z = rate * length;
  let psi0: number;
  let psi1: number;
  let psi2: number;
  let psi3: number;
  if (Math.abs(z) < seriesLimit) {
    let term = 0.25;
    psi3 = term;
    for (let j = 1; j < seriesTerms && term !== 0; j++) {
      term *= z / (j + 4);
      psi3 += term;
    }
    psi2 = (1 + z * psi3) / 3;
    psi1 = (1 + z * psi2) / 2;
    psi0 = 1 + z * psi1;
  } else {
    psi0 = Math.expm1(z) / z;
    psi1 = (psi0 - 1) / z;
    psi2 = (2 * psi1 - 1) / z;
    psi3 = (3 * psi2 - 1) / z;
  }
  const late = 3 * psi2 - 2 * psi3;
  out[at] = Math.exp(z);
  out[at + 1] = length * (psi0 - late);
  out[at + 2] = length * late;
  out[at + 3] = length * length * (psi1 - 2 * psi2 + psi3);
  out[at + 4] = length * length * (psi3 - psi2);
}

/** The step itself: state `x`, drives `from` and `to` as [value, slope] at `index`. */
export function linearStep(
  weights: Float64Array,
  at: number,
  x: number,
  from: Float64Array,
  to: Float64Array,
  index: number,
): number {
  return (
    weights[at]! * x +
    weights[at + 1]! * from[index]! +
    weights[at + 2]! * to[index]! +
    weights[at + 3]! * from[index + 1]! +
    weights[at + 4]! * to[index + 1]!
  );
}

/** The step under a drive that does not move. Generated loops add up in the same order. */
export function steadyStep(weights: Float64Array, at: number, x: number, drive: number): number {
  return weights[at]! * x + (weights[at + 1]! + weights[at + 2]!) * drive;
}

/** Where the weights of a group start. */
export function weightsAt(group: number): number {
  return group * weightsPerGroup;
}
