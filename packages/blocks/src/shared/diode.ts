import { constant, type Expression, exp, log, select, solve } from '@tailpair/core/block';

/**
 * Saturation current of a silicon junction at a temperature, from its value at 25 °C:
 * I_S ∝ T³·exp(−E_g/kT) with a band gap of 1.12 eV (P. Gray, P. Hurst, S. Lewis, R. Meyer,
 * Analysis and Design of Analog Integrated Circuits, 5th ed., 2009; from memory).
 */
export function saturationCurrent(
  at25: Expression,
  temperature: Expression,
  thermalVoltage: Expression,
): Expression {
  const ratio = temperature.div('298.15 K');
  // E_g/k·(1/T₀ − 1/T) = (E_g/V_T)·(T/T₀ − 1)
  const exponent = constant(1.12).div(thermalVoltage.div('1 V')).mul(ratio.sub(1));
  return at25.mul(ratio.mul(ratio).mul(ratio)).mul(exp(exponent));
}

/**
 * Wright omega function: the ω > 0 with ω + ln ω = y (R. Corless, D. Jeffrey, "The Wright ω
 * function", 2002, doi:10.1007/3-540-45470-5_10). It is solved for z = ln ω, in which form nothing
 * overflows, however large y is; the search starts on the asymptotic series z ≈ L − L/y −
 * L(L − 2)/2y², L = ln y, and for small y on y itself.
 */
export function wrightOmega(y: Expression): Expression {
  const large = y.max(1);
  const l = log(large);
  const series = l.sub(l.div(large).mul(constant(1).add(l.sub(2).div(large.mul(2)))));
  const z = solve((z) => exp(z).add(z).sub(y), select(y.lt(1), y.min(0), series));
  // Where ω is not small it is y − z, which saves an exponential; where it is, that would cancel.
  return select(y.lt(1), exp(z), y.sub(z));
}
