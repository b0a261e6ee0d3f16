import {
  type Dimension,
  dimensions,
  formatDimension,
  isRatio,
  overDimension,
  sameDimension,
  timesDimension,
} from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';
import { readQuantity } from '../quantity/read-quantity.ts';
import { Condition } from './condition.ts';
import { type EquationNode, internNode, type LeafRole, type NumericOp, nextNodeId } from './node.ts';
import { printExpression } from './print.ts';

/**
 * What an equation accepts beside another expression: a bare number (a ratio) or a text with its
 * unit, such as `'10 mV'`.
 */
export type Operand = Expression | number | string;

/**
 * A quantity in a block's equations: a vertex of the graph, with its dimension. Expressions are
 * built by the chained operations below and by the functions of the equation language; every step
 * checks dimensions and throws a `TailpairError` of code `dimension` that prints the expression.
 */
export class Expression implements EquationNode {
  readonly id: number = nextNodeId();
  readonly op: NumericOp;
  readonly args: readonly EquationNode[];
  readonly dimension: Dimension;
  readonly value: number;
  readonly name: string;
  readonly role: LeafRole | undefined;

  /** Use {@link constant} and the operations instead. */
  constructor(
    op: NumericOp,
    args: readonly EquationNode[],
    dimension: Dimension,
    own: { value?: number; name?: string; role?: LeafRole } = {},
  ) {
    this.op = op;
    this.args = args;
    this.dimension = dimension;
    this.value = own.value ?? Number.NaN;
    this.name = own.name ?? '';
    this.role = own.role;
  }

  /** Sum; both sides of one dimension. */
  add(other: Operand): Expression {
    const right = this.alike(other, 'add');
    if (isConstant(right, 0)) return this;
    if (isConstant(this, 0)) return right;
    return operation('add', [this, right], this.dimension, (a, b) => a + b);
  }

  /** Difference; both sides of one dimension. */
  sub(other: Operand): Expression {
    const right = this.alike(other, 'sub');
    if (isConstant(right, 0)) return this;
    if (isConstant(this, 0)) return right.neg();
    return operation('sub', [this, right], this.dimension, (a, b) => a - b);
  }

  /** Product. */
  mul(other: Operand): Expression {
    const right = asFactor(other);
    const product = timesDimension(this.dimension, right.dimension);
    if (isConstant(this, 0) || isConstant(right, 0)) return constant(0, product);
    if (isConstant(right, 1) && isRatio(right.dimension)) return this;
    if (isConstant(this, 1) && isRatio(this.dimension)) return right;
    return operation('mul', [this, right], product, (a, b) => a * b);
  }

  /** Quotient. */
  div(other: Operand): Expression {
    const right = asFactor(other);
    const quotient = overDimension(this.dimension, right.dimension);
    if (isConstant(this, 0)) return constant(0, quotient);
    if (isConstant(right, 1) && isRatio(right.dimension)) return this;
    return operation('div', [this, right], quotient, (a, b) => a / b);
  }

  /** Negative. */
  neg(): Expression {
    if (this.op === 'neg') return this.args[0] as Expression;
    return operation('neg', [this], this.dimension, (a) => -a);
  }

  /** Magnitude. */
  abs(): Expression {
    return operation('abs', [this], this.dimension, Math.abs);
  }

  /** The smaller of two quantities of one dimension. */
  min(other: Operand): Expression {
    return operation('min', [this, this.alike(other, 'min')], this.dimension, Math.min);
  }

  /** The larger of two quantities of one dimension. */
  max(other: Operand): Expression {
    return operation('max', [this, this.alike(other, 'max')], this.dimension, Math.max);
  }

  /** The quantity held between two limits of its dimension. */
  clamp(low: Operand, high: Operand): Expression {
    return this.max(low).min(high);
  }

  /** Whether this is below `other`. */
  lt(other: Operand): Condition {
    return Condition.compare('lt', this, this.alike(other, 'lt'), (a, b) => a < b);
  }

  /** Whether this is at or below `other`. */
  le(other: Operand): Condition {
    return Condition.compare('le', this, this.alike(other, 'le'), (a, b) => a <= b);
  }

  /** Whether this is above `other`. */
  gt(other: Operand): Condition {
    return this.alike(other, 'gt').lt(this);
  }

  /** Whether this is at or above `other`. */
  ge(other: Operand): Condition {
    return this.alike(other, 'ge').le(this);
  }

  /** Whether this equals `other` exactly: for whole numbers such as the stage of a sequence. */
  eq(other: Operand): Condition {
    return Condition.compare('eq', this, this.alike(other, 'eq'), (a, b) => a === b);
  }

  /** The expression in print, e.g. `bias * tanh((plus - minus) / (2 * thermalVoltage))`. */
  toString(): string {
    return printExpression(this);
  }

  /**
   * Text where text is asked for. A number is refused: `v * 2` or `v > 0` in place of `v.mul(2)` or
   * `v.gt('0 V')` would silently make nonsense, as a quantity has no value until it runs.
   *
   * @throws TailpairError `declaration`
   */
  [Symbol.toPrimitive](hint: string): string {
    if (hint === 'string') return this.toString();
    throw new TailpairError(
      'declaration',
      `${this} has no value while equations are written; use its operations: add, sub, mul, div, lt, gt`,
    );
  }

  private alike(other: Operand, op: string): Expression {
    const right = operandIn(this.dimension, other);
    if (!sameDimension(this.dimension, right.dimension)) {
      throw new TailpairError(
        'dimension',
        `${op}: ${withUnit(this)}, ${withUnit(right)}; both sides must have one dimension`,
      );
    }
    return right;
  }
}

/** An expression and what it is in, for messages. */
export function withUnit(expression: Expression): string {
  const unit = isRatio(expression.dimension)
    ? 'a bare number'
    : `in ${formatDimension(expression.dimension)}`;
  return `${expression} is ${unit}`;
}

/** A fixed quantity, in SI base units. */
export function constant(value: number, dimension: Dimension = dimensions.ratio): Expression {
  const sign = Object.is(value, -0) ? '-0' : String(value);
  return internNode(
    `constant ${sign} ${formatDimension(dimension)}`,
    () => new Expression('constant', [], dimension, { value }),
  );
}

/** A leaf: something that gets its value from outside the equation. Every call makes a new one. */
export function leaf(role: LeafRole, name: string, dimension: Dimension): Expression {
  return new Expression('leaf', [], dimension, { role, name });
}

/** Whether the vertex is a constant, and if `value` is given, that one. */
export function isConstant(node: EquationNode, value?: number): boolean {
  return node.op === 'constant' && (value === undefined || node.value === value);
}

/** A vertex of operation `op`; folded at once where every argument is constant. */
export function operation(
  op: NumericOp,
  args: readonly Expression[],
  dimension: Dimension,
  fold: (...values: number[]) => number,
): Expression {
  if (args.every((arg) => isConstant(arg))) return constant(fold(...args.map((arg) => arg.value)), dimension);
  const key = `${op} ${args.map((arg) => arg.id).join(' ')}`;
  return internNode(key, () => new Expression(op, args, dimension));
}

/** An operand as an expression; a text is read with whatever unit it carries. */
export function asFactor(operand: Operand): Expression {
  if (operand instanceof Expression) return operand;
  if (typeof operand === 'number') return constant(operand);
  const { value, dimension } = readQuantity(operand);
  return constant(value, dimension);
}

/** An operand where `dimension` is wanted: a text is read in that unit, anything else taken as it is. */
export function operandIn(dimension: Dimension, operand: Operand): Expression {
  return typeof operand === 'string'
    ? constant(parseQuantity(operand, dimension), dimension)
    : asFactor(operand);
}
