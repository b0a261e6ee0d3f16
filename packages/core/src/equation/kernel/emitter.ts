import { dependsOn } from '../coupling.ts';
import type { EquationNode } from '../node.ts';
import { closeEnough, mostSteps, smallest } from '../solve-scalar.ts';

/** Gives a leaf its text in the generated source. */
export type LeafText = (leaf: EquationNode) => string;

/** How many times each vertex is used by a set of expressions. */
function countUses(roots: readonly EquationNode[]): Map<EquationNode, number> {
  const uses = new Map<EquationNode, number>();
  const visit = (node: EquationNode): void => {
    const before = uses.get(node) ?? 0;
    uses.set(node, before + 1);
    if (before === 0) node.args.forEach(visit);
  };
  roots.forEach(visit);
  return uses;
}

const operators: Readonly<Record<string, string>> = {
  add: '+',
  sub: '-',
  mul: '*',
  div: '/',
  lt: '<',
  le: '<=',
  eq: '===',
  and: '&&',
  or: '||',
};

const calls: Readonly<Record<string, string>> = {
  abs: 'Math.abs',
  min: 'Math.min',
  max: 'Math.max',
  floor: 'Math.floor',
  sqrt: 'Math.sqrt',
  exp: 'Math.exp',
  log: 'Math.log',
  sin: 'Math.sin',
  cos: 'Math.cos',
  tanh: 'lib.tanh',
  exp2: 'lib.exp2',
};

/**
 * Writes expressions as JavaScript statements. A vertex used more than once gets a name; the
 * others stand where they are used. Texts hold numbers, indices and names made here only.
 */
export class Emitter {
  readonly lines: string[] = [];
  private readonly leafText: LeafText;
  private readonly uses: ReadonlyMap<EquationNode, number>;
  private readonly names = new Map<EquationNode, string>();
  private readonly outer: Emitter | undefined;
  private readonly unknown: EquationNode | undefined;
  private readonly counter: { next: number };

  constructor(
    roots: readonly EquationNode[],
    leafText: LeafText,
    inside?: { outer: Emitter; unknown: EquationNode },
  ) {
    this.leafText = leafText;
    this.uses = inside?.outer.uses ?? countUses(roots);
    this.outer = inside?.outer;
    this.unknown = inside?.unknown;
    this.counter = inside?.outer.counter ?? { next: 0 };
  }

  /** The same emitter, its lines so far taken away: what follows may use their names. */
  continued(): Emitter {
    this.lines.length = 0;
    return this;
  }

  /** The text of a vertex; what it needs is appended to `lines` first. */
  text(node: EquationNode): string {
    if (node.op === 'constant') return number(node.value);
    const known = this.named(node);
    if (known !== undefined) return known;
    if (node.op === 'leaf') return this.leafText(node);
    if (this.outer !== undefined && !dependsOn(node, this.unknown!)) return this.outer.text(node);
    if (node.op === 'solve') return this.solve(node);
    const text = this.operation(node);
    return (this.uses.get(node) ?? 0) > 1 ? this.name(node, text) : text;
  }

  /** Gives a vertex a name of its own, declared with `text`. */
  private name(node: EquationNode, text: string): string {
    const name = this.fresh();
    this.lines.push(`const ${name} = ${text};`);
    this.names.set(node, name);
    return name;
  }

  private fresh(): string {
    this.counter.next += 1;
    return `v${this.counter.next}`;
  }

  private named(node: EquationNode): string | undefined {
    return this.names.get(node) ?? this.outer?.named(node);
  }

  private operation(node: EquationNode): string {
    const [a, b, c] = node.args.map((arg) => this.text(arg));
    if ((node.op === 'mul' || node.op === 'div') && node.args[1]!.value === 1) return a!;
    if (node.op === 'mul' && node.args[0]!.value === 1) return b!;
    const sign = operators[node.op];
    if (sign !== undefined) return `(${a} ${sign} ${b})`;
    const call = calls[node.op];
    if (call !== undefined) return `${call}(${node.args.length === 2 ? `${a}, ${b}` : a})`;
    switch (node.op) {
      case 'neg':
        return `(-${a})`;
      case 'not':
        return `!${a}`;
      case 'select':
        return `(${a} ? ${b} : ${c})`;
      default:
        return node.op;
    }
  }

  /** An implicit equation: Halley's method in a loop of its own. */
  private solve(node: EquationNode): string {
    const [unknown, guess, residual, slope, curvature] = node.args as [
      EquationNode,
      EquationNode,
      EquationNode,
      EquationNode,
      EquationNode,
    ];
    const start = this.text(guess);
    const root = this.fresh();
    const body = new Emitter([], this.leafText, { outer: this, unknown });
    body.names.set(unknown, root);
    const terms = [residual, slope, curvature].map((term) => body.text(term));
    const [step, least] = [this.fresh(), this.fresh()];
    this.lines.push(
      `let ${root} = ${start}, ${step} = NaN, ${least} = Infinity;`,
      'for (let i = 0; ; i++) {',
      ...body.lines.map((line) => `  ${line}`),
      ...searchLines(terms as [string, string, string], { root, step, least }).map((line) => `  ${line}`),
      '}',
    );
    this.names.set(node, root);
    return root;
  }
}

/** The text of one turn of `solveScalar`, so that the loop calls nothing. */
function searchLines(
  [residual, slope, curvature]: [string, string, string],
  { root, step, least }: { root: string; step: string; least: string },
): string[] {
  return [
    `const r = ${residual}, a = Math.abs(r);`,
    `if (Math.abs(${step}) <= ${smallest} && a > 0.5 * ${least}) break;`,
    `if (a < ${least}) {`,
    `  const d = ${slope}, q = d * d, b = q - 0.5 * r * ${curvature};`,
    `  ${least} = a;`,
    // Comparisons: the engine's Math.min and Math.max cost more than the whole step.
    `  ${step} = r === 0 ? 0 : r * d / (b < 0.5 * q ? 0.5 * q : b > 2 * q ? 2 * q : b);`,
    `  ${root} -= ${step};`,
    `  if (Math.abs(${step}) <= ${closeEnough} * Math.abs(${root}) || ${step} === 0) break;`,
    `} else { ${step} *= 0.5; ${root} += ${step}; }`,
    `if (i === ${mostSteps - 1}) { ${root} = NaN; break; }`,
  ];
}

function number(value: number): string {
  return value < 0 || Object.is(value, -0) ? `(${Object.is(value, -0) ? '-0' : value})` : String(value);
}
