import type { EquationNode } from './node.ts';
import { solveScalar } from './solve-scalar.ts';

/** Values of the leaves, by the leaf itself. */
export type Bindings = Map<EquationNode, number>;

/**
 * The reference interpreter: value of a vertex with the given leaves (yes/no as 1/0). Every
 * compiled back-end must agree with it to 1e-12.
 *
 * @param seen values already found in this pass, by vertex
 */
export function evaluate(node: EquationNode, bindings: Bindings, seen: Bindings = new Map()): number {
  const known = seen.get(node);
  if (known !== undefined) return known;
  const value = compute(node, bindings, seen);
  seen.set(node, value);
  return value;
}

function compute(node: EquationNode, bindings: Bindings, seen: Bindings): number {
  const arg = (index: number): number => evaluate(node.args[index]!, bindings, seen);
  switch (node.op) {
    case 'constant':
      return node.value;
    case 'leaf': {
      const value = bindings.get(node);
      if (value === undefined) throw new Error(`the leaf ${node.name} has no value`);
      return value;
    }
    case 'add':
      return arg(0) + arg(1);
    case 'sub':
      return arg(0) - arg(1);
    case 'mul':
      return arg(0) * arg(1);
    case 'div':
      return arg(0) / arg(1);
    case 'neg':
      return -arg(0);
    case 'abs':
      return Math.abs(arg(0));
    case 'min':
      return Math.min(arg(0), arg(1));
    case 'max':
      return Math.max(arg(0), arg(1));
    case 'floor':
      return Math.floor(arg(0));
    case 'sqrt':
      return Math.sqrt(arg(0));
    case 'exp':
      return Math.exp(arg(0));
    case 'exp2':
      return 2 ** arg(0);
    case 'log':
      return Math.log(arg(0));
    case 'sin':
      return Math.sin(arg(0));
    case 'cos':
      return Math.cos(arg(0));
    case 'tanh':
      return Math.tanh(arg(0));
    case 'select':
      return arg(0) !== 0 ? arg(1) : arg(2);
    case 'lt':
      return arg(0) < arg(1) ? 1 : 0;
    case 'le':
      return arg(0) <= arg(1) ? 1 : 0;
    case 'eq':
      return arg(0) === arg(1) ? 1 : 0;
    case 'and':
      return arg(0) !== 0 && arg(1) !== 0 ? 1 : 0;
    case 'or':
      return arg(0) !== 0 || arg(1) !== 0 ? 1 : 0;
    case 'not':
      return arg(0) !== 0 ? 0 : 1;
    case 'true':
      return 1;
    case 'false':
      return 0;
    case 'solve':
      return solve(node, bindings, seen);
  }
}

function solve(node: EquationNode, bindings: Bindings, seen: Bindings): number {
  const [unknown, guess, residual, slope, curvature] = node.args as [
    EquationNode,
    EquationNode,
    EquationNode,
    EquationNode,
    EquationNode,
  ];
  return solveScalar(evaluate(guess, bindings, seen), (x, out) => {
    const inner = new Map(bindings).set(unknown, x);
    const pass: Bindings = new Map();
    out[0] = evaluate(residual, inner, pass);
    out[1] = evaluate(slope, inner, pass);
    out[2] = evaluate(curvature, inner, pass);
  });
}
