/**
 * A signal without edges: what a probe takes. Slot 0 holds the sample before the piece at hand,
 * slots 1 … n the piece; samples come later than those of the machine by the kernel's reach.
 */
export interface CorrectedSignal {
  readonly values: Float64Array;
  /** Slopes per second, where asked for; otherwise empty. */
  readonly slopes: Float64Array;
  /**
   * Takes samples `from` … `to − 1` of the machine.
   *
   * @returns how many corrected samples are there now, from slot 1 on
   */
  advance(from: number, to: number): number;
}
