import type { EquationNode } from './node.ts';

/**
 * How often a value can change: `set-up` (parameters and surroundings), `event` (held memory as
 * well), `sample` (anything that moves).
 */
export type Variability = 'set-up' | 'event' | 'sample';

const order: readonly Variability[] = ['set-up', 'event', 'sample'];

/**
 * A function that tells the variability of vertices and remembers its answers.
 *
 * @param bound unknowns of enclosing implicit equations: they are searched for inside, so they
 *   don't make the whole equation vary; any other unknown varies with every step of a search
 */
export function variabilityOf(bound: readonly EquationNode[] = []): (node: EquationNode) => Variability {
  const known = new Map<EquationNode, Variability>();
  const visit = (node: EquationNode): Variability => {
    let answer = known.get(node);
    if (answer === undefined) {
      answer = find(node);
      known.set(node, answer);
    }
    return answer;
  };
  const find = (node: EquationNode): Variability => {
    if (node.op === 'leaf') return ofLeaf(node, bound);
    const visitArgs = node.op === 'solve' ? variabilityOf([...bound, node.args[0]!]) : visit;
    return node.args.map(visitArgs).reduce(slower, 'set-up');
  };
  return visit;
}

function ofLeaf(node: EquationNode, bound: readonly EquationNode[]): Variability {
  switch (node.role) {
    case 'parameter':
    case 'surrounding':
      return 'set-up';
    case 'held':
      return 'event';
    case 'unknown':
      return bound.includes(node) ? 'set-up' : 'sample';
    default:
      return 'sample';
  }
}

function slower(a: Variability, b: Variability): Variability {
  return order.indexOf(a) > order.indexOf(b) ? a : b;
}
