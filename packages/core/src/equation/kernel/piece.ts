import { TailpairError } from '../../quantity/error.ts';
import type { CellInputs } from './cell-inputs.ts';
import { hermiteValue } from './hermite.ts';
import { ImplicitRun } from './implicit-run.ts';
import type { GroupField } from './implicit-step.ts';
import type { Formulas, KernelContext } from './kernel.ts';
import { linearStep, linearWeights, steadyStep } from './linear-weights.ts';
import { weightsPerGroup } from './memory.ts';
import { Point } from './point.ts';

/** Above this stiffness (length × norm of the jacobian) a piece is divided. */
const stiffLimit = 1;
/** Stiffness aimed at when it is. */
const stiffAim = 0.5;
/** Above this stiffness of a whole cell the damped rule takes over, in this many pieces. */
const dampedLimit = 16;
const dampedPieces = 8;
/** Pieces shorter than this share of a cell are not divided further. */
const shortest = 2 ** -20;

/**
 * Integrates the states of one block over a piece of a cell, group by group: linear states
 * exactly, the others by the implicit rules. The memory is left alone until {@link commit}.
 */
export class PieceStepper {
  /** Where the piece starts: the point the memory stands at. */
  readonly start: Point;
  /** Where the last piece tried ends. */
  readonly end: Point;
  /** States there. */
  readonly next: Float64Array;
  private readonly context: KernelContext;
  private readonly formulas: Formulas;
  private readonly inputs: CellInputs;
  private readonly middle: Point;
  private readonly between: Float64Array;
  private readonly nextDrives: Float64Array;
  private readonly startSlopes: Float64Array;
  private readonly nextSlopes: Float64Array;
  private readonly weights = new Float64Array(weightsPerGroup);
  private readonly implicit: readonly (ImplicitRun | undefined)[];
  /** Whether the piece at hand is stepped by the damped rule. */
  private damped = false;

  constructor(context: KernelContext, formulas: Formulas, cellInputs: CellInputs) {
    const { inputs, states, groups } = context.program;
    const vector = (): Float64Array => new Float64Array(states.length);
    this.context = context;
    this.formulas = formulas;
    this.inputs = cellInputs;
    this.start = new Point(inputs.length);
    this.middle = new Point(inputs.length);
    this.end = new Point(inputs.length);
    this.next = vector();
    this.between = vector();
    this.startSlopes = vector();
    this.nextSlopes = vector();
    this.nextDrives = new Float64Array(context.memory.drives.length);
    this.implicit = groups.map((group) =>
      group.kind === 'implicit' ? new ImplicitRun(group, states.length) : undefined,
    );
  }

  /**
   * Integrates from `from` towards `limit`, shares of the present cell, as far as one piece may go.
   *
   * @returns where the piece ends, as a share of the cell
   */
  integrate(from: number, limit: number): number {
    this.damped = false;
    for (let to = limit; ; ) {
      const stiffness = this.step(from, to);
      if (stiffness <= stiffLimit) return to;
      if (stiffness > dampedLimit * (to - from)) return this.integrateDamped(from, limit);
      to = this.shorter(from, to, Math.ceil(stiffness / stiffAim));
    }
  }

  private integrateDamped(from: number, limit: number): number {
    this.damped = true;
    let to = Math.min(limit, from + 1 / dampedPieces);
    while (this.step(from, to) > stiffLimit) to = this.shorter(from, to, 2);
    return to;
  }

  private shorter(from: number, to: number, parts: number): number {
    const length = (to - from) / parts;
    if (length >= shortest) return from + length;
    throw new TailpairError(
      'no-solution',
      `an equation could not be integrated at ${this.end.t} s: the implicit step does not settle at any length; look for a jump in the right-hand side`,
    );
  }

  /**
   * Steps all groups from the start to `to` by the rule of the piece at hand.
   *
   * @returns the largest stiffness met; infinite where a step did not settle
   */
  step(from: number, to: number): number {
    const { memory, program, clock } = this.context;
    const { next, end, weights, nextDrives } = this;
    const length = (to - from) * clock.period;
    this.inputs.read(to, -1, end);
    let stiffness = 0;
    for (let index = 0; index < program.groups.length; index++) {
      const group = program.groups[index]!;
      if (group.kind === 'linear') {
        const state = group.states[0];
        linearWeights(memory.rates[index]!, length, weights, 0);
        this.formulas.drive(index, next, end.u, end.s, end.t, nextDrives);
        const x = memory.states[state]!;
        next[state] = group.steady
          ? steadyStep(weights, 0, x, nextDrives[2 * index]!)
          : linearStep(weights, 0, x, memory.drives, nextDrives, 2 * index);
      } else {
        this.inputs.read((from + to) / 2, -1, this.middle);
        stiffness = Math.max(stiffness, this.implicitStep(index, length));
      }
    }
    return stiffness;
  }

  private implicitStep(index: number, length: number): number {
    const { memory } = this.context;
    const run = this.implicit[index]!;
    this.earlierStates(length);
    const points = [this.start, this.middle, this.end] as const;
    const states = [memory.states, this.between, this.next] as const;
    const field: GroupField = (at, own, f, jacobian) =>
      this.formulas.field(index, run.withOwn(states[at], own), points[at].u, points[at].t, f, jacobian);
    run.gather(memory.states);
    let stiffness: number;
    if (this.damped) {
      stiffness = run.step.damped(field, run.own, length, run.result) ? 0 : Number.POSITIVE_INFINITY;
    } else stiffness = run.step.smooth(field, run.own, length, run.result);
    run.scatter(this.next);
    return stiffness;
  }

  /** States of earlier groups at the middle of the piece, by the cubic through both ends. */
  private earlierStates(length: number): void {
    const { memory, program } = this.context;
    if (program.stateSlopes.length === 0) return;
    const { start, end, next, startSlopes, nextSlopes } = this;
    this.formulas.stateSlopes(memory.states, start.u, start.t, startSlopes);
    this.formulas.stateSlopes(next, end.u, end.t, nextSlopes);
    for (let i = 0; i < next.length; i++) {
      const slopes = [length * startSlopes[i]!, length * nextSlopes[i]!] as const;
      this.between[i] = hermiteValue(memory.states[i]!, next[i]!, ...slopes, 0.5);
    }
  }

  /** Makes the end of the piece the state of the memory, and the start of the next piece. */
  commit(): void {
    const { memory } = this.context;
    memory.states.set(this.next);
    memory.drives.set(this.nextDrives);
    this.start.copy(this.end);
  }

  /** Computes the drives at the start point anew, after an event has changed something there. */
  drive(): void {
    const { memory, program } = this.context;
    const { u, s, t } = this.start;
    program.groups.forEach((group, index) => {
      if (group.kind === 'linear') this.formulas.drive(index, memory.states, u, s, t, memory.drives);
    });
  }
}
