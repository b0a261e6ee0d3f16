import {
  dimensions,
  formatDimension,
  isRatio,
  powerDimension,
  sameDimension,
} from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { Condition } from './condition.ts';
import { asFactor, Expression, type Operand, operation, withUnit } from './expression.ts';
import { internNode, type NumericOp } from './node.ts';

function ofRatio(op: NumericOp, operand: Operand, fold: (value: number) => number): Expression {
  const argument = asFactor(operand);
  if (!isRatio(argument.dimension)) {
    throw new TailpairError(
      'dimension',
      `${op}(${argument}): the argument is in ${formatDimension(argument.dimension)}; it must be a bare number, so divide by a quantity of that unit`,
    );
  }
  return operation(op, [argument], dimensions.ratio, fold);
}

/** Hyperbolic tangent of a bare number. */
export const tanh = (x: Operand): Expression => ofRatio('tanh', x, Math.tanh);

/** Exponential of a bare number. */
export const exp = (x: Operand): Expression => ofRatio('exp', x, Math.exp);

/** Two to the power of a bare number. */
export const exp2 = (x: Operand): Expression => ofRatio('exp2', x, (value) => 2 ** value);

/** Natural logarithm of a bare number. */
export const log = (x: Operand): Expression => ofRatio('log', x, Math.log);

/** Sine of an angle in radians. */
export const sin = (x: Operand): Expression => ofRatio('sin', x, Math.sin);

/** Cosine of an angle in radians. */
export const cos = (x: Operand): Expression => ofRatio('cos', x, Math.cos);

/** Largest whole number not above a bare number. */
export const floor = (x: Operand): Expression => ofRatio('floor', x, Math.floor);

/** Square root; the dimension is halved with it. */
export function sqrt(x: Operand): Expression {
  const argument = asFactor(x);
  return operation('sqrt', [argument], powerDimension(argument.dimension, 0.5), Math.sqrt);
}

/** `whenTrue` where the condition holds, else `whenFalse`; both of one dimension. */
export function select(condition: Condition, whenTrue: Operand, whenFalse: Operand): Expression {
  if (!(condition instanceof Condition)) {
    throw new TailpairError(
      'declaration',
      `select: ${String(condition)} is no condition; compare two quantities, such as v.gt('0 V')`,
    );
  }
  const [yes, no] = alike(whenTrue, whenFalse);
  if (condition.op === 'true') return yes;
  if (condition.op === 'false' || yes === no) return no;
  const key = `select ${condition.id} ${yes.id} ${no.id}`;
  return internNode(key, () => new Expression('select', [condition, yes, no], yes.dimension));
}

function alike(whenTrue: Operand, whenFalse: Operand): [Expression, Expression] {
  const yes = asFactor(whenTrue);
  const no = asFactor(whenFalse);
  if (!sameDimension(yes.dimension, no.dimension)) {
    throw new TailpairError(
      'dimension',
      `select: ${withUnit(yes)}, ${withUnit(no)}; both choices must have one dimension`,
    );
  }
  return [yes, no];
}
