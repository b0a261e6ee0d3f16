import { jetLength } from '../equation/jet/jet-arithmetic.ts';
import type { EdgeList } from '../equation/kernel/edge-list.ts';
import type { CorrectionKernel } from './correction-kernel.ts';

/**
 * Replaces point samples of a waveform by those of the band-limited one, edge by edge as they come
 * in; the samples come out as many later as the kernel reaches. Corrections are summed in an
 * accumulator of their own in the order of time, so that chunks leave no trace in the last bits.
 */
export class EdgeCorrector {
  readonly latency: number;
  private readonly kernel: CorrectionKernel;
  /** Samples taken but not given, and what is to be added to them and to those that follow. */
  private readonly values: Float64Array;
  private readonly sums: Float64Array;
  private waiting = 0;

  constructor(kernel: CorrectionKernel, chunk: number) {
    this.kernel = kernel;
    this.latency = kernel.reach;
    this.values = new Float64Array(chunk + 2 * kernel.reach + 1);
    this.sums = new Float64Array(chunk + 3 * kernel.reach + 1);
  }

  /**
   * Takes samples `from` … `to − 1` with the edges of their cells.
   *
   * @returns how many corrected samples were written to `output`
   */
  push(input: Float64Array, edges: EdgeList, from: number, to: number, output: Float64Array): number {
    const { kernel, values, sums, latency } = this;
    const start = this.waiting;
    values.set(input.subarray(from, to), start);
    for (let edge = 0; edge < edges.count; edge++) {
      const end = start + edges.cells[edge]! - from;
      kernel.add(sums, end, edges.at[edge]!, edges.before, edges.after, edge * jetLength);
    }
    const held = start + to - from;
    const ready = Math.max(0, held - latency);
    for (let n = 0; n < ready; n++) output[n] = values[n]! + sums[n]!;
    values.copyWithin(0, ready, held);
    sums.copyWithin(0, ready);
    sums.fill(0, sums.length - ready);
    this.waiting = held - ready;
    return ready;
  }
}
