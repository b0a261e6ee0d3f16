import { jetLength } from '../jet/jet-arithmetic.ts';
import type { Side } from '../jet/jet-tape.ts';
import { type EdgeList, sameInstant } from './edge-list.ts';
import type { Clock } from './kernel.ts';
import type { Point } from './point.ts';

/** Signals as a cell sees them: buffers, slopes and edges, in one order. */
export interface CellSignals {
  readonly values: readonly Float64Array[];
  readonly slopes: readonly Float64Array[];
  readonly edges: readonly EdgeList[];
}

/** An end of a smooth stretch of one input: its place in the cell, value, and slope per sample. */
interface Node {
  at: number;
  value: number;
  slope: number;
}

/**
 * The inputs of a block inside one cell. Between its samples and its own edges every input is the
 * cubic through both ends that carries their slopes; at an edge it has the jets the edge carries.
 */
export class CellInputs {
  /** Where any input has an edge in this cell, in order; instants nearer than a billionth are one. */
  readonly breaks: number[] = [];
  private readonly signals: CellSignals;
  private readonly clock: Clock;
  /** First edge of the cell in each input's list, and the one after the last. */
  private readonly first: Int32Array;
  private readonly last: Int32Array;
  private readonly left: Node = { at: 0, value: 0, slope: 0 };
  private readonly right: Node = { at: 1, value: 0, slope: 0 };
  private cell = 0;

  constructor(signals: CellSignals, clock: Clock) {
    this.signals = signals;
    this.clock = clock;
    this.first = new Int32Array(signals.values.length);
    this.last = new Int32Array(signals.values.length);
  }

  /** A new chunk begins: all edge lists have been written anew. */
  rewind(): void {
    this.last.fill(0);
  }

  /** Turns to the cell that ends at sample `n`; cells must come in order. */
  enter(n: number): void {
    this.cell = n;
    this.breaks.length = 0;
    this.signals.edges.forEach((edges, i) => {
      let index = this.last[i]!;
      while (index < edges.count && edges.cells[index]! < n) index += 1;
      this.first[i] = index;
      for (; index < edges.count && edges.cells[index] === n; index++) this.breaks.push(edges.at[index]!);
      this.last[i] = index;
    });
    if (this.breaks.length > 1) this.mergeBreaks();
  }

  private mergeBreaks(): void {
    const { breaks } = this;
    breaks.sort((a, b) => a - b);
    let kept = 1;
    for (let i = 1; i < breaks.length; i++) {
      if (breaks[i]! - breaks[kept - 1]! > sameInstant) breaks[kept++] = breaks[i]!;
    }
    breaks.length = kept;
  }

  /** Puts `point` at a share of the cell, just before or just after it. */
  read(at: number, side: Side, point: Point): void {
    const { clock } = this;
    for (let i = 0; i < point.u.length; i++) {
      const edge = this.edgeAt(i, at);
      if (edge >= 0) {
        const edges = this.signals.edges[i]!;
        const jets = side < 0 ? edges.before : edges.after;
        point.u[i] = jets[edge * jetLength]!;
        point.s[i] = jets[edge * jetLength + 1]! / clock.period;
      } else {
        this.stretch(i, at);
        this.cubicAt(at);
        point.u[i] = cubic[0]!;
        point.s[i] = cubic[1]! / clock.period;
      }
    }
    point.t = (clock.base + this.cell - 1 + at) / clock.rate;
  }

  /** Writes the jet of input `i` just before or after a share of the cell. */
  jet(i: number, at: number, side: Side, out: Float64Array): void {
    const edge = this.edgeAt(i, at);
    if (edge >= 0) {
      const edges = this.signals.edges[i]!;
      const from = (side < 0 ? edges.before : edges.after).subarray(edge * jetLength, (edge + 1) * jetLength);
      out.set(from);
    } else {
      this.stretch(i, at);
      this.cubicAt(at);
      out.set(cubic);
    }
  }

  private edgeAt(i: number, at: number): number {
    const edges = this.signals.edges[i]!;
    for (let k = this.first[i]!; k < this.last[i]!; k++) {
      if (Math.abs(edges.at[k]! - at) <= sameInstant) return k;
    }
    return -1;
  }

  /** Finds the smooth stretch of input `i` that holds a share of the cell. */
  private stretch(i: number, at: number): void {
    const { signals, clock, left, right, cell } = this;
    const values = signals.values[i]!;
    const slopes = signals.slopes[i]!;
    set(left, 0, values[cell - 1]!, (slopes[cell - 1] ?? 0) * clock.period);
    set(right, 1, values[cell]!, (slopes[cell] ?? 0) * clock.period);
    const edges = signals.edges[i]!;
    for (let k = this.first[i]!; k < this.last[i]!; k++) {
      const place = edges.at[k]!;
      if (place < at) set(left, place, edges.after[k * jetLength]!, edges.after[k * jetLength + 1]!);
      else {
        set(right, place, edges.before[k * jetLength]!, edges.before[k * jetLength + 1]!);
        return;
      }
    }
  }

  /** Coefficients, at a share of the cell, of the cubic over the stretch found. */
  private cubicAt(at: number): void {
    const { left, right } = this;
    const width = right.at - left.at;
    cubic.fill(0);
    if (width <= sameInstant) {
      cubic[0] = left.value;
      cubic[1] = left.slope;
      return;
    }
    const rise = right.value - left.value;
    const a1 = width * left.slope;
    const a2 = 3 * rise - width * (2 * left.slope + right.slope);
    const a3 = width * (left.slope + right.slope) - 2 * rise;
    const x = (at - left.at) / width;
    cubic[0] =
      x < 0.5 ? left.value + x * (a1 + x * (a2 + x * a3)) : fromRight(right.value, a1, a2, a3, 1 - x);
    cubic[1] = (a1 + x * (2 * a2 + 3 * x * a3)) / width;
    cubic[2] = (a2 + 3 * x * a3) / (width * width);
    cubic[3] = a3 / (width * width * width);
  }
}

const cubic = new Float64Array(jetLength);

/** The cubic seen from its right end, where that is nearer, so that the end itself comes out exact. */
function fromRight(value: number, a1: number, a2: number, a3: number, y: number): number {
  return value - y * (a1 + 2 * a2 + 3 * a3 - y * (a2 + 3 * a3 - y * a3));
}

function set(node: Node, at: number, value: number, slope: number): void {
  node.at = at;
  node.value = value;
  node.slope = slope;
}
