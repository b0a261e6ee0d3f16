import { TailpairError } from '../../quantity/error.ts';
import { hermiteValue } from './hermite.ts';
import { ImplicitRun } from './implicit-run.ts';
import type { GroupField } from './implicit-step.ts';
import type { Formulas, KernelContext } from './kernel.ts';
import { linearStep, linearWeights, weightsAt } from './linear-weights.ts';
import { locate } from './locate.ts';
import { weightsPerGroup } from './memory.ts';
import { Point, readInside, readSample } from './point.ts';

/** Above this stiffness (length × norm of the jacobian) a step is divided. */
const stiffLimit = 1;
/** Stiffness aimed at when it is. */
const stiffAim = 0.5;
/** Above this stiffness of a whole cell the damped rule takes over, in this many pieces. */
const dampedLimit = 16;
const dampedPieces = 8;
/** Pieces shorter than this share of a cell are not divided further. */
const shortest = 2 ** -20;
/** More events than this at one instant are a ring of events. */
const mostEvents = 100;

/**
 * Steps one block's memory over a cell (the interval between two samples) in as many pieces as
 * its events and its stiffness ask for. Inside the cell every input is the cubic through its two
 * samples that carries its slopes. This is the reference for every back-end's fast loop, and the
 * path that loop takes where a cell needs care.
 */
export class CellStepper {
  private readonly context: KernelContext;
  private readonly formulas: Formulas;
  private readonly start: Point;
  private readonly middle: Point;
  private readonly end: Point;
  private readonly next: Float64Array;
  private readonly between: Float64Array;
  private readonly nextDrives: Float64Array;
  private readonly startSlopes: Float64Array;
  private readonly nextSlopes: Float64Array;
  private readonly weights = new Float64Array(weightsPerGroup);
  private readonly rises: Float64Array;
  private readonly riseSlopes: Float64Array;
  private readonly implicit: readonly (ImplicitRun | undefined)[];
  private cell = 0;
  /** Whether the piece at hand is stepped by the damped rule. */
  private damped = false;

  constructor(context: KernelContext, formulas: Formulas) {
    const { inputs, states, crossings, groups } = context.program;
    const vector = (): Float64Array => new Float64Array(states.length);
    this.context = context;
    this.formulas = formulas;
    this.start = new Point(inputs.length);
    this.middle = new Point(inputs.length);
    this.end = new Point(inputs.length);
    this.next = vector();
    this.between = vector();
    this.startSlopes = vector();
    this.nextSlopes = vector();
    this.nextDrives = new Float64Array(context.memory.drives.length);
    this.rises = new Float64Array(crossings.length);
    this.riseSlopes = new Float64Array(crossings.length);
    this.implicit = groups.map((group) =>
      group.kind === 'implicit' ? new ImplicitRun(group, states.length) : undefined,
    );
  }

  /** Puts the memory at sample `n`: cached values, drives, and the events that are due at once. */
  settleAt(n: number): void {
    this.cell = n;
    readSample(this.context, n, this.start);
    this.context.memory.past.fill(0);
    this.refresh();
    this.settle(-1);
    this.driveFrom(this.start);
  }

  /** Steps the memory over the cell that ends at sample `n`. */
  step(n: number): void {
    this.cell = n;
    readSample(this.context, n - 1, this.start);
    let from = 0;
    while (from < 1) {
      let to = this.integrate(from, 1);
      const crossing = this.earliest(from, to, (located) => {
        to = located;
      });
      this.commit();
      from = to;
      if (crossing >= 0) {
        this.settle(crossing);
        this.driveFrom(this.start);
      }
    }
  }

  /** Integrates a piece from `from` to `to` or, where it is stiff, as far as one piece may go. */
  private integrate(from: number, to: number): number {
    let end = to;
    for (;;) {
      this.damped = false;
      const stiffness = this.piece(from, end);
      if (stiffness <= stiffLimit) return end;
      const length = end - from;
      const ofCell = stiffness / length;
      if (ofCell > dampedLimit) {
        this.damped = true;
        end = Math.min(to, from + 1 / dampedPieces);
        while (this.piece(from, end) > stiffLimit) end = this.shorter(from, end, 2);
        return end;
      }
      end = this.shorter(from, end, Math.ceil(stiffness / stiffAim));
    }
  }

  private shorter(from: number, to: number, parts: number): number {
    const length = (to - from) / parts;
    if (length < shortest) {
      throw new TailpairError(
        'no-solution',
        `an equation could not be integrated at ${this.end.t} s: the implicit step does not settle at any length; look for a jump in the right-hand side`,
      );
    }
    return from + length;
  }

  /** One step of all groups over a piece, into `next`; returns the largest stiffness. */
  private piece(from: number, to: number): number {
    const { memory, program, clock } = this.context;
    const length = (to - from) * clock.period;
    readInside(this.context, this.cell, to, this.end);
    let stiffness = 0;
    program.groups.forEach((group, index) => {
      if (group.kind === 'linear') {
        const [only] = group.states;
        linearWeights(memory.rates[index]!, length, this.weights, 0);
        this.formulas.drive(index, this.next, this.end.u, this.end.s, this.end.t, this.nextDrives);
        this.next[only] = linearStep(
          this.weights,
          0,
          memory.states[only]!,
          memory.drives,
          this.nextDrives,
          2 * index,
        );
      } else {
        stiffness = Math.max(stiffness, this.implicitPiece(index, from, to, length));
      }
    });
    return stiffness;
  }

  private implicitPiece(index: number, from: number, to: number, length: number): number {
    const { memory } = this.context;
    const run = this.implicit[index]!;
    readInside(this.context, this.cell, (from + to) / 2, this.middle);
    this.earlierStates(length);
    const points = [this.start, this.middle, this.end] as const;
    const states = [memory.states, this.between, this.next] as const;
    const field: GroupField = (at, own, f, jacobian) =>
      this.formulas.field(index, run.withOwn(states[at], own), points[at].u, points[at].t, f, jacobian);
    run.gather(memory.states);
    const stiffness = this.damped
      ? run.step.damped(field, run.own, length, run.result)
        ? 0
        : Number.POSITIVE_INFINITY
      : run.step.smooth(field, run.own, length, run.result);
    run.scatter(this.next);
    return stiffness;
  }

  /** States of earlier groups at the middle of the piece, by the cubic through both ends. */
  private earlierStates(length: number): void {
    const { memory, program } = this.context;
    if (program.stateSlopes.length === 0) return;
    this.formulas.stateSlopes(memory.states, this.start.u, this.start.t, this.startSlopes);
    this.formulas.stateSlopes(this.next, this.end.u, this.end.t, this.nextSlopes);
    for (let i = 0; i < this.next.length; i++) {
      this.between[i] = hermiteValue(
        memory.states[i]!,
        this.next[i]!,
        length * this.startSlopes[i]!,
        length * this.nextSlopes[i]!,
        0.5,
      );
    }
  }

  /**
   * The first crossing between `from` and `to`, or −1. The piece is stepped anew to the instant
   * found, which is passed to `move`.
   */
  private earliest(from: number, to: number, move: (located: number) => void): number {
    const { past } = this.context.memory;
    const { rises } = this;
    if (rises.length === 0) return -1;
    this.measure(this.next, this.end);
    let first = -1;
    let end = to;
    for (let k = 0; k < rises.length; k++) {
      if (past[k] === 1 || !(rises[k]! >= 0)) continue;
      if (rises[k] === 0 && !this.rising(k, this.next, this.end)) continue;
      const startValue = this.valueAtStart(k);
      end = locate(from, startValue, end, this.riseAt(k, from, end), (at) => this.riseAt(k, from, at));
      this.riseAt(k, from, end);
      first = k;
    }
    if (first >= 0) move(end);
    else for (let k = 0; k < rises.length; k++) if (rises[k]! < 0) past[k] = 0;
    return first;
  }

  private valueAtStart(crossing: number): number {
    const { memory } = this.context;
    this.formulas.crossings(memory.states, this.start.u, this.start.t, this.rises);
    return this.rises[crossing]!;
  }

  private riseAt(crossing: number, from: number, to: number): number {
    this.piece(from, to);
    this.measure(this.next, this.end);
    return this.rises[crossing]!;
  }

  private measure(x: Float64Array, { u, t }: Point): void {
    this.formulas.crossings(x, u, t, this.rises);
  }

  private rising(crossing: number, x: Float64Array, { u, s, t }: Point): boolean {
    this.formulas.crossingSlopes(x, u, s, t, this.riseSlopes);
    return this.riseSlopes[crossing]! > 0;
  }

  /** Takes over the end of the piece as the new start. */
  private commit(): void {
    const { memory } = this.context;
    memory.states.set(this.next);
    memory.drives.set(this.nextDrives);
    this.start.copy(this.end);
  }

  /**
   * Carries out all events due at the start point, in the order of their declaration, until none
   * is left. `certain` is a crossing that was located here: it is due whatever its last digit.
   */
  private settle(certain: number): void {
    const { memory, program } = this.context;
    const { rises, start } = this;
    let due = certain;
    let count = 0;
    for (let again = rises.length > 0; again; ) {
      again = false;
      for (let k = 0; k < rises.length; k++) {
        this.measure(memory.states, start);
        const value = rises[k]!;
        const up = k === due || value > 0 || (value === 0 && this.rising(k, memory.states, start));
        if (up && memory.past[k] === 0) {
          memory.past[k] = 1;
          if (k === due) due = -1;
          count += 1;
          if (count > mostEvents) this.storm(program.crossings[k]!.expression.toString());
          this.formulas.change(k, start.u, start.t);
          this.refresh();
          again = true;
        } else if (!up && k !== certain) memory.past[k] = 0;
      }
    }
    if (certain >= 0) this.rearm(certain);
  }

  private rearm(crossing: number): void {
    this.measure(this.context.memory.states, this.start);
    if (this.rises[crossing]! < 0) this.context.memory.past[crossing] = 0;
  }

  private storm(expression: string): never {
    throw new TailpairError(
      'event-storm',
      `more than ${mostEvents} events fell on one instant at ${this.start.t} s, the last when ${expression} rose through zero; make the change move the expression clearly below zero`,
    );
  }

  /** Recomputes what depends on held memory, and the whole-cell weights of changed groups. */
  private refresh(): void {
    const { memory, program, clock } = this.context;
    this.formulas.refresh();
    program.groups.forEach((group, index) => {
      if (group.kind === 'linear')
        linearWeights(memory.rates[index]!, clock.period, memory.weights, weightsAt(index));
    });
  }

  /** Drives at the start point, where an event or the start of the run has set them anew. */
  private driveFrom({ u, s, t }: Point): void {
    const { memory, program } = this.context;
    program.groups.forEach((group, index) => {
      if (group.kind === 'linear') this.formulas.drive(index, memory.states, u, s, t, memory.drives);
    });
  }
}
