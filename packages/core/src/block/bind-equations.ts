import { type Equations, recordEquations } from '../equation/declare.ts';
import { constant, type Expression, leaf } from '../equation/expression.ts';
import { dimensions } from '../quantity/dimension.ts';
import type { KindDeclaration, NodeSymbols } from './kind.ts';
import { portDimension } from './port.ts';
import { type SurroundingSymbols, surroundingSymbols } from './surroundings.ts';

/** How an input is connected: voltage and current inputs carry a signal or not; a node has its parts. */
export interface InputWiring {
  /** Whether a signal (at a node: a current) comes in directly. */
  readonly direct: boolean;
  /** At a node: whether voltages come in through resistors. */
  readonly resistors: boolean;
}

/** An input leaf and where its samples come from. */
export interface InputLeaf {
  readonly symbol: Expression;
  readonly port: string;
  /** The signal itself, or at a node the sum of V/R. */
  readonly part: 'direct' | 'drive';
}

/** A kind's equations for one way of wiring it, with the leaves they are written in. */
export interface BoundEquations {
  readonly equations: Equations;
  readonly inputs: readonly InputLeaf[];
  /** Conductance leaf of each node input that has resistors. */
  readonly conductances: ReadonlyMap<string, Expression>;
  readonly parameters: ReadonlyMap<string, Expression>;
  readonly surroundings: SurroundingSymbols;
}

/** How the equations of a kind are asked for. */
export interface BindingRequest {
  /** Words of the choice parameters. */
  readonly words: Readonly<Record<string, string>>;
  readonly wiring: (port: string) => InputWiring;
  /** Answers `isZero`; the parameter leaves are given so that an expression can be evaluated. */
  readonly decide: (
    expression: Expression,
    bound: Pick<BoundEquations, 'parameters' | 'surroundings' | 'conductances'>,
  ) => boolean;
}

/** Leaves for the parameters that are numbers, and the words as they are. */
export function parameterSymbols(
  declaration: KindDeclaration,
  words: Readonly<Record<string, string>>,
): { readonly leaves: Map<string, Expression>; readonly values: Record<string, Expression | string> } {
  const leaves = new Map<string, Expression>();
  const values: Record<string, Expression | string> = {};
  for (const [name, parameter] of Object.entries(declaration.params)) {
    if (parameter.form === 'choice') values[name] = words[name] ?? parameter.initial;
    else {
      const symbol = leaf('parameter', name, parameter.dimension);
      leaves.set(name, symbol);
      values[name] = symbol;
    }
  }
  return { leaves, values };
}

/** The symbols a kind is written in for one way of wiring it, by the names its author uses. */
export interface BoundSymbols extends Omit<BoundEquations, 'equations'> {
  readonly symbols: Readonly<Record<string, unknown>>;
}

/** Makes the symbols of a kind for the given wiring and words. */
export function bindSymbols(
  declaration: KindDeclaration,
  { words, wiring: wiringOf }: Pick<BindingRequest, 'words' | 'wiring'>,
): BoundSymbols {
  const surroundings = surroundingSymbols();
  const { leaves: parameters, values } = parameterSymbols(declaration, words);
  const inputs: InputLeaf[] = [];
  const conductances = new Map<string, Expression>();

  const signal = (
    port: string,
    name: string,
    part: InputLeaf['part'],
    dimension = dimensions.current,
  ): Expression => {
    const symbol = leaf('input', name, dimension);
    inputs.push({ symbol, port, part });
    return symbol;
  };
  const nodeSymbols = (port: string, { direct, resistors }: InputWiring): NodeSymbols => {
    const conductance = resistors
      ? leaf('parameter', `${port}.conductance`, dimensions.conductance)
      : constant(0, dimensions.conductance);
    if (resistors) conductances.set(port, conductance);
    return {
      current: direct ? signal(port, `${port}.current`, 'direct') : constant(0, dimensions.current),
      drive: resistors ? signal(port, `${port}.drive`, 'drive') : constant(0, dimensions.current),
      conductance,
    };
  };

  const symbols: Record<string, unknown> = { ...values, ...surroundings };
  for (const [port, { quantity, symbol = port }] of Object.entries(declaration.inputs)) {
    const wiring = wiringOf(port);
    if (quantity === 'node') symbols[symbol] = nodeSymbols(port, wiring);
    else {
      const dimension = portDimension(quantity);
      symbols[symbol] = wiring.direct ? signal(port, symbol, 'direct', dimension) : constant(0, dimension);
    }
  }
  return { symbols, inputs, conductances, parameters, surroundings };
}

/** Writes down the equations of a kind as they stand for the given wiring and words. */
export function bindEquations(declaration: KindDeclaration, request: BindingRequest): BoundEquations {
  const { symbols, ...bound } = bindSymbols(declaration, request);
  const write = declaration.equations as (symbols: unknown) => Readonly<Record<string, Expression>>;
  const equations = recordEquations(
    () => write(symbols),
    (expression) => request.decide(expression, bound),
  );
  return { equations, ...bound };
}
