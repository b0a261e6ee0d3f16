import type { Equations } from '../equation/declare.ts';
import { Expression, leaf } from '../equation/expression.ts';
import type { EquationNode } from '../equation/node.ts';
import { substitute } from '../equation/substitute.ts';
import type { KindDeclaration } from './kind.ts';
import { equationVariants, wordings } from './variants.ts';

/** A line of a kind's equations: what stands on the left, and what on the right. */
export interface EquationLine {
  readonly left: string;
  readonly right: string;
}

/** The equations of a kind for one set of choices, in print. */
export interface DescribedEquations {
  /** Words of the choice parameters. */
  readonly words: Readonly<Record<string, string>>;
  /** What is taken as zero or not zero in this form: `capacitance = 0`. */
  readonly given: readonly string[];
  readonly lines: readonly EquationLine[];
}

/**
 * The equations of a kind as a reader would write them: the very expressions the engine compiles, in
 * every form they take, with all inputs wired. `d x1/dt` is the slope of a state, `x1(0)` its start;
 * a line with `when … rises through 0` on the left says what an event writes; long terms that stand in
 * several places are given a name, `t1`, and a line of their own.
 *
 * @returns nothing for a kind that is a plain kernel
 */
export function describeEquations(declaration: KindDeclaration): DescribedEquations[] {
  if (declaration.equations === undefined) return [];
  const wired = (): { direct: boolean; resistors: boolean } => ({ direct: true, resistors: true });
  return wordings(declaration).flatMap((words) =>
    [...equationVariants(declaration, words, wired)].map(({ bound, answers }) => ({
      words,
      given: answers.map(({ asked, isZero }) => `${asked} ${isZero ? '=' : '≠'} 0`),
      lines: linesOf(bound.equations),
    })),
  );
}

function linesOf({ outputs, states, helds, crossings }: Equations): EquationLine[] {
  const written = [
    ...Object.values(outputs),
    ...states.flatMap(({ symbol, initial, slope }) => [symbol, initial, slope]),
    ...helds.map(({ initial }) => initial),
    ...crossings.flatMap(({ expression, changes }) => [expression, ...changes.map(({ value }) => value)]),
  ];
  const named = namedTerms(written);
  const show = (expression: Expression): string => substitute(expression, named).toString();
  const line = (left: string, right: Expression): EquationLine => ({ left, right: show(right) });
  return [
    ...Object.entries(outputs).map(([port, value]) => line(port, value)),
    ...[...named].map(([term, { name }]) => {
      const others = new Map([...named].filter(([other]) => other !== term));
      return { left: name, right: substitute(term, others).toString() };
    }),
    ...states.flatMap(({ symbol, initial, slope }) => [
      line(`d ${symbol}/dt`, slope),
      line(`${symbol}(0)`, initial),
    ]),
    ...helds.map(({ symbol, initial }) => line(`${symbol}(0)`, initial)),
    ...crossings.map(({ expression, changes }) => ({
      left: `when ${show(expression)} rises through 0`,
      right: changes.map(({ target, value }) => `${target} := ${show(value)}`).join(', '),
    })),
  ];
}

/** Terms shorter than this are written out wherever they stand. */
const shortest = 24;

/** Long terms that stand in more than one place, each with a leaf that names it. */
function namedTerms(written: readonly Expression[]): Map<Expression, Expression> {
  const uses = new Map<EquationNode, number>();
  const visit = (node: EquationNode): void => {
    const count = (uses.get(node) ?? 0) + 1;
    uses.set(node, count);
    if (count === 1) for (const arg of printedArgs(node)) visit(arg);
  };
  written.forEach(visit);
  const named = new Map<Expression, Expression>();
  for (const [node, count] of uses) {
    if (count < 2 || !(node instanceof Expression) || String(node).length < shortest) continue;
    named.set(node, leaf('unknown', `t${named.size + 1}`, node.dimension));
  }
  return named;
}

/** Of an implicit equation only its unknown and what must vanish are printed. */
function printedArgs({ op, args }: EquationNode): readonly EquationNode[] {
  return op === 'solve' ? [args[0]!, args[2]!] : args;
}
