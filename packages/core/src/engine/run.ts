import type { Patch } from '../patch/patch.ts';
import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { correctedSignal } from './corrected-path.ts';
import type { CorrectedSignal } from './corrected-signal.ts';
import { CorrectionKernel } from './correction-kernel.ts';
import { Decimator } from './decimator.ts';
import { Machine } from './machine.ts';
import type { OutputBuffers } from './output-buffers.ts';
import { type ReadOptions, unknownProbe } from './run-options.ts';

/** A probe at work: where its samples come from and how they are brought to the rate of its trace. */
interface ProbeTap {
  readonly output: OutputBuffers;
  /** Corrects the edges, where they are carried. */
  readonly corrected: CorrectedSignal | undefined;
  readonly decimator: Decimator;
}

/** A patch running, chunk by chunk. */
export class Run {
  /** Samples per second of the traces. */
  readonly rate: number;
  /** Unit of each probe. */
  readonly units: readonly ('V' | 'A')[];
  /** Internal samples that must be computed for one trace sample, and on top for the first. */
  readonly stride: number;
  readonly latency: number;
  private readonly machine: Machine;
  private readonly chunk: number;
  private readonly taps: readonly ProbeTap[];
  private started = false;

  constructor(patch: Patch, probes: readonly string[], options: ReadOptions) {
    const { rate, oversample, decimate, chunk, backEnd, carry } = options;
    const internal = rate * oversample;
    this.chunk = chunk;
    this.stride = decimate ? oversample : 1;
    this.rate = decimate ? rate : internal;
    this.machine = new Machine(patch, { rate: internal, chunk, backEnd, carry });
    const kernel = carry ? CorrectionKernel.for(oversample) : undefined;
    const path = kernel && { machine: this.machine, kernel, chunk, rate: internal, backEnd };
    this.taps = probes.map((probe) => {
      const output = this.machine.output(probe);
      if (output === undefined) throw unknownProbe(probe, this.machine.outputNames());
      return {
        output,
        corrected: path && correctedSignal(output.name, path, false),
        decimator: new Decimator(this.stride, this.rate),
      };
    });
    this.units = this.taps.map(({ output }) => output.unit);
    this.latency = (kernel?.reach ?? 0) + (this.taps[0]?.decimator.latency ?? 0);
  }

  /** Internal samples that make `count` trace samples. */
  samplesFor(count: number): number {
    return (count - 1) * this.stride + this.latency + 1;
  }

  /**
   * Computes the next internal samples, `most` at the most, and appends the trace samples they
   * complete to `into`, one array a probe, from index `at` on.
   *
   * @returns internal samples computed, and trace samples appended
   */
  advance(most: number, into: readonly Float64Array[], at: number): { computed: number; appended: number } {
    const from = this.started ? 1 : 0;
    const computed = this.started ? Math.min(most, this.chunk) : 1;
    if (this.started) this.machine.advance(computed);
    else this.machine.start();
    let appended = 0;
    const last = from + computed;
    this.taps.forEach(({ output, corrected, decimator }, i) => {
      if (corrected === undefined) appended = decimator.push(output.values, from, last, into[i]!, at);
      else {
        const ready = corrected.advance(from, last);
        appended = decimator.push(corrected.values, 1, ready + 1, into[i]!, at);
      }
    });
    if (this.started) this.machine.rotate(computed);
    this.started = true;
    return { computed, appended };
  }
}

/** Throws where the run is to be stopped. */
export function requireGoing(signal: { readonly aborted: boolean } | undefined, seconds: number): void {
  if (signal?.aborted)
    throw new TailpairError('aborted', `the run was stopped at ${formatQuantity(seconds, 's')}`);
}
