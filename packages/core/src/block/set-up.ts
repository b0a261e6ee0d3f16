import { evaluate } from '../equation/evaluate.ts';
import type { Expression } from '../equation/expression.ts';
import {
  type BindingRequest,
  type BoundEquations,
  bindEquations,
  type InputWiring,
  parameterSymbols,
} from './bind-equations.ts';
import type { KindDeclaration, Requirement } from './kind.ts';
import { bindSurroundings, type Surroundings, surroundingSymbols } from './surroundings.ts';

/** Values of a block's parameters, SI base units or words, by name. */
export type ParameterValues = Readonly<Record<string, number | string>>;

/** How a block stands in its patch. */
export interface BlockSetting {
  readonly values: ParameterValues;
  readonly surroundings: Surroundings;
  readonly wiring: (port: string) => InputWiring;
  /** Sum of 1/R at a node input, S. */
  readonly conductance: (port: string) => number;
}

/** A block's equations as they stand in its patch, and the values of their set-up leaves. */
export interface SetUpBlock {
  readonly bound: BoundEquations;
  readonly bindings: ReadonlyMap<Expression, number>;
}

/** Writes down a block's equations with its values: the variant its parameters and wires ask for. */
export function setUpBlock(declaration: KindDeclaration, setting: BlockSetting): SetUpBlock {
  const bound = bindEquations(declaration, bindingRequest(setting));
  return { bound, bindings: bindLeaves(bound, setting) };
}

/** Values of the leaves that stand still during a run: parameters, surroundings, conductances of nodes. */
export function bindLeaves(
  { parameters, surroundings, conductances }: StillLeaves,
  setting: BlockSetting,
): Map<Expression, number> {
  const bindings = bindSurroundings(surroundings, setting.surroundings);
  for (const [name, symbol] of parameters) bindings.set(symbol, setting.values[name] as number);
  for (const [port, symbol] of conductances) bindings.set(symbol, setting.conductance(port));
  return bindings;
}

/** How a kind's symbols are asked for where it stands in a patch. */
export function bindingRequest(setting: BlockSetting): BindingRequest {
  return {
    words: wordsOf(setting.values),
    wiring: setting.wiring,
    decide: (expression, leaves) => evaluate(expression, bindLeaves(leaves, setting)) === 0,
  };
}

type StillLeaves = Pick<BoundEquations, 'parameters' | 'surroundings' | 'conductances'>;

/**
 * Resistances of a block's ports in ohms, by port: an input not named is infinite, an output not
 * named is buffered (0).
 */
export function resistancesOf(
  declaration: KindDeclaration,
  values: ParameterValues,
  surroundings: Surroundings,
): Readonly<Record<string, number>> {
  if (declaration.resistances === undefined) return {};
  const { bindings, symbols } = plainSymbols(declaration, values, surroundings);
  const given = (declaration.resistances as (symbols: unknown) => Record<string, Expression>)(symbols);
  return Object.fromEntries(Object.entries(given).map(([port, value]) => [port, evaluate(value, bindings)]));
}

/** What the broken rules between a block's parameters say. */
export function brokenRules(
  declaration: KindDeclaration,
  values: ParameterValues,
  surroundings: Surroundings,
): string[] {
  if (declaration.requires === undefined) return [];
  const { bindings, symbols } = plainSymbols(declaration, values, surroundings);
  const rules = (declaration.requires as (symbols: unknown) => readonly Requirement[])(symbols);
  return rules.filter(({ holds }) => evaluate(holds, bindings) === 0).map(({ says }) => says);
}

function plainSymbols(
  declaration: KindDeclaration,
  values: ParameterValues,
  surroundings: Surroundings,
): { bindings: Map<Expression, number>; symbols: unknown } {
  const around = surroundingSymbols();
  const { leaves, values: symbols } = parameterSymbols(declaration, wordsOf(values));
  const bindings = bindSurroundings(around, surroundings);
  for (const [name, symbol] of leaves) bindings.set(symbol, values[name] as number);
  return { bindings, symbols: { ...symbols, ...around } };
}

function wordsOf(values: ParameterValues): Record<string, string> {
  return Object.fromEntries(
    Object.entries(values).flatMap(([name, value]) => (typeof value === 'string' ? [[name, value]] : [])),
  );
}
