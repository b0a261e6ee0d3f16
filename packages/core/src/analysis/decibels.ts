/** Level of an amplitude ratio: 20·log₁₀(ratio) dB; −∞ for nothing at all. */
export function decibels(ratio: number): number {
  return 20 * Math.log10(ratio);
}
