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
 * Logarithm of the Wright omega function: the z with e^z + z = y, where ω(y) = e^z solves
 * ω + ln ω = y (R. Corless, D. Jeffrey, "The Wright ω function", 2002,
 * doi:10.1007/3-540-45470-5_10). In this form nothing overflows, however large y is.
 */
export function logOmega(y: Expression): Expression {
  // From 1 on the root lies near ln y, one Newton step below it; for small y it is y itself.
  const large = y.max(1);
  const guess = select(y.lt(1), y.min(0), log(large).mul(large.div(large.add(1))));
  return solve((z) => exp(z).add(z).sub(y), guess);
}
