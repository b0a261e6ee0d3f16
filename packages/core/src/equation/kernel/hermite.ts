/**
 * Value of the cubic with the given end values and slopes, at a fraction of the interval
 * (Hermite's interpolation; any numerical text).
 *
 * @param a value at the start
 * @param b value at the end
 * @param da slope at the start, times the length of the interval
 * @param db slope at the end, times the length of the interval
 * @param at fraction, 0 … 1
 */
export function hermiteValue(a: number, b: number, da: number, db: number, at: number): number {
  const rest = 1 - at;
  return rest * rest * ((1 + 2 * at) * a + at * da) + at * at * ((1 + 2 * rest) * b - rest * db);
}
