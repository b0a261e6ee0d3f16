/** Boltzmann constant in J/K, exact (BIPM, The International System of Units, 9th ed., 2019). */
export const boltzmannConstant = 1.380649e-23;

/** Elementary charge in C, exact (BIPM, The International System of Units, 9th ed., 2019). */
export const elementaryCharge = 1.602176634e-19;

/** Absolute temperature of 0 °C in K, exact by definition of the degree Celsius. */
export const zeroCelsius = 273.15;

/**
 * Thermal voltage V_T = k·T/q in volts, 25.69 mV at 25 °C.
 *
 * @param kelvin absolute temperature; whoever takes it from outside checks that it is above 0 K
 */
export function thermalVoltage(kelvin: number): number {
  return (boltzmannConstant * kelvin) / elementaryCharge;
}
