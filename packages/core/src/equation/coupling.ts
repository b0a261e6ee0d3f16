import type { StateDeclaration } from './declare.ts';
import type { EquationNode } from './node.ts';

/** Whether a vertex uses a leaf. */
export function dependsOn(root: EquationNode, wanted: EquationNode): boolean {
  const seen = new Set<EquationNode>();
  const visit = (node: EquationNode): boolean => {
    if (node === wanted) return true;
    if (seen.has(node)) return false;
    seen.add(node);
    return node.args.some(visit);
  };
  return visit(root);
}

/**
 * The states in the order they can be integrated: each group holds the states that need each
 * other (the strongly connected parts of the graph "x uses y"), after all groups it uses.
 */
export function couplingGroups(states: readonly StateDeclaration[]): number[][] {
  const uses = states.map(({ slope }) => states.map(({ symbol }) => dependsOn(slope, symbol)));
  const reach = uses.map((row) => [...row]);
  states.forEach((_, via) =>
    reach.forEach((row) => {
      if (row[via]) row.forEach((known, to) => (row[to] = known || reach[via]![to]!));
    }),
  );
  const groups: number[][] = [];
  const placed = new Set<number>();
  while (placed.size < states.length) {
    const ready = states.findIndex(
      (_, i) =>
        !placed.has(i) && states.every((__, j) => !reach[i]![j] || placed.has(j) || reach[j]![i] || i === j),
    );
    const members = states.flatMap((_, j) =>
      j === ready || (reach[ready]![j] && reach[j]![ready]) ? [j] : [],
    );
    members.forEach((member) => placed.add(member));
    groups.push(members);
  }
  return groups;
}
