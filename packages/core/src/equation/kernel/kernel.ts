import type { Program } from '../program.ts';
import type { EdgeList } from './edge-list.ts';
import type { KernelMemory } from './memory.ts';

/**
 * The clock of a run, shared by all its kernels. Time is index / rate, never accumulated: the
 * quotient is the nearest number to the true time, so that an event set for a sample falls on it.
 */
export interface Clock {
  /** Internal samples per second. */
  readonly rate: number;
  /** Seconds between internal samples. */
  readonly period: number;
  /** Sample index that slot 0 of every buffer holds at the moment. */
  base: number;
}

/**
 * Buffers of one block. Slot 0 of each holds the last sample of the chunk before, slots 1 … n the
 * chunk. Arrays are ordered as the program's inputs and outputs; a slope nobody asked for is an
 * empty array.
 */
export interface KernelPorts {
  readonly inputs: readonly Float64Array[];
  readonly inputSlopes: readonly Float64Array[];
  readonly outputs: readonly Float64Array[];
  readonly outputSlopes: readonly Float64Array[];
  /** Edges of each input and output in the chunk at hand. */
  readonly inputEdges: readonly EdgeList[];
  readonly outputEdges: readonly EdgeList[];
}

/** What a block's formulas are computed on. */
export interface KernelContext {
  readonly program: Program;
  readonly memory: KernelMemory;
  readonly ports: KernelPorts;
  readonly clock: Clock;
  /** Whether edges are carried. */
  readonly carry: boolean;
}

/**
 * The formulas of one program on one block's memory, as a back-end computes them. `x` are the
 * states, `u` and `s` the inputs and their slopes at a point, `t` its time in seconds.
 */
export interface Formulas {
  /** Recomputes the cached values and the rates of the linear groups from held memory. */
  refresh(): void;
  /** Writes drive and drive slope of a linear group to `out[2·group]` and `out[2·group + 1]`. */
  drive(group: number, x: Float64Array, u: Float64Array, s: Float64Array, t: number, out: Float64Array): void;
  /** Writes right-hand sides and jacobian of an implicit group. */
  field(
    group: number,
    x: Float64Array,
    u: Float64Array,
    t: number,
    f: Float64Array,
    jacobian: Float64Array,
  ): void;
  /** Writes the slopes of all states, where the program lists them. */
  stateSlopes(x: Float64Array, u: Float64Array, t: number, out: Float64Array): void;
  /** Writes the expressions of all crossings. */
  crossings(x: Float64Array, u: Float64Array, t: number, out: Float64Array): void;
  /** Writes their slopes in time. */
  crossingSlopes(x: Float64Array, u: Float64Array, s: Float64Array, t: number, out: Float64Array): void;
  /** Carries out the changes of one crossing on the memory. */
  change(crossing: number, u: Float64Array, t: number): void;
  /** Writes the outputs of sample `n` of the buffers. */
  emit(n: number): void;
}

/** Steps the memory over one cell, the interval that ends at sample `n` of the buffers. */
export type CellStep = (n: number) => void;

/** A block ready to run. */
export interface Kernel {
  /** Sets the memory to the start of a run and writes sample `n`. */
  start(n: number): void;
  /** Computes samples `from` … `to − 1` of the buffers. */
  run(from: number, to: number): void;
}

/** A back-end: the formulas of a block, and its loop over samples. */
export interface BackEnd {
  formulas(context: KernelContext): Formulas;
  /** The loop; `cell` steps over a cell that needs care (an event, a stiff or implicit step). */
  loop(context: KernelContext, formulas: Formulas, cell: CellStep): (from: number, to: number) => void;
}
