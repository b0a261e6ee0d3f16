import { TailpairError } from '../../quantity/error.ts';
import { CellInputs } from './cell-inputs.ts';
import { sameInstant } from './edge-list.ts';
import { JetEmitter } from './jet-emitter.ts';
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
  private readonly inputs: CellInputs;
  private readonly piece: PieceStepper;
  private readonly jets: JetEmitter;
  /** Expressions of all crossings at the point last measured. */
  private readonly rises: Float64Array;
  private readonly slopes: Float64Array;

  constructor(context: KernelContext, formulas: Formulas) {
    const { ports, program } = context;
    const crossings = program.crossings.length;
    this.context = context;
    this.formulas = formulas;
    this.inputs = new CellInputs(
      { values: ports.inputs, slopes: ports.inputSlopes, edges: ports.inputEdges },
      context.clock,
    );
    this.piece = new PieceStepper(context, formulas, this.inputs);
    this.jets = new JetEmitter(context, this.inputs);
    this.rises = new Float64Array(crossings);
    this.slopes = new Float64Array(crossings);
  }

  /** Puts the memory at sample `n`: cached values, drives, and the events that are due at once. */
  settleAt(n: number): void {
    this.sample(n);
    this.context.memory.past.fill(0);
    this.refresh();
    this.settle(-1);
    this.piece.drive();
  }

  /** A new chunk begins, with new edges at the inputs. */
  rewind(): void {
    this.inputs.rewind();
  }

  /** Steps the memory over the cell that ends at sample `n`, and writes the edges it makes. */
  step(n: number): void {
    const { piece, inputs } = this;
    this.sample(n - 1);
    inputs.enter(n);
    let events = 0;
    let nextBreak = 0;
    for (let from = 0; from < 1; ) {
      const limit = inputs.breaks[nextBreak] ?? 1;
      let to = piece.integrate(from, limit);
      const event = this.firstEvent(from, to);
      if (event !== undefined) to = event.at;
      piece.commit();
      const broken = nextBreak < inputs.breaks.length && to >= limit - sameInstant;
      if (broken) nextBreak += 1;
      if (event !== undefined || broken) {
        events += 1;
        if (events > mostInCell)
          this.refuseStorm(event?.crossing ?? 0, `${mostInCell} events fell between two samples`);
        this.split(n, broken ? limit : to, event?.crossing ?? -1);
        if (broken) to = limit;
      }
      from = to;
    }
  }

  /** Crosses an instant at which something jumps: the memory stands just before it, and is put just after. */
  private split(n: number, at: number, crossing: number): void {
    const { piece, jets, inputs } = this;
    const { carry } = this.context;
    if (carry) {
      jets.noteBefore(at, piece.start.t);
      inputs.read(at, 1, piece.start);
    }
    this.settle(crossing);
    piece.drive();
    if (carry) jets.emit(n, at, piece.start.t);
  }

  private sample(n: number): void {
    readSample(this.context, n, this.piece.start);
  }

  /** The first event between `from` and `to`; the piece is stepped anew to its instant. */
  private firstEvent(from: number, to: number): { crossing: number; at: number } | undefined {
    const { past } = this.context.memory;
    const { rises, piece } = this;
    if (rises.length === 0) return undefined;
    let event: { crossing: number; at: number } | undefined;
    this.measure(piece.next, piece.end);
    for (let k = 0; k < rises.length; k++) {
      const isPast = this.isPast(k, piece.next, piece.end);
      if (!this.isCorner(k) ? past[k] !== 0 || !isPast : isPast === (past[k] !== 0)) continue;
      // A corner that is passed downward is a rise of its negative.
      const sign = isPast ? 1 : -1;
      const high = sign * rises[k]!;
      this.measure(this.context.memory.states, piece.start);
      const low = sign * rises[k]!;
      const at = locate(from, low, event?.at ?? to, high, (share) => sign * this.riseAt(k, from, share));
      this.riseAt(k, from, at);
      event = { crossing: k, at };
    }
    if (event === undefined) this.rearm();
    return event;
  }

  private isCorner(crossing: number): boolean {
    return this.context.program.crossings[crossing]!.corner;
  }

  private riseAt(crossing: number, from: number, to: number): number {
    const { piece } = this;
    piece.step(from, to);
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
    if (located >= 0 && this.isCorner(located)) memory.past[located] = 1 - memory.past[located]!;
    let count = 0;
    for (let again = rises.length > 0; again; ) {
      again = false;
      for (let k = 0; k < rises.length; k++) {
        if (this.isCorner(k)) continue;
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
    this.turnCorners(located);
  }

  /** Notes on which side of each corner the start point lies; one located here has just been passed. */
  private turnCorners(located: number): void {
    const { memory } = this.context;
    this.measure(memory.states, this.piece.start);
    for (let k = 0; k < this.rises.length; k++) {
      if (!this.isCorner(k) || k === located) continue;
      memory.past[k] = this.isPast(k, memory.states, this.piece.start) ? 1 : 0;
    }
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
    for (let k = 0; k < past.length; k++) if (this.rises[k]! < 0 && !this.isCorner(k)) past[k] = 0;
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
