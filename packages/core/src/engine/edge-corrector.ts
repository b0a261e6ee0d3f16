import { jetLength } from '../equation/jet/jet-arithmetic.ts';
import type { CorrectedSignal } from './corrected-signal.ts';
import type { CorrectionKernel } from './correction-kernel.ts';
import type { OutputBuffers } from './output-buffers.ts';

const nothing = new Float64Array(0);

/**
 * Replaces point samples of a waveform by those of the band-limited one, edge by edge as they come
 * in; the samples come out as many later as the kernel reaches. Corrections are summed in
 * accumulators of their own in the order of time, so that chunks leave no trace in the last bits.
 */
export class EdgeCorrector implements CorrectedSignal {
  readonly values: Float64Array;
  readonly slopes: Float64Array;
  private readonly source: OutputBuffers;
  private readonly kernel: CorrectionKernel;
  private readonly rate: number;
  private readonly delayed: DelayLine;
  private readonly delayedSlopes: DelayLine | undefined;

  constructor(source: OutputBuffers, kernel: CorrectionKernel, chunk: number, rate: number, sloped: boolean) {
    this.source = source;
    this.kernel = kernel;
    this.rate = rate;
    this.values = new Float64Array(chunk + 2);
    this.slopes = sloped ? new Float64Array(chunk + 2) : nothing;
    this.delayed = new DelayLine(kernel.reach, chunk);
    this.delayedSlopes = sloped ? new DelayLine(kernel.reach, chunk) : undefined;
  }

  advance(from: number, to: number): number {
    const { source, kernel, delayed, delayedSlopes } = this;
    const { edges } = source;
    const start = delayed.take(source.values, from, to, 1);
    delayedSlopes?.take(source.slopes, from, to, 1 / this.rate);
    for (let edge = 0; edge < edges.count; edge++) {
      const end = start + edges.cells[edge]! - from;
      const at = edges.at[edge]!;
      kernel.add(
        delayed.sums,
        delayedSlopes?.sums ?? nothing,
        end,
        at,
        edges.before,
        edges.after,
        edge * jetLength,
      );
    }
    delayedSlopes?.give(this.slopes, this.rate);
    return delayed.give(this.values, 1);
  }
}

/** Samples taken but not given, and what is to be added to them and to those that follow. */
class DelayLine {
  readonly sums: Float64Array;
  private readonly values: Float64Array;
  private readonly latency: number;
  private waiting = 0;

  constructor(latency: number, chunk: number) {
    this.latency = latency;
    this.values = new Float64Array(chunk + 2 * latency + 1);
    this.sums = new Float64Array(chunk + 3 * latency + 1);
  }

  /** Takes samples, times `scale`; returns where the first of them stands. */
  take(input: Float64Array, from: number, to: number, scale: number): number {
    const start = this.waiting;
    for (let n = from; n < to; n++) this.values[start + n - from] = input[n]! * scale;
    this.waiting += to - from;
    return start;
  }

  /** Gives the samples that are complete, times `scale`, from slot 1 of `output` on. */
  give(output: Float64Array, scale: number): number {
    const { values, sums, waiting } = this;
    const ready = Math.max(0, waiting - this.latency);
    for (let n = 0; n < ready; n++) output[n + 1] = (values[n]! + sums[n]!) * scale;
    values.copyWithin(0, ready, waiting);
    sums.copyWithin(0, ready);
    sums.fill(0, sums.length - ready);
    this.waiting = waiting - ready;
    return ready;
  }
}
