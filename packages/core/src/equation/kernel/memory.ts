import type { Program } from '../program.ts';

/** Numbers in a row for each linear group: see `linear-weights.ts`. */
export const weightsPerGroup = 5;

/** Everything one block remembers between samples, as flat arrays. */
export interface KernelMemory {
  /** Values computed at set-up. */
  readonly fixed: Float64Array;
  /** Values computed after each event. */
  readonly cached: Float64Array;
  readonly states: Float64Array;
  readonly held: Float64Array;
  /** 1 where a crossing's expression has risen through zero and not fallen back. */
  readonly past: Float64Array;
  /** Coefficient of each group that is linear in itself (0 for the others). */
  readonly rates: Float64Array;
  /** Weights of a whole-cell step of each linear group. */
  readonly weights: Float64Array;
  /** Drive and its slope at the last point reached, for each linear group. */
  readonly drives: Float64Array;
}

/** Memory for one block of this program; zero until the block is started. */
export function kernelMemory(program: Program): KernelMemory {
  const groups = program.groups.length;
  return {
    fixed: new Float64Array(program.fixed.length),
    cached: new Float64Array(program.cached.length),
    states: new Float64Array(program.states.length),
    held: new Float64Array(program.helds.length),
    past: new Float64Array(program.crossings.length),
    rates: new Float64Array(groups),
    weights: new Float64Array(groups * weightsPerGroup),
    drives: new Float64Array(groups * 2),
  };
}
