import type { Condition } from '../equation/condition.ts';
import type { Expression, Operand } from '../equation/expression.ts';
import type { ChoiceParameter, NumberParameter, Parameter } from './parameter.ts';
import type { PortDeclaration, PortQuantity } from './port.ts';
import type { SurroundingSymbols } from './surroundings.ts';

/** Inputs of a kind, by name. */
export type Inputs = Readonly<Record<string, PortDeclaration>>;

/** Outputs of a kind, by name; an output is a voltage or a current. */
export type Outputs = Readonly<Record<string, PortDeclaration<'voltage' | 'current'>>>;

/** Parameters of a kind, by name. */
export type Parameters = Readonly<Record<string, Parameter>>;

/** A node input as the equations see it. */
export interface NodeSymbols {
  /** Sum of the currents that flow in directly, A. */
  readonly current: Expression;
  /** Sum of V/R over the voltages that come in through resistors, A. */
  readonly drive: Expression;
  /** Sum of 1/R over those resistors, S. */
  readonly conductance: Expression;
}

/** A port as the equations see it. */
export type PortSymbol<Q extends PortQuantity> = Q extends 'node' ? NodeSymbols : Expression;

/** A parameter as the equations see it: a choice is a plain word, anything else an expression. */
export type ParameterSymbol<P extends Parameter> =
  P extends ChoiceParameter<infer Choice> ? Choice : Expression;

/** All parameters as the equations see them, with the surroundings. */
export type ParameterSymbols<P extends Parameters> = {
  readonly [K in keyof P]: ParameterSymbol<P[K]>;
} & SurroundingSymbols;

/** Everything a kind's equations see, by name. */
export type EquationSymbols<I extends Inputs, P extends Parameters> = {
  readonly [K in keyof I as I[K]['symbol'] extends string ? I[K]['symbol'] : K]: PortSymbol<I[K]['quantity']>;
} & ParameterSymbols<P>;

/** What limits and potentials of ports are written in: all that equations see, and the outputs as they are. */
export type OperatingSymbols<I extends Inputs, O extends Outputs, P extends Parameters> = EquationSymbols<
  I,
  P
> & {
  readonly [K in keyof O as O[K]['symbol'] extends string ? O[K]['symbol'] : K]: Expression;
};

/** Limits within which a port works as meant; of a node, those of the current into it. */
export interface PortLimits {
  readonly min?: Operand;
  readonly max?: Operand;
}

/** What a script may give for the parameters of a kind; all have a value of their own. */
export type GivenParameters<P extends Parameters> = {
  readonly [K in keyof P]?: P[K] extends ChoiceParameter<infer Choice>
    ? Choice
    : P[K] extends NumberParameter<infer Given>
      ? Given
      : never;
};

/** A rule between several parameters, and what to say where it does not hold. */
export interface Requirement {
  readonly holds: Condition;
  /** What must hold and the cure, in words. */
  readonly says: string;
}

/** What a plain kernel gets: arrays in the layout of the engine's buffers, and its values. */
export interface PlainKernelContext {
  /** Input buffers by port name; `[n]` is the value at sample n of the present chunk. */
  readonly inputs: Readonly<Record<string, Float64Array>>;
  /** Output buffers to be written, by port name. */
  readonly outputs: Readonly<Record<string, Float64Array>>;
  /** Parameter values in SI base units, or words. */
  readonly params: Readonly<Record<string, number | string>>;
  /** Seconds between samples. */
  readonly dt: number;
}

/** A plain kernel: writes samples `from` … `to − 1` of its outputs. Slot `from − 1` is the sample before. */
export interface PlainKernel {
  /** Computes samples `from` … `to − 1` of every output from the inputs. */
  run(from: number, to: number): void;
}

/** The declared face of a kind: everything but its equations' types. */
export interface KindDeclaration {
  readonly kind: string;
  readonly summary: string;
  readonly inputs: Inputs;
  readonly outputs: Outputs;
  readonly params: Parameters;
  /** Input and source resistances of ports, given the parameters. */
  readonly resistances?: (values: never) => Readonly<Record<string, Expression | undefined>>;
  /** Limits of ports, and voltages of node inputs, at an operating point. */
  readonly limits?: (symbols: never) => Readonly<Record<string, PortLimits | undefined>>;
  /** Voltages of node inputs, for operating points. */
  readonly potentials?: (symbols: never) => Readonly<Record<string, Expression | undefined>>;
  /** Rules between parameters. */
  readonly requires?: (values: never) => readonly Requirement[];
  /** The physics, unless the kind is a plain kernel. */
  readonly equations?: (symbols: never) => Readonly<Record<string, Expression>>;
  /** The loop over samples of a kind that is no equation. */
  readonly kernel?: (context: PlainKernelContext) => PlainKernel;
}

/** A block before it has a name: a kind with the parameters a script gave it. */
export interface Block<I extends Inputs = Inputs, O extends Outputs = Outputs> {
  readonly kind: BlockKind<I, O, Parameters>;
  readonly given: Readonly<Record<string, unknown>>;
}

/** A kind of block; calling it with parameters makes a block. */
export interface BlockKind<
  I extends Inputs = Inputs,
  O extends Outputs = Outputs,
  P extends Parameters = Parameters,
> {
  (params?: GivenParameters<P>): Block<I, O>;
  readonly declaration: KindDeclaration & { readonly inputs: I; readonly outputs: O; readonly params: P };
}
