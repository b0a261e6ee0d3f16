import { type EquationNode, internNode, type LogicOp, nextNodeId } from './node.ts';

/** A yes/no vertex of the equation graph: the choice made by `select`. */
export class Condition implements EquationNode {
  readonly id: number = nextNodeId();
  readonly op: LogicOp;
  readonly args: readonly EquationNode[];
  readonly value: number = Number.NaN;
  readonly name: string = '';
  readonly role: undefined = undefined;

  private constructor(op: LogicOp, args: readonly EquationNode[]) {
    this.op = op;
    this.args = args;
  }

  /** A comparison; decided at once between constants. */
  static compare(
    op: 'lt' | 'le' | 'eq',
    left: EquationNode,
    right: EquationNode,
    fold: (a: number, b: number) => boolean,
  ): Condition {
    if (left.op === 'constant' && right.op === 'constant')
      return Condition.known(fold(left.value, right.value));
    return Condition.make(op, [left, right]);
  }

  /** The settled answer. */
  static known(answer: boolean): Condition {
    return Condition.make(answer ? 'true' : 'false', []);
  }

  /** Both. */
  and(other: Condition): Condition {
    if (this.op === 'false' || other.op === 'true') return this;
    if (this.op === 'true' || other.op === 'false') return other;
    return Condition.make('and', [this, other]);
  }

  /** Either. */
  or(other: Condition): Condition {
    if (this.op === 'true' || other.op === 'false') return this;
    if (this.op === 'false' || other.op === 'true') return other;
    return Condition.make('or', [this, other]);
  }

  /** The contrary. */
  not(): Condition {
    if (this.op === 'true' || this.op === 'false') return Condition.known(this.op === 'false');
    if (this.op === 'not') return this.args[0] as Condition;
    return Condition.make('not', [this]);
  }

  private static make(op: LogicOp, args: readonly EquationNode[]): Condition {
    return internNode(`${op} ${args.map((arg) => arg.id).join(' ')}`, () => new Condition(op, args));
  }
}
