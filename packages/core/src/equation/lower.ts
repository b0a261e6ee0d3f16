import { dimensions, overDimension } from '../quantity/dimension.ts';
import { findCorners } from './corners.ts';
import { couplingGroups, dependsOn } from './coupling.ts';
import type { Equations, StateDeclaration } from './declare.ts';
import { tangent } from './differentiate.ts';
import { constant, type Expression, leaf } from './expression.ts';
import { type Hoister, hoister } from './hoist.ts';
import { type EquationNode, withSharedNodes } from './node.ts';
import type { Crossing, Group, Output, Program } from './program.ts';
import { substitute } from './substitute.ts';
import { variabilityOf } from './variability.ts';

/** What the surrounding patch asks of a block's program. */
export interface LoweringRequest {
  /** Leaves of the inputs that carry a signal. */
  readonly inputs: readonly Expression[];
  readonly time: Expression;
  /** Outputs whose slope is needed downstream. */
  readonly slopesOf: ReadonlySet<string>;
  /** Whether edges are carried, and may come in: then inputs that meet are taken between samples. */
  readonly carry?: { readonly incoming: boolean };
}

/** Makes equations ready for a back-end: grouping of states, derivatives, hoisting. */
export function lower(equations: Equations, request: LoweringRequest): Program {
  return withSharedNodes(() => new Lowering(equations, request).program());
}

class Lowering {
  private readonly equations: Equations;
  private readonly request: LoweringRequest;
  private readonly slots: Hoister = hoister();
  private readonly inputSlopes: readonly Expression[];
  /** Slope in time of every leaf that moves. */
  private readonly motion: ReadonlyMap<Expression, Expression>;

  constructor(equations: Equations, request: LoweringRequest) {
    this.equations = equations;
    this.request = request;
    this.inputSlopes = request.inputs.map((input) =>
      leaf('input-slope', `${input.name}'`, overDimension(input.dimension, dimensions.time)),
    );
    this.motion = new Map<Expression, Expression>([
      [request.time, constant(1)],
      ...request.inputs.map((input, index) => [input, this.inputSlopes[index]!] as const),
      ...equations.states.map(({ symbol, slope }) => [symbol, slope] as const),
    ]);
  }

  program(): Program {
    const { states, helds, crossings, outputs } = this.equations;
    const symbols = states.map(({ symbol }) => symbol);
    const groups = couplingGroups(states).map((members) => this.group(members));
    const needsStateSlopes = groups.some(
      (group) =>
        group.kind === 'implicit' &&
        group.field.some((f) => symbols.some((s, i) => !group.states.includes(i) && dependsOn(f, s))),
    );
    const lowered = {
      groups,
      stateSlopes: needsStateSlopes ? states.map(({ slope }) => this.slots.hoist(slope)) : [],
      crossings: [
        ...crossings.map((crossing) => this.crossing(crossing)),
        ...(this.request.carry === undefined ? [] : this.corners()),
      ],
      jetSlopes: states.map(({ slope }) => this.slots.hoist(slope)),
      outputs: Object.entries(outputs).map(([name, value]) => this.output(name, value)),
    };
    return {
      inputs: this.request.inputs,
      inputSlopes: this.inputSlopes,
      slopesWanted: this.slopesWanted(lowered),
      time: this.request.time,
      states: states.map(({ symbol, initial }) => ({ symbol, from: initial })),
      helds: helds.map(({ symbol, initial }) => ({ symbol, from: initial })),
      ...lowered,
      fixed: this.slots.fixed,
      cached: this.slots.cached,
    };
  }

  private slopeInTime(expression: Expression): Expression {
    return tangent(expression, this.motion, dimensions.time);
  }

  private group(members: readonly number[]): Group {
    const states = members.map((index) => this.equations.states[index]!);
    const [only] = states;
    return (members.length === 1 && only && this.linear(members[0]!, only)) || this.implicit(members, states);
  }

  private linear(index: number, { symbol, slope }: StateDeclaration): Group | undefined {
    const variability = variabilityOf();
    const rate = tangent(slope, new Map([[symbol, constant(1)]]), symbol.dimension);
    if (variability(rate) === 'sample' || jumpsBy(slope, symbol)) return undefined;
    const drive = substitute(slope, new Map([[symbol, constant(0, symbol.dimension)]]));
    return {
      kind: 'linear',
      states: [index],
      rate: this.slots.hoist(rate),
      drive: this.slots.hoist(drive),
      driveSlope: this.slots.hoist(this.slopeInTime(drive)),
      steady: variability(drive) !== 'sample',
    };
  }

  private implicit(members: readonly number[], states: readonly StateDeclaration[]): Group {
    const jacobian = states.flatMap(({ slope }) =>
      states.map(({ symbol }) => tangent(slope, new Map([[symbol, constant(1)]]), symbol.dimension)),
    );
    return {
      kind: 'implicit',
      states: members,
      field: states.map(({ slope }) => this.slots.hoist(slope)),
      jacobian: jacobian.map((entry) => this.slots.hoist(entry)),
    };
  }

  private crossing({ expression, changes }: Equations['crossings'][number]): Crossing {
    const { states, helds } = this.equations;
    return {
      corner: false,
      expression: this.slots.hoist(expression),
      slope: this.slots.hoist(this.slopeInTime(expression)),
      changes: changes.map(({ target, value }) => {
        const kind = target.role === 'state' ? 'state' : 'held';
        const memories: readonly { readonly symbol: Expression }[] = kind === 'state' ? states : helds;
        const memory = memories.findIndex(({ symbol }) => symbol === target);
        return { kind, memory, value: this.slots.hoist(value) };
      }),
    };
  }

  /** Where the outputs or the slopes of the states choose between branches by something that moves. */
  private corners(): Crossing[] {
    const { states, outputs } = this.equations;
    return findCorners([...Object.values(outputs), ...states.map(({ slope }) => slope)]).map(
      (expression) => ({
        corner: true,
        expression: this.slots.hoist(expression),
        slope: this.slots.hoist(this.slopeInTime(expression)),
        changes: [],
      }),
    );
  }

  private output(name: string, value: Expression): Output {
    return {
      name,
      value: this.slots.hoist(value),
      slope: this.request.slopesOf.has(name) ? this.slots.hoist(this.slopeInTime(value)) : undefined,
    };
  }

  /**
   * An input's slope is wanted where a slope expression uses it, and wherever the input is taken
   * between samples: events and implicit steps see it through the cubic that carries its slope.
   */
  private slopesWanted({
    groups,
    crossings,
    outputs,
  }: Pick<Program, 'groups' | 'crossings' | 'outputs'>): boolean[] {
    const { carry, inputs } = this.request;
    const split =
      carry?.incoming || crossings.length > 0 || groups.some((group) => group.kind === 'implicit');
    const meeting = carry !== undefined && ((carry.incoming && inputs.length > 1) || crossings.length > 0);
    const moving: Expression[] = [
      ...(meeting ? outputs.map(({ value }) => value) : []),
      ...crossings.flatMap(({ changes }) => changes.map(({ value }) => value)),
      ...groups.flatMap((group) => (group.kind === 'linear' ? [group.drive] : group.field)),
      ...crossings.map(({ expression }) => expression),
    ];
    const slopes = [
      ...groups.flatMap((group) => (group.kind === 'linear' ? [group.driveSlope] : [])),
      ...outputs.flatMap(({ slope }) => (slope === undefined ? [] : [slope])),
    ];
    return inputs.map(
      (input, index) =>
        slopes.some((slope) => dependsOn(slope, this.inputSlopes[index]!)) ||
        (split && moving.some((expression) => dependsOn(expression, input))),
    );
  }
}

/** Whether an expression may jump where a leaf passes some value: then a constant derivative tells nothing. */
function jumpsBy(root: EquationNode, symbol: Expression): boolean {
  const seen = new Set<EquationNode>();
  const visit = (node: EquationNode): boolean => {
    if (seen.has(node)) return false;
    seen.add(node);
    return jumps.has(node.op) ? dependsOn(node, symbol) : node.args.some(visit);
  };
  return visit(root);
}

const jumps: ReadonlySet<string> = new Set(['lt', 'le', 'eq', 'floor']);
