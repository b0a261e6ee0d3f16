import type { Condition } from './condition.ts';
import { constant, Expression } from './expression.ts';
import { cos, exp, exp2, floor, log, select, sin, sqrt, tanh } from './functions.ts';
import { type EquationNode, internNode } from './node.ts';

/**
 * The expression with some of its leaves replaced, folded anew where that makes terms constant.
 * The unknown of an implicit equation is its own: inside that equation it stays.
 */
export function substitute<T extends EquationNode>(
  root: T,
  replacements: ReadonlyMap<Expression, Expression>,
): T {
  const known = new Map<EquationNode, EquationNode>(replacements);
  const visit = (node: EquationNode): EquationNode => {
    let image = known.get(node);
    if (image === undefined) {
      const own = node.op === 'solve' ? (node.args[0] as Expression) : undefined;
      const args =
        own !== undefined && replacements.has(own)
          ? node.args.map((arg) => substitute(arg, without(replacements, own)))
          : node.args.map(visit);
      image = args.every((arg, index) => arg === node.args[index]) ? node : rebuild(node, args);
      known.set(node, image);
    }
    return image;
  };
  return visit(root) as T;
}

function without(
  replacements: ReadonlyMap<Expression, Expression>,
  leaf: Expression,
): ReadonlyMap<Expression, Expression> {
  return new Map([...replacements].filter(([key]) => key !== leaf));
}

function rebuild(node: EquationNode, args: readonly EquationNode[]): EquationNode {
  const [a, b, c] = args as readonly Expression[] as [Expression, Expression, Expression];
  const [p, q] = args as readonly Condition[] as [Condition, Condition];
  switch (node.op) {
    case 'constant':
    case 'leaf':
    case 'true':
    case 'false':
      return node;
    case 'add':
    case 'sub':
    case 'mul':
    case 'div':
    case 'min':
    case 'max':
    case 'lt':
    case 'le':
    case 'eq':
      return a[node.op](b);
    case 'neg':
    case 'abs':
      return a[node.op]();
    case 'floor':
      return floor(a);
    case 'sqrt':
      return sqrt(a);
    case 'exp':
      return exp(a);
    case 'exp2':
      return exp2(a);
    case 'log':
      return log(a);
    case 'sin':
      return sin(a);
    case 'cos':
      return cos(a);
    case 'tanh':
      return tanh(a);
    case 'and':
    case 'or':
      return p[node.op](q);
    case 'not':
      return p.not();
    case 'select':
      return select(p, b, c);
    case 'solve':
      return internNode(
        `solve ${args.map((arg) => arg.id).join(' ')}`,
        () => new Expression('solve', args, node.dimension ?? constant(0).dimension),
      );
  }
}
