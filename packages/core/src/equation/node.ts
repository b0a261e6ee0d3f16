import type { Dimension } from '../quantity/dimension.ts';

/** What a leaf of an equation stands for. */
export type LeafRole =
  | 'input'
  | 'input-slope'
  | 'parameter'
  | 'surrounding'
  | 'time'
  | 'state'
  | 'held'
  | 'unknown';

/** Operators with a numeric result. */
export type NumericOp =
  | 'constant'
  | 'leaf'
  | 'add'
  | 'sub'
  | 'mul'
  | 'div'
  | 'neg'
  | 'abs'
  | 'min'
  | 'max'
  | 'floor'
  | 'sqrt'
  | 'exp'
  | 'exp2'
  | 'log'
  | 'sin'
  | 'cos'
  | 'tanh'
  | 'select'
  | 'solve';

/** Operators with a yes/no result. */
export type LogicOp = 'true' | 'false' | 'lt' | 'le' | 'eq' | 'and' | 'or' | 'not';

/** A vertex of the equation graph, as the passes over it see it. */
export interface EquationNode {
  readonly id: number;
  readonly op: NumericOp | LogicOp;
  readonly args: readonly EquationNode[];
  /** Absent on yes/no vertices. */
  readonly dimension?: Dimension;
  /** Of a constant: its value in SI base units. */
  readonly value: number;
  /** Of a leaf: its name in print. */
  readonly name: string;
  /** Of a leaf: what it stands for. */
  readonly role: LeafRole | undefined;
}

let created = 0;

/** Next vertex number; numbers only order and name vertices, they carry no meaning. */
export function nextNodeId(): number {
  created += 1;
  return created;
}

/**
 * Vertices already built in the graph at hand, by structure, so that equal terms are one vertex:
 * a subexpression is then differentiated, compiled and evaluated once.
 */
type NodeTable = Map<string, EquationNode>;

let table: NodeTable | undefined;

/** Runs `build` with a table of its own: equal vertices built inside are the same object. */
export function withSharedNodes<T>(build: () => T): T {
  const outer = table;
  table = outer ?? new Map();
  try {
    return build();
  } finally {
    table = outer;
  }
}

/** The vertex of this structure: the one already in the table, or a new one. */
export function internNode<T extends EquationNode>(key: string, create: () => T): T {
  const known = table?.get(key);
  if (known !== undefined) return known as T;
  const made = create();
  table?.set(key, made);
  return made;
}
