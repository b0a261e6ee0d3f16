/** One source of an input: its buffer, and the factor it comes in with (1, or 1/R in siemens). */
export interface GatherSource {
  readonly buffer: Float64Array;
  readonly gain: number;
}

/** Sums sources into a buffer, in the order of the wires, for samples `from` … `to − 1`. */
export type Gather = (from: number, to: number) => void;

/** Currents that meet at an input, or voltages that come into a node through resistors. */
export function gather(sources: readonly GatherSource[], target: Float64Array): Gather {
  return (from, to) => {
    target.fill(0, from, to);
    for (const { buffer, gain } of sources) {
      for (let n = from; n < to; n++) target[n]! += gain * buffer[n]!;
    }
  };
}
