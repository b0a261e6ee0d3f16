import { jetLength } from '../jet/jet-arithmetic.ts';

/** Edges nearer to each other than this share of a cell are one event. */
export const sameInstant = 1e-9;

/**
 * The edges of one output in the chunk at hand, in the order of time: where the waveform or one of
 * its derivatives jumps. An edge lies at (cell, fraction), never at a time in seconds: cell n is
 * the interval that ends at sample n, 0 < fraction ≤ 1, so that an edge on a sample counts as
 * passed there. It carries the jets just before and just after, in units of one sample.
 */
export class EdgeList {
  count = 0;
  /** Slot of the sample that ends the cell. */
  cells: Int32Array = new Int32Array(16);
  /** Fraction of the cell. */
  at: Float64Array = new Float64Array(16);
  before: Float64Array = new Float64Array(16 * jetLength);
  after: Float64Array = new Float64Array(16 * jetLength);

  /** Appends an edge, its jets still to be written; returns its index. */
  add(cell: number, at: number): number {
    const index = this.count;
    if (index === this.cells.length) this.grow();
    this.cells[index] = cell;
    this.at[index] = at;
    this.count += 1;
    return index;
  }

  clear(): void {
    this.count = 0;
  }

  private grow(): void {
    const wider = <A extends Int32Array | Float64Array>(from: A, to: A): A => {
      to.set(from as never);
      return to;
    };
    const length = 2 * this.cells.length;
    this.cells = wider(this.cells, new Int32Array(length));
    this.at = wider(this.at, new Float64Array(length));
    this.before = wider(this.before, new Float64Array(length * jetLength));
    this.after = wider(this.after, new Float64Array(length * jetLength));
  }
}
