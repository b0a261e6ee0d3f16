import { constant, Expression, leaf } from './expression.ts';
import type { EquationNode } from './node.ts';
import type { Slot } from './program.ts';
import { substitute } from './substitute.ts';
import { type Variability, variabilityOf } from './variability.ts';

/** Collects the values that need computing once only. */
export interface Hoister {
  /** The expression with its set-up and event terms replaced by slots. */
  hoist<T extends EquationNode>(root: T): T;
  readonly fixed: readonly Slot[];
  readonly cached: readonly Slot[];
}

/** A quotient by something that seldom changes is a product with its reciprocal, which is hoisted. */
function withReciprocals(root: EquationNode, variability: (node: EquationNode) => Variability): EquationNode {
  return replaceLargest(root, (node) => {
    const [a, b] = node.args as readonly Expression[];
    if (node.op !== 'div' || variability(node) !== 'sample' || variability(b!) === 'sample') return undefined;
    return (withReciprocals(a!, variability) as Expression).mul(constant(1).div(b!));
  });
}

/**
 * Takes out of every expression what depends on parameters and surroundings only (`fixed`), or on
 * those and held memory (`cached`), so that the loop over samples does not compute it again.
 */
export function hoister(): Hoister {
  const variability = variabilityOf();
  const fixed: Slot[] = [];
  const cached: Slot[] = [];
  const slots = new Map<Expression, Expression>();

  const keep = (list: Slot[], name: string, from: Expression): Expression => {
    let symbol = slots.get(from);
    if (symbol === undefined) {
      symbol = leaf(list === fixed ? 'parameter' : 'held', `${name}${list.length}`, from.dimension);
      list.push({ symbol, from });
      slots.set(from, symbol);
    }
    return symbol;
  };

  const fix = (root: EquationNode): EquationNode =>
    replaceLargest(root, (node) =>
      variability(node) === 'set-up' && node.op !== 'constant' ? keep(fixed, 'p', node) : undefined,
    );

  return {
    fixed,
    cached,
    hoist: <T extends EquationNode>(root: T): T =>
      fix(
        replaceLargest(withReciprocals(root, variability), (node) =>
          variability(node) === 'event' && node.op !== 'leaf'
            ? keep(cached, 'c', fix(node) as Expression)
            : undefined,
        ),
      ) as T,
  };
}

/** Replaces the largest expressions for which `choose` has an answer. */
function replaceLargest(
  root: EquationNode,
  choose: (node: Expression) => Expression | undefined,
): EquationNode {
  const replacements = new Map<Expression, Expression>();
  const seen = new Set<EquationNode>();
  const visit = (node: EquationNode): void => {
    if (seen.has(node)) return;
    seen.add(node);
    const slot = node instanceof Expression ? choose(node) : undefined;
    if (slot === undefined) node.args.forEach(visit);
    else if (slot !== node) replacements.set(node as Expression, slot);
  };
  visit(root);
  return replacements.size === 0 ? root : substitute(root, replacements);
}
