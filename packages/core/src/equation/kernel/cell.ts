import { TailpairError } from '../../quantity/error.ts';
import type { Formulas, KernelContext } from './kernel.ts';
import { linearWeights, weightsAt } from './linear-weights.ts';
import { locate } from './locate.ts';
import { PieceStepper } from './piece.ts';
import { type Point, readSample } from './point.ts';

/** More events than this at one instant are a ring of events. */
const mostAtOnce = 100;
/** More events than this between two samples are no signal any more. */
const mostInCell = 10_000;

/**
 * Steps one block's memory over a cell (the interval between two samples) in as many pieces as
 * its events and its stiffness ask for. Inside the cell every input is the cubic through its two
 * samples that carries its slopes. This is the reference for every back-end's fast loop, and the
 * path that loop takes where a cell needs care.
 *
 * An expression counts as past zero while it is positive, or zero and rising; an event is due when
 * it comes to be past zero.
 */
export class CellStepper {
  private readonly context: KernelContext;
  private readonly formulas: Formulas;
  private readonly piece: PieceStepper;
  /** Expressions of all crossings at the point last measured. */
  private readonly rises: Float64Array;
  private readonly slopes: Float64Array;

  constructor(context: KernelContext, formulas: Formulas) {
    const crossings = context.program.crossings.length;
    this.context = context;
    this.formulas = formulas;
    this.piece = new PieceStepper(context, formulas);
    this.rises = new Float64Array(crossings);
    this.slopes = new Float64Array(crossings);
  }

  /** Puts the memory at sample `n`: cached values, drives, and the events that are due at once. */
  settleAt(n: number): void {
    readSample(this.context, n, this.piece.start);
    this.context.memory.past.fill(0);
    this.refresh();
    this.settle(-1);
    this.piece.drive();
  }

  /** Steps the memory over the cell that ends at sample `n`. */
  step(n: number): void {
    const { piece } = this;
    readSample(this.context, n - 1, piece.start);
    let events = 0;
    for (let from = 0; from < 1; ) {
      const to = piece.integrate(n, from);
      const event = this.firstEvent(n, from, to);
      piece.commit();
      if (event === undefined) from = to;
      else {
        from = event.at;
        events += 1;
        if (events > mostInCell)
          this.refuseStorm(event.crossing, `${mostInCell} events fell between two samples`);
        this.settle(event.crossing);
        piece.drive();
      }
    }
  }

  /** The first event between `from` and `to`; the piece is stepped anew to its instant. */
  private firstEvent(n: number, from: number, to: number): { crossing: number; at: number } | undefined {
    const { past } = this.context.memory;
    const { rises, piece } = this;
    if (rises.length === 0) return undefined;
    let event: { crossing: number; at: number } | undefined;
    this.measure(piece.next, piece.end);
    for (let k = 0; k < rises.length; k++) {
      if (past[k] !== 0 || !this.isPast(k, piece.next, piece.end)) continue;
      const high = rises[k]!;
      this.measure(this.context.memory.states, piece.start);
      const low = rises[k]!;
      const at = locate(from, low, event?.at ?? to, high, (share) => this.riseAt(k, n, from, share));
      this.riseAt(k, n, from, at);
      event = { crossing: k, at };
    }
    if (event === undefined) this.rearm();
    return event;
  }

  private riseAt(crossing: number, n: number, from: number, to: number): number {
    const { piece } = this;
    piece.step(n, from, to);
    this.measure(piece.next, piece.end);
    return this.rises[crossing]!;
  }

  /**
   * Carries out all events due at the start point, in the order of their declaration, until none
   * is left. `located` is a crossing that was found to lie here: it is due whatever its last digit.
   */
  private settle(located: number): void {
    const { memory } = this.context;
    const { rises } = this;
    const { start } = this.piece;
    let count = 0;
    for (let again = rises.length > 0; again; ) {
      again = false;
      for (let k = 0; k < rises.length; k++) {
        this.measure(memory.states, start);
        const due = (k === located && count === 0) || this.isPast(k, memory.states, start);
        if (due && memory.past[k] === 0) {
          memory.past[k] = 1;
          count += 1;
          if (count > mostAtOnce) this.refuseStorm(k, `${mostAtOnce} events fell on one instant`);
          this.formulas.change(k, start.u, start.t);
          this.refresh();
          this.measure(memory.states, start);
          this.rearm();
          again = true;
        }
      }
    }
    this.measure(memory.states, start);
    this.rearm();
  }

  private refuseStorm(crossing: number, much: string): never {
    const { expression } = this.context.program.crossings[crossing]!;
    throw new TailpairError(
      'event-storm',
      `more than ${much} at ${this.piece.start.t} s, the last when ${expression} rose through zero; make the change move the expression clearly below zero`,
    );
  }

  private measure(x: Float64Array, { u, t }: Point): void {
    this.formulas.crossings(x, u, t, this.rises);
  }

  /** Whether the expression just measured is past zero. */
  private isPast(crossing: number, x: Float64Array, { u, s, t }: Point): boolean {
    const value = this.rises[crossing]!;
    if (value !== 0) return value > 0;
    this.formulas.crossingSlopes(x, u, s, t, this.slopes);
    return this.slopes[crossing]! > 0;
  }

  /** Lets crossings whose expression has just been measured below zero rise again. */
  private rearm(): void {
    const { past } = this.context.memory;
    for (let k = 0; k < past.length; k++) if (this.rises[k]! < 0) past[k] = 0;
  }

  /** Recomputes what depends on held memory, and the whole-cell weights of the linear groups. */
  private refresh(): void {
    const { memory, program, clock } = this.context;
    this.formulas.refresh();
    program.groups.forEach((group, index) => {
      if (group.kind === 'linear')
        linearWeights(memory.rates[index]!, clock.period, memory.weights, weightsAt(index));
    });
  }
}
