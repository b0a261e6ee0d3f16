import type { Expression } from './expression.ts';
import type { EquationNode } from './node.ts';
import { variabilityOf } from './variability.ts';

/**
 * The expressions whose sign decides between branches: of each comparison, minimum, maximum and
 * magnitude with a moving argument, the difference of its sides.
 */
export function findCorners(roots: readonly Expression[]): Expression[] {
  const variability = variabilityOf();
  const seen = new Set<EquationNode>();
  const corners = new Set<Expression>();
  const visit = (node: EquationNode): void => {
    if (seen.has(node) || variability(node) !== 'sample') return;
    seen.add(node);
    const [a, b] = node.args as readonly Expression[];
    if (node.op === 'abs') corners.add(a!);
    if (['lt', 'le', 'min', 'max'].includes(node.op)) corners.add(a!.sub(b!));
    // The start of a search bends nothing.
    const args = node.op === 'solve' ? [node.args[2]!] : node.args;
    args.forEach(visit);
  };
  roots.forEach(visit);
  return [...corners].filter((corner) => variability(corner) === 'sample' && !searched(corner));
}

/** Whether a vertex uses the unknown of an implicit equation: a branch of the search, not of the waveform. */
function searched(root: EquationNode): boolean {
  const seen = new Set<EquationNode>();
  const visit = (node: EquationNode): boolean => {
    if (seen.has(node)) return false;
    seen.add(node);
    return node.role === 'unknown' || (node.op !== 'solve' && node.args.some(visit));
  };
  return visit(root);
}
