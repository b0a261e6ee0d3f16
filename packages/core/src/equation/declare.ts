import { dimensions, formatDimension, overDimension, sameDimension } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import {
  asFactor,
  constant,
  Expression,
  isConstant,
  leaf,
  type Operand,
  operandIn,
  withUnit,
} from './expression.ts';
import { select } from './functions.ts';
import { withSharedNodes } from './node.ts';
import { variabilityOf } from './variability.ts';

/** Memory that follows a differential equation. */
export interface StateDeclaration {
  readonly symbol: Expression;
  /** Value at the start of a run; depends on parameters and surroundings only. */
  readonly initial: Expression;
  /** Right-hand side: the slope in time, in the unit of the state per second. */
  readonly slope: Expression;
}

/** Memory that keeps its value until an event changes it. */
export interface HeldDeclaration {
  readonly symbol: Expression;
  readonly initial: Expression;
}

/** What an event writes; every value is taken just before the event. */
export interface Assignment {
  readonly target: Expression;
  readonly value: Expression;
}

/** An event: its expression rises through zero. */
export interface CrossingDeclaration {
  readonly expression: Expression;
  readonly changes: readonly Assignment[];
}

/** All that a block's equations say. */
export interface Equations {
  readonly states: readonly StateDeclaration[];
  readonly helds: readonly HeldDeclaration[];
  readonly crossings: readonly CrossingDeclaration[];
  readonly outputs: Readonly<Record<string, Expression>>;
}

/** Limits that hold a state while its equation pushes it outward, as a supply rail does. */
export interface StateLimits {
  readonly min?: Operand;
  readonly max?: Operand;
}

interface Recording {
  readonly states: StateDeclaration[];
  readonly helds: HeldDeclaration[];
  readonly crossings: CrossingDeclaration[];
  readonly decide: (expression: Expression) => boolean;
  /** Answers already given, so that one question has one answer throughout. */
  readonly answers: Map<Expression, boolean>;
}

let recording: Recording | undefined;

function record(word: string): Recording {
  if (recording === undefined) {
    throw new TailpairError('declaration', `${word} may only be used inside a block's equations`);
  }
  return recording;
}

/**
 * Records what `write` declares and returns: the equations as data.
 *
 * @param write the author's function, already bound to its symbols
 * @param decide answers `isZero` for an expression of parameters
 */
export function recordEquations(
  write: () => Readonly<Record<string, Expression>>,
  decide: (expression: Expression) => boolean,
): Equations {
  return withSharedNodes(() => {
    const outer = recording;
    const inner: Recording = { states: [], helds: [], crossings: [], decide, answers: new Map() };
    recording = inner;
    try {
      const outputs = write();
      return { states: inner.states, helds: inner.helds, crossings: inner.crossings, outputs };
    } finally {
      recording = outer;
    }
  });
}

/**
 * Memory: a quantity whose slope in time is given by the right-hand side of its differential
 * equation. The engine chooses how to integrate it.
 *
 * @param initial value at the start of a run
 * @param slope right-hand side, given the state itself, in its unit per second
 * @param limits values that hold the state while it is pushed outward
 */
export function state(
  initial: Operand,
  slope: (value: Expression) => Expression,
  limits: StateLimits = {},
): Expression {
  return states({ x: initial }, ({ x }) => ({ x: slope(x) }), { x: limits }).x;
}

/** Several coupled states: every slope may use all of them. */
export function states<K extends string>(
  initials: Readonly<Record<K, Operand>>,
  slopes: (values: Readonly<Record<K, Expression>>) => Readonly<Record<K, Expression>>,
  limits?: Readonly<Partial<Record<K, StateLimits>>>,
): Readonly<Record<K, Expression>> {
  const into = record('state');
  const names = Object.keys(initials) as K[];
  const starts = names.map((name) => asFactor(initials[name]));
  const symbols = names.map((name, index) =>
    leaf('state', name === 'x' ? `x${into.states.length + 1}` : name, starts[index]!.dimension),
  );
  const values = Object.fromEntries(names.map((name, index) => [name, symbols[index]!])) as Record<
    K,
    Expression
  >;
  const rightHandSides = slopes(values);
  names.forEach((name, index) => {
    const symbol = symbols[index]!;
    const slope = rightHandSides[name];
    const wanted = overDimension(symbol.dimension, dimensions.time);
    if (!sameDimension(slope.dimension, wanted)) {
      throw new TailpairError(
        'dimension',
        `the slope ${slope} of a state in ${formatDimension(symbol.dimension)} is in ${formatDimension(slope.dimension)}; it must be in ${formatDimension(wanted)}`,
      );
    }
    const limited = withLimits(symbol, slope, limits?.[name] ?? {});
    into.states.push({ symbol, initial: starts[index]!, slope: limited });
  });
  return values;
}

/**
 * A limited state is three regimes kept in a held number: free (0), at the upper limit (1), at the
 * lower limit (−1). Reaching a limit and being pulled off it are events like any other, so they
 * are located between samples.
 */
function withLimits(symbol: Expression, slope: Expression, { min, max }: StateLimits): Expression {
  if (min === undefined && max === undefined) return slope;
  const regime = held(0);
  const free = regime.eq(0);
  const still = constant(0, slope.dimension);
  const never = constant(-1, symbol.dimension);
  const asleep = constant(-1, slope.dimension);
  if (max !== undefined) {
    const top = operandIn(symbol.dimension, max);
    onCrossing(select(free, symbol.sub(max), never), () => [set(regime, 1), set(symbol, top)]);
    onCrossing(select(regime.eq(1), slope.neg(), asleep), () => [set(regime, 0)]);
  }
  if (min !== undefined) {
    const bottom = operandIn(symbol.dimension, min);
    onCrossing(select(free, bottom.sub(symbol), never), () => [set(regime, -1), set(symbol, bottom)]);
    onCrossing(select(regime.eq(-1), slope, asleep), () => [set(regime, 0)]);
  }
  return select(free, slope, still);
}

/** Memory that changes at events only: a stage, a level that was sampled, a count. */
export function held(initial: Operand): Expression {
  const into = record('held');
  const start = asFactor(initial);
  const symbol = leaf('held', `k${into.helds.length + 1}`, start.dimension);
  into.helds.push({ symbol, initial: start });
  return symbol;
}

/**
 * An event: whenever `expression` rises through zero, `change` is carried out. The instant is
 * located between samples. An expression that is already positive at the start of a run, or that
 * another event lifts over zero, counts as having risen; events at one instant are carried out in
 * the order of their declaration.
 *
 * @param expression of any dimension
 * @param change what is written, as a list of {@link set}
 */
export function onCrossing(expression: Expression, change: () => readonly Assignment[]): void {
  const into = record('onCrossing');
  if (!(expression instanceof Expression)) {
    throw new TailpairError(
      'declaration',
      "onCrossing takes a quantity that rises through zero, such as v.sub('1 V'), not a condition",
    );
  }
  const changes = change();
  if (!Array.isArray(changes)) {
    throw new TailpairError(
      'declaration',
      `onCrossing at ${expression}: the change must return a list, such as () => [set(stage, 1)]`,
    );
  }
  into.crossings.push({ expression, changes });
}

/** Writes a state or a held quantity in an event. */
export function set(target: Expression, value: Operand): Assignment {
  if (target.role !== 'state' && target.role !== 'held') {
    throw new TailpairError(
      'declaration',
      `set: ${target} is no memory; only a state or a held quantity can be written`,
    );
  }
  const written = operandIn(target.dimension, value);
  if (!sameDimension(target.dimension, written.dimension)) {
    throw new TailpairError('dimension', `set: ${withUnit(target)}, ${withUnit(written)}`);
  }
  return { target, value: written };
}

/**
 * Whether an expression of parameters is zero in the patch at hand: decided at set-up, so that
 * the equations may take another form (no capacitor, no memory). An input that is not wired is
 * zero; anything that moves is not.
 */
export function isZero(expression: Expression): boolean {
  if (isConstant(expression)) return expression.value === 0;
  if (variabilityOf()(expression) !== 'set-up') return false;
  const { answers, decide } = record('isZero');
  const answer = answers.get(expression) ?? decide(expression);
  answers.set(expression, answer);
  return answer;
}
