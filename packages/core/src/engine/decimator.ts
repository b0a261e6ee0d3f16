import { dimensions } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { requireRange } from '../quantity/guard.ts';
import { halfBandTaps } from './half-band.ts';
import { HalfBandStage } from './half-band-stage.ts';

const factors = [1, 2, 4, 8, 16, 32];

/** dB: 150 are promised, the rest is what the design may miss between the points of its frequency grid. */
const rejection = 150.1;

/** Input samples that go through the cascade at a time: enough to make its bookkeeping cheap. */
const block = 256;

/**
 * Divides the sampling rate by a whole factor, piece by piece.
 *
 * A cascade of half-band filters, each only as steep as its own fold demands: up to the pass edge the gain
 * is 1 within 1e-6 (8e-6 dB), and what would fold below the pass edge is rejected by 150 dB. Between pass
 * edge and half the output rate the signal is attenuated, and aliases within that band are let through.
 * Linear phase and no delay: output sample k stands for the instant of input sample k·factor. Before the
 * first input sample the signal is taken as held at its first value. Any division of the input into pieces
 * gives the same bits.
 */
export class Decimator {
  /** Hz. The larger of 20 kHz and 5/12 of the output rate; below 44.1 kHz always 5/12 of it. */
  readonly passEdge: number;
  /** Input samples beyond k·factor that must be pushed before output sample k comes out. */
  readonly latency: number;
  readonly #stages: readonly HalfBandStage[];
  #started = false;

  /**
   * @param factor - 1, 2, 4, 8, 16 or 32; 1 hands the samples through
   * @param rate - output rate in Hz, above 0
   * @throws TailpairError `value-range` for any other factor or rate
   */
  constructor(factor: number, rate: number) {
    if (!factors.includes(factor)) {
      throw new TailpairError('value-range', `must be one of ${factors.join(', ')}, got ${factor}`, {
        where: 'oversample',
      });
    }
    requireRange(rate, { where: 'rate', unit: dimensions.frequency, above: 0 });
    this.passEdge = rate < 44100 ? (rate * 5) / 12 : Math.max(20000, (rate * 5) / 12);
    const stages: HalfBandStage[] = [];
    let latency = 0;
    for (let divided = 1; divided < factor; divided *= 2) {
      const taps = halfBandTaps((this.passEdge * divided) / (rate * factor), rejection);
      const stage = new HalfBandStage(taps, block / divided + 1);
      stages.push(stage);
      latency += stage.reach * divided;
    }
    this.#stages = stages;
    this.latency = latency;
  }

  /**
   * Takes `input[from … to − 1]` as the next samples and writes every output sample they complete to `output`
   * from index `at` on; allocates nothing.
   *
   * @returns number of output samples written, at most (to − from)/factor rounded up
   */
  push(input: Float64Array, from: number, to: number, output: Float64Array, at: number): number {
    const first = this.#stages[0];
    if (first === undefined) {
      for (let i = from; i < to; i++) output[at + i - from] = input[i]!;
      return to - from;
    }
    if (!this.#started && from < to) this.#start(first, input[from]!);
    let written = 0;
    for (let i = from; i < to; i += block) {
      first.feed(input, i, Math.min(to, i + block));
      written += this.#drain(output, at + written);
    }
    return written;
  }

  /** Lets the cascade run in on the first value: as many samples as its first output reaches back. */
  #start(first: HalfBandStage, value: number): void {
    this.#started = true;
    for (let left = this.latency; left > 0; left -= block) {
      first.hold(value, Math.min(left, block));
      this.#drain(noOutput, 0);
    }
  }

  #drain(output: Float64Array, at: number): number {
    const last = this.#stages.length - 1;
    for (let i = 0; i < last; i++) this.#stages[i]!.drainInto(this.#stages[i + 1]!);
    return this.#stages[last]!.drain(output, at);
  }
}

/** The run-in completes no output. */
const noOutput = new Float64Array(0);
