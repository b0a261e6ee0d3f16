import type { EdgeList } from '../equation/kernel/edge-list.ts';

/** Buffers of one output: samples, and slopes where something downstream needs them. */
export interface OutputBuffers {
  /** `block.port`. */
  readonly name: string;
  readonly unit: 'V' | 'A';
  readonly values: Float64Array;
  /** Empty where nobody asks. */
  readonly slopes: Float64Array;
  /** Edges of the chunk at hand. */
  readonly edges: EdgeList;
}
