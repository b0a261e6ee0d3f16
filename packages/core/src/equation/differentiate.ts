import { type Dimension, overDimension } from '../quantity/dimension.ts';
import type { Condition } from './condition.ts';
import { constant, type Expression } from './expression.ts';
import { cos, select, sin } from './functions.ts';
import { substitute } from './substitute.ts';

/**
 * Exact derivative of an expression by the chain rule on its graph.
 *
 * @param root what is differentiated
 * @param seeds derivative of each leaf that moves; every other leaf stands still
 * @param per dimension of what is differentiated against (a second for slopes in time)
 * @returns an expression of dimension `root / per`
 */
export function tangent(
  root: Expression,
  seeds: ReadonlyMap<Expression, Expression>,
  per: Dimension,
): Expression {
  const known = new Map<Expression, Expression>();
  const zero = (of: Expression): Expression => constant(0, overDimension(of.dimension, per));
  const slopeOf = (node: Expression): Expression => {
    let slope = known.get(node);
    if (slope === undefined) {
      slope = derive(node, slopeOf, zero, seeds);
      known.set(node, slope);
    }
    return slope;
  };
  return slopeOf(root);
}

function derive(
  node: Expression,
  slopeOf: (arg: Expression) => Expression,
  zero: (of: Expression) => Expression,
  seeds: ReadonlyMap<Expression, Expression>,
): Expression {
  const [a, b] = node.args as readonly Expression[] as [Expression, Expression];
  switch (node.op) {
    case 'leaf':
      return seeds.get(node) ?? zero(node);
    case 'constant':
    case 'floor':
      return zero(node);
    case 'add':
      return slopeOf(a).add(slopeOf(b));
    case 'sub':
      return slopeOf(a).sub(slopeOf(b));
    case 'neg':
      return slopeOf(a).neg();
    case 'mul':
      return slopeOf(a)
        .mul(b)
        .add(a.mul(slopeOf(b)));
    case 'div':
      return slopeOf(a)
        .sub(node.mul(slopeOf(b)))
        .div(b);
    case 'abs':
      return select(a.lt(constant(0, a.dimension)), slopeOf(a).neg(), slopeOf(a));
    case 'min':
      return select(a.lt(b), slopeOf(a), slopeOf(b));
    case 'max':
      return select(b.lt(a), slopeOf(a), slopeOf(b));
    case 'sqrt':
      return slopeOf(a).div(node.mul(2));
    case 'exp':
      return node.mul(slopeOf(a));
    case 'exp2':
      return node.mul(Math.LN2).mul(slopeOf(a));
    case 'log':
      return slopeOf(a).div(a);
    case 'sin':
      return cos(a).mul(slopeOf(a));
    case 'cos':
      return sin(a).neg().mul(slopeOf(a));
    case 'tanh':
      return constant(1).sub(node.mul(node)).mul(slopeOf(a));
    case 'select': {
      const [condition, yes, no] = node.args as readonly unknown[] as [Condition, Expression, Expression];
      return select(condition, slopeOf(yes), slopeOf(no));
    }
    case 'solve':
      return implicit(node, slopeOf);
  }
}

/** Implicit function theorem: where r(x, p) = 0 holds throughout, dx = −(∂r/∂p)/(∂r/∂x)·dp. */
function implicit(node: Expression, slopeOf: (arg: Expression) => Expression): Expression {
  const [unknown, , residual, slope] = node.args as readonly Expression[] as [
    Expression,
    Expression,
    Expression,
    Expression,
  ];
  const solution = new Map([[unknown, node]]);
  return substitute(slopeOf(residual), solution).div(substitute(slope, solution)).neg();
}
