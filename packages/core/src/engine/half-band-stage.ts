import { halveRate } from './halve-rate.ts';

/**
 * One halving of the rate, fed piece by piece. Output k is centred on sample `reach` + 2k of what was fed in,
 * so `reach` samples must come before the first centre. Samples wait in one straight line, moved to its front
 * when it is full, so that the filter never wraps around.
 */
export class HalfBandStage {
  /** Samples the filter takes on each side of its centre; odd. */
  readonly reach: number;
  readonly #taps: Float64Array;
  readonly #line: Float64Array;
  /** The waiting samples: from the first that the next output needs to the last fed in. */
  #start = 0;
  #end = 0;

  /** @param intake - most samples fed in between two calls of `drain` */
  constructor(taps: Float64Array, intake: number) {
    this.reach = 2 * taps.length - 1;
    this.#taps = taps;
    this.#line = new Float64Array(2 * this.reach + 4 * intake);
  }

  /** Feeds `input[from … to − 1]`. */
  feed(input: Float64Array, from: number, to: number): void {
    this.#makeRoom(to - from);
    const line = this.#line;
    const shift = this.#end - from;
    for (let i = from; i < to; i++) line[i + shift] = input[i]!;
    this.#end += to - from;
  }

  /** Feeds one value `count` times. */
  hold(value: number, count: number): void {
    this.#makeRoom(count);
    this.#line.fill(value, this.#end, this.#end + count);
    this.#end += count;
  }

  /** Writes every output that can be formed, and returns how many. */
  drain(output: Float64Array, at: number): number {
    const count = this.#due;
    halveRate(this.#taps, this.#line, this.#start + this.reach, count, output, at);
    this.#start += 2 * count;
    return count;
  }

  /** Feeds every output that can be formed to the next stage. */
  drainInto(next: HalfBandStage): void {
    next.#makeRoom(this.#due);
    next.#end += this.drain(next.#line, next.#end);
  }

  /** Number of outputs that can be formed. */
  get #due(): number {
    return Math.max(0, (this.#end - this.#start - 2 * this.reach + 1) >> 1);
  }

  #makeRoom(count: number): void {
    if (this.#end + count <= this.#line.length) return;
    this.#line.copyWithin(0, this.#start, this.#end);
    this.#end -= this.#start;
    this.#start = 0;
  }
}
