import { jetLength } from '../equation/jet/jet-arithmetic.ts';
import { CellInputs } from '../equation/kernel/cell-inputs.ts';
import type { EdgeList } from '../equation/kernel/edge-list.ts';
import type { Clock } from '../equation/kernel/kernel.ts';
import type { OutputBuffers } from './output-buffers.ts';

/** One source of an input, and the factor it comes in with (1, or 1/R in siemens). */
export interface GatherSource {
  readonly from: OutputBuffers;
  readonly gain: number;
}

/** Forms a sum for samples `from` … `to − 1`. */
export type Gather = (from: number, to: number) => void;

/** Sums buffers in the order of the wires: currents that meet, or voltages that come in through resistors. */
export function gather(
  sources: readonly { readonly buffer: Float64Array; readonly gain: number }[],
  target: Float64Array,
): Gather {
  return (from, to) => {
    target.fill(0, from, to);
    for (const { buffer, gain } of sources) {
      for (let n = from; n < to; n++) target[n]! += gain * buffer[n]!;
    }
  };
}

/** Sums the edges of the same sources: wherever one has an edge, the sum has, with the jets of all. */
export function gatherEdges(sources: readonly GatherSource[], target: EdgeList, clock: Clock): Gather {
  const signals = {
    values: sources.map(({ from }) => from.values),
    slopes: sources.map(({ from }) => from.slopes),
    edges: sources.map(({ from }) => from.edges),
  };
  const inputs = new CellInputs(signals, clock);
  const jet = new Float64Array(jetLength);
  const sum = (at: number, side: -1 | 1, into: Float64Array, offset: number): void => {
    into.fill(0, offset, offset + jetLength);
    sources.forEach(({ gain }, i) => {
      inputs.jet(i, at, side, jet);
      for (let k = 0; k < jetLength; k++) into[offset + k]! += gain * jet[k]!;
    });
  };
  return (from, to) => {
    target.clear();
    inputs.rewind();
    for (let n = nextEdge(signals.edges, from); n < to; n = nextEdge(signals.edges, n + 1)) {
      inputs.enter(n);
      for (const at of inputs.breaks) {
        const edge = target.add(n, at) * jetLength;
        sum(at, -1, target.before, edge);
        sum(at, 1, target.after, edge);
      }
    }
  };
}

/** The first cell, from `from` on, in which one of the lists has an edge; infinite where none has. */
export function nextEdge(lists: readonly EdgeList[], from: number): number {
  let next = Number.POSITIVE_INFINITY;
  for (const { cells, count } of lists) {
    for (let k = 0; k < count; k++) {
      if (cells[k]! < from) continue;
      next = Math.min(next, cells[k]!);
      break;
    }
  }
  return next;
}
