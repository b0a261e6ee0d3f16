import { dimensions, sameDimension } from '../quantity/dimension.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import type { EquationNode } from './node.ts';

/** How tightly an operator binds; a looser argument of a tighter operator gets parentheses. */
const binding: Readonly<Record<string, number>> = {
  or: 1,
  and: 2,
  lt: 3,
  le: 3,
  eq: 3,
  add: 4,
  sub: 4,
  mul: 5,
  div: 5,
  neg: 6,
  not: 6,
};

const signs: Readonly<Record<string, string>> = {
  or: 'or',
  and: 'and',
  lt: '<',
  le: '≤',
  eq: '=',
  add: '+',
  sub: '−',
  mul: '·',
  div: '/',
};

/** The equation as a reader would write it; the documentation prints what the engine compiles. */
export function printExpression(node: EquationNode): string {
  switch (node.op) {
    case 'constant':
      return printConstant(node);
    case 'leaf':
      return node.name;
    case 'true':
    case 'false':
      return node.op;
    case 'neg':
      return `−${within(node.args[0]!, 6)}`;
    case 'not':
      return `not ${within(node.args[0]!, 6)}`;
    case 'select':
      return `(${printExpression(node.args[1]!)} if ${printExpression(node.args[0]!)} else ${printExpression(node.args[2]!)})`;
    case 'solve':
      return `(${printExpression(node.args[0]!)} where ${printExpression(node.args[2]!)} = 0)`;
    default: {
      const level = binding[node.op];
      if (level === undefined) return `${node.op}(${node.args.map(printExpression).join(', ')})`;
      const [left, right] = node.args;
      const tighter = node.op === 'sub' || node.op === 'div' ? level + 0.5 : level;
      return `${within(left!, level)} ${signs[node.op]} ${within(right!, tighter)}`;
    }
  }
}

function within(node: EquationNode, level: number): string {
  const own = binding[node.op] ?? 9;
  const text = printExpression(node);
  return own < level ? `(${text})` : text;
}

function printConstant(node: EquationNode): string {
  const { value, dimension } = node;
  if (dimension === undefined || sameDimension(dimension, dimensions.ratio))
    return String(Number(value.toPrecision(6)));
  if (sameDimension(dimension, dimensions.temperature)) return `${value} K`;
  return formatQuantity(value, dimension);
}
