const perUnit = 32;
const limit = 20;

const table = Float64Array.from({ length: limit * perUnit + 2 }, (_, k) => Math.tanh(k / perUnit));

/**
 * Hyperbolic tangent for inner loops: with x = k/32 + d, tanh x = (T + t)/(1 + T·t), where
 * T = tanh(k/32) comes from a table and t = tanh d from its Taylor series to d⁹ (|d| ≤ 1/64, so
 * the first term left out is below 3e-20 of t). Within 4e-16 relative of the exact value.
 */
export function tanh(x: number): number {
  const magnitude = Math.abs(x);
  if (!(magnitude < limit)) return Number.isNaN(x) ? x : Math.sign(x);
  const k = Math.floor(magnitude * perUnit + 0.5);
  const d = magnitude - k / perUnit;
  const s = d * d;
  const t = d * (1 + s * (-1 / 3 + s * (2 / 15 + s * (-17 / 315 + s * (62 / 2835)))));
  const known = table[k]!;
  const result = (known + t) / (1 + known * t);
  return x < 0 ? -result : result;
}
