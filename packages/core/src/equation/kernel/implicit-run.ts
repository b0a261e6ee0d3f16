import type { ImplicitGroup } from '../program.ts';
import { ImplicitStep } from './implicit-step.ts';

/** One implicit group at work: its step and the arrays that gather and scatter its states. */
export class ImplicitRun {
  readonly step: ImplicitStep;
  /** States of the group at the start of the piece. */
  readonly own: Float64Array;
  /** States of the group at its end. */
  readonly result: Float64Array;
  private readonly group: ImplicitGroup;
  private readonly all: Float64Array;

  constructor(group: ImplicitGroup, states: number) {
    this.group = group;
    this.step = new ImplicitStep(group.states.length);
    this.own = new Float64Array(group.states.length);
    this.result = new Float64Array(group.states.length);
    this.all = new Float64Array(states);
  }

  /** All states, with those of the group set to `own`. */
  withOwn(states: Float64Array, own: Float64Array): Float64Array {
    this.all.set(states);
    for (let i = 0; i < own.length; i++) this.all[this.group.states[i]!] = own[i]!;
    return this.all;
  }

  /** Takes the group's states out of `states` as the start of a piece. */
  gather(states: Float64Array): void {
    for (let i = 0; i < this.own.length; i++) this.own[i] = states[this.group.states[i]!]!;
  }

  /** Writes the group's states at the end of the piece into `states`. */
  scatter(states: Float64Array): void {
    for (let i = 0; i < this.own.length; i++) states[this.group.states[i]!] = this.result[i]!;
  }
}
