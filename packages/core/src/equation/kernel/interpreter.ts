import { type Bindings, evaluate } from '../evaluate.ts';
import type { Expression } from '../expression.ts';
import type { Slot } from '../program.ts';
import type { BackEnd, Formulas, KernelContext } from './kernel.ts';

/**
 * The reference back-end: walks the expressions of the program for every sample. Slow; it is what
 * the generated kernels are held to.
 */
export const interpreter: BackEnd = {
  formulas: (context) => new InterpretedFormulas(context),
  loop:
    ({ program }, formulas, cell) =>
    (from, to) => {
      const moves = program.states.length > 0 || program.crossings.length > 0;
      for (let n = from; n < to; n++) {
        if (moves) cell(n);
        formulas.emit(n);
      }
    },
};

class InterpretedFormulas implements Formulas {
  private readonly context: KernelContext;

  constructor(context: KernelContext) {
    this.context = context;
  }

  refresh(): void {
    const { program, memory } = this.context;
    const bindings = this.settled();
    program.cached.forEach(({ symbol, from }, i) => {
      memory.cached[i] = evaluate(from, bindings);
      bindings.set(symbol, memory.cached[i]!);
    });
    program.groups.forEach((group, i) => {
      if (group.kind === 'linear') memory.rates[i] = evaluate(group.rate, bindings);
    });
  }

  drive(
    group: number,
    x: Float64Array,
    u: Float64Array,
    s: Float64Array,
    t: number,
    out: Float64Array,
  ): void {
    const own = this.context.program.groups[group]!;
    if (own.kind !== 'linear') return;
    const bindings = this.moving(x, u, s, t);
    out[2 * group] = evaluate(own.drive, bindings);
    out[2 * group + 1] = evaluate(own.driveSlope, bindings);
  }

  field(
    group: number,
    x: Float64Array,
    u: Float64Array,
    t: number,
    f: Float64Array,
    jacobian: Float64Array,
  ): void {
    const own = this.context.program.groups[group]!;
    if (own.kind !== 'implicit') return;
    const bindings = this.moving(x, u, undefined, t);
    write(own.field, bindings, f);
    write(own.jacobian, bindings, jacobian);
  }

  stateSlopes(x: Float64Array, u: Float64Array, t: number, out: Float64Array): void {
    write(this.context.program.stateSlopes, this.moving(x, u, undefined, t), out);
  }

  crossings(x: Float64Array, u: Float64Array, t: number, out: Float64Array): void {
    const expressions = this.context.program.crossings.map(({ expression }) => expression);
    write(expressions, this.moving(x, u, undefined, t), out);
  }

  crossingSlopes(x: Float64Array, u: Float64Array, s: Float64Array, t: number, out: Float64Array): void {
    const slopes = this.context.program.crossings.map(({ slope }) => slope);
    write(slopes, this.moving(x, u, s, t), out);
  }

  change(crossing: number, u: Float64Array, t: number): void {
    const { program, memory } = this.context;
    const { changes } = program.crossings[crossing]!;
    const bindings = this.moving(memory.states, u, undefined, t);
    const values = changes.map(({ value }) => evaluate(value, bindings));
    changes.forEach(({ kind, memory: index }, i) => {
      (kind === 'state' ? memory.states : memory.held)[index] = values[i]!;
    });
  }

  emit(n: number): void {
    const { program, memory, ports, clock } = this.context;
    const u = ports.inputs.map((buffer) => buffer[n]!);
    const s = ports.inputSlopes.map((buffer) => buffer[n] ?? 0);
    const bindings = this.moving(memory.states, u, s, (clock.base + n) / clock.rate);
    program.outputs.forEach(({ value, slope }, i) => {
      ports.outputs[i]![n] = evaluate(value, bindings);
      if (slope !== undefined) ports.outputSlopes[i]![n] = evaluate(slope, bindings);
    });
  }

  /** Leaves that change at events at most. */
  private settled(): Bindings {
    const { program, memory } = this.context;
    const bindings: Bindings = new Map();
    bind(bindings, program.fixed, memory.fixed);
    bind(bindings, program.helds, memory.held);
    bind(bindings, program.cached, memory.cached);
    return bindings;
  }

  private moving(
    x: Float64Array,
    u: ArrayLike<number>,
    s: ArrayLike<number> | undefined,
    t: number,
  ): Bindings {
    const { program } = this.context;
    const bindings = this.settled();
    bindings.set(program.time, t);
    bind(bindings, program.states, x);
    program.inputs.forEach((input, i) => bindings.set(input, u[i]!));
    if (s !== undefined) program.inputSlopes.forEach((slope, i) => bindings.set(slope, s[i]!));
    return bindings;
  }
}

function bind(bindings: Bindings, slots: readonly Slot[], values: ArrayLike<number>): void {
  slots.forEach(({ symbol }, i) => bindings.set(symbol, values[i]!));
}

function write(expressions: readonly Expression[], bindings: Bindings, out: Float64Array): void {
  const seen: Bindings = new Map();
  expressions.forEach((expression, i) => {
    out[i] = evaluate(expression, bindings, seen);
  });
}
