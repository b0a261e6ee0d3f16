import type { Expression } from './expression.ts';

/** A leaf that stands for a value computed once and kept: at set-up, or after each event. */
export interface Slot {
  readonly symbol: Expression;
  readonly from: Expression;
}

/** One state, linear in itself: dx/dt = rate·x + drive. Integrated exactly. */
export interface LinearGroup {
  readonly kind: 'linear';
  readonly states: readonly [number];
  /** Coefficient of the state; changes at events at most. */
  readonly rate: Expression;
  readonly drive: Expression;
  /** Slope of the drive in time. */
  readonly driveSlope: Expression;
  /** Whether the drive changes at events only. */
  readonly steady: boolean;
}

/** States that must be stepped together, or one that is bent by itself. */
export interface ImplicitGroup {
  readonly kind: 'implicit';
  /** Indices into the states of the program. */
  readonly states: readonly number[];
  /** Right-hand sides, one a state of the group. */
  readonly field: readonly Expression[];
  /** Derivative of right-hand side `i` by state `j` of the group, row by row. */
  readonly jacobian: readonly Expression[];
}

/** One step of the integration order. */
export type Group = LinearGroup | ImplicitGroup;

/**
 * An event with all that locating and carrying it out takes; or a corner, where a choice between
 * smooth branches is decided anew. A corner changes nothing, but it is passed in both directions.
 */
export interface Crossing {
  readonly corner: boolean;
  readonly expression: Expression;
  readonly slope: Expression;
  /** `memory` indexes the states, or the held numbers. */
  readonly changes: readonly {
    readonly kind: 'state' | 'held';
    readonly memory: number;
    readonly value: Expression;
  }[];
}

/** An output port: its value, and its slope where something downstream asks for it. */
export interface Output {
  readonly name: string;
  readonly value: Expression;
  readonly slope: Expression | undefined;
}

/**
 * The equations of one block made ready for a back-end: what is computed when. Everything here is
 * data; the interpreter walks it, the generators print it.
 */
export interface Program {
  readonly inputs: readonly Expression[];
  /** Leaves that stand for the slopes of the inputs, in their order. */
  readonly inputSlopes: readonly Expression[];
  /** Which inputs must come with their slope. */
  readonly slopesWanted: readonly boolean[];
  readonly time: Expression;
  /** Computed at set-up. */
  readonly fixed: readonly Slot[];
  /** Computed at set-up and after each event. */
  readonly cached: readonly Slot[];
  readonly states: readonly Slot[];
  readonly helds: readonly Slot[];
  readonly groups: readonly Group[];
  /** Slopes of all states, where an implicit group needs those of an earlier group; else empty. */
  readonly stateSlopes: readonly Expression[];
  /** Events, then corners. */
  readonly crossings: readonly Crossing[];
  /** Slopes of all states, for their jets. */
  readonly jetSlopes: readonly Expression[];
  readonly outputs: readonly Output[];
}
