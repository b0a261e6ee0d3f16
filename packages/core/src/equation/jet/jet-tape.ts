import { dependsOn } from '../coupling.ts';
import type { EquationNode } from '../node.ts';
import { solveScalar } from '../solve-scalar.ts';
import {
  addJets,
  type BinaryJet,
  copyJet,
  cosJet,
  divJets,
  exp2Jet,
  expJet,
  jetLength,
  logJet,
  mulJets,
  negJet,
  signOfJet,
  sinJet,
  sqrtJet,
  subJets,
  tanhJet,
  type UnaryJet,
} from './jet-arithmetic.ts';

/** Just before a point, or just after it. */
export type Side = -1 | 1;

type Step = (side: Side) => void;

const unary: Readonly<Record<string, UnaryJet>> = {
  neg: negJet,
  sqrt: sqrtJet,
  exp: expJet,
  exp2: exp2Jet,
  log: logJet,
  sin: sinJet,
  cos: cosJet,
  tanh: tanhJet,
};

const binary: Readonly<Record<string, BinaryJet>> = {
  add: addJets,
  sub: subJets,
  mul: mulJets,
  div: divJets,
};

/** Newton steps after the value has settled: each doubles the number of right coefficients. */
const polishing = 3;

/**
 * Evaluates expressions in Taylor arithmetic: the same graph that makes samples makes the jets at
 * an edge. Everything is laid out once; a run allocates nothing.
 */
export class JetTape {
  /** One jet a row; the leaves first, in the order given. */
  private readonly work: Float64Array;
  private readonly rows = new Map<EquationNode, number>();
  private readonly steps: Step[] = [];
  private readonly rootRows: readonly number[];

  constructor(roots: readonly EquationNode[], leaves: readonly EquationNode[]) {
    const unknowns = findUnknowns(roots);
    const nodes = [...leaves, ...unknowns, ...collect(roots)];
    for (const node of nodes) if (!this.rows.has(node)) this.rows.set(node, this.rows.size * jetLength);
    // One row more than there are nodes, for differences that are only looked at.
    this.work = new Float64Array((this.rows.size + 1) * jetLength);
    this.lay(roots, this.steps, new Set<EquationNode>([...leaves, ...unknowns]));
    this.rootRows = roots.map((root) => this.rows.get(root)!);
  }

  /** Writes the jet of leaf number `leaf`. */
  setLeaf(leaf: number, jet: Float64Array, at: number): void {
    for (let k = 0; k < jetLength; k++) this.work[leaf * jetLength + k] = jet[at + k]!;
  }

  /** Makes leaf number `leaf` constant. */
  setConstant(leaf: number, value: number): void {
    this.work.fill(0, leaf * jetLength, (leaf + 1) * jetLength);
    this.work[leaf * jetLength] = value;
  }

  /** Writes one coefficient of a leaf. */
  setCoefficient(leaf: number, k: number, value: number): void {
    this.work[leaf * jetLength + k] = value;
  }

  /** Evaluates all roots on one side of the point. */
  run(side: Side): void {
    for (const step of this.steps) step(side);
  }

  /** Coefficient `k` of root number `root` as last evaluated. */
  coefficient(root: number, k: number): number {
    return this.work[this.rootRows[root]! + k]!;
  }

  /** Appends the steps that evaluate `nodes`. */
  private lay(nodes: readonly EquationNode[], steps: Step[], done: Set<EquationNode>): void {
    const visit = (node: EquationNode): void => {
      if (done.has(node)) return;
      if (node.op === 'solve') {
        visit(node.args[1]!);
        this.layOutside(node, visit);
      } else node.args.forEach(visit);
      if (done.has(node)) return;
      done.add(node);
      steps.push(this.step(node, done));
    };
    nodes.forEach(visit);
  }

  /** Of an implicit equation, what does not depend on its unknown is evaluated once, before the loop. */
  private layOutside(node: EquationNode, visit: (node: EquationNode) => void): void {
    const unknown = node.args[0]!;
    const search = (inner: EquationNode): void => {
      if (dependsOn(inner, unknown)) inner.args.forEach(search);
      else visit(inner);
    };
    node.args.slice(2).forEach(search);
  }

  private step(node: EquationNode, done: Set<EquationNode>): Step {
    const w = this.work;
    const to = this.rows.get(node)!;
    const [a = 0, b = 0, c = 0] = node.args.map((arg) => this.rows.get(arg)!);
    const one = unary[node.op];
    if (one !== undefined) return () => one(w, to, a);
    const two = binary[node.op];
    if (two !== undefined) return () => two(w, to, a, b);
    const scratch = w.length - jetLength;
    const difference = (side: Side): number => {
      subJets(w, scratch, a, b);
      return signOfJet(w, scratch, side);
    };
    const answer = (yes: boolean): void => {
      w[to] = yes ? 1 : 0;
    };
    switch (node.op) {
      case 'constant':
        w[to] = node.value;
        return () => {};
      case 'true':
      case 'false':
        answer(node.op === 'true');
        return () => {};
      case 'abs':
        return (side) => (signOfJet(w, a, side) < 0 ? negJet : copyJet)(w, to, a);
      case 'min':
        return (side) => copyJet(w, to, difference(side) < 0 ? a : b);
      case 'max':
        return (side) => copyJet(w, to, difference(side) > 0 ? a : b);
      case 'lt':
        return (side) => answer(difference(side) < 0);
      case 'le':
        return (side) => answer(difference(side) <= 0);
      case 'eq':
        return () => answer(w[a] === w[b]);
      case 'and':
        return () => answer(w[a] !== 0 && w[b] !== 0);
      case 'or':
        return () => answer(w[a] !== 0 || w[b] !== 0);
      case 'not':
        return () => answer(w[a] === 0);
      case 'select':
        return () => copyJet(w, to, w[a] !== 0 ? b : c);
      case 'floor':
        return (side) => {
          w.fill(0, to, to + jetLength);
          copyJet(w, scratch, a);
          const whole = Math.round(w[a]!);
          w[scratch] = w[a]! - whole;
          w[to] = signOfJet(w, scratch, side) < 0 ? whole - 1 : whole;
        };
      case 'solve':
        return this.solve(node, done);
      default:
        throw new Error(`the leaf ${node.name} has no place on the tape`);
    }
  }

  /** An implicit equation: its value as samples get it, then Newton's method on the whole jet. */
  private solve(node: EquationNode, done: Set<EquationNode>): Step {
    const w = this.work;
    const terms = node.args.slice(2);
    const inner: Step[] = [];
    this.lay(terms, inner, new Set(done));
    const [x, start, r, s, c] = node.args.map((arg) => this.rows.get(arg)!) as [
      number,
      number,
      number,
      number,
      number,
    ];
    const to = this.rows.get(node)!;
    const scratch = w.length - jetLength;
    return (side) => {
      w.fill(0, x, x + jetLength);
      w[x] = solveScalar(w[start]!, (value, out) => {
        w[x] = value;
        for (const step of inner) step(side);
        out[0] = w[r]!;
        out[1] = w[s]!;
        out[2] = w[c]!;
      });
      for (let count = 0; count < polishing; count++) {
        for (const step of inner) step(side);
        divJets(w, scratch, r, s);
        subJets(w, x, x, scratch);
      }
      copyJet(w, to, x);
    };
  }
}

function collect(roots: readonly EquationNode[]): EquationNode[] {
  const seen = new Set<EquationNode>();
  const visit = (node: EquationNode): void => {
    if (seen.has(node)) return;
    seen.add(node);
    node.args.forEach(visit);
  };
  roots.forEach(visit);
  return [...seen];
}

function findUnknowns(roots: readonly EquationNode[]): EquationNode[] {
  return collect(roots).filter(({ role }) => role === 'unknown');
}
