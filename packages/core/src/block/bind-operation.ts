import { recordEquations } from '../equation/declare.ts';
import { type Expression, leaf, operandIn } from '../equation/expression.ts';
import { dimensions } from '../quantity/dimension.ts';
import { type BindingRequest, type BoundSymbols, bindSymbols } from './bind-equations.ts';
import type { KindDeclaration, PortLimits } from './kind.ts';
import { type PortQuantity, portDimension } from './port.ts';

/** What a kind says about its ports at an operating point, with the leaves it is written in. */
export interface BoundOperation extends Omit<BoundSymbols, 'symbols'> {
  /** Leaf of each output. */
  readonly outputs: ReadonlyMap<string, Expression>;
  readonly limits: ReadonlyMap<string, { readonly min?: Expression; readonly max?: Expression }>;
  readonly potentials: ReadonlyMap<string, Expression>;
}

/** Writes down the limits and potentials of a kind for the given wiring and words. */
export function bindOperation(declaration: KindDeclaration, request: BindingRequest): BoundOperation {
  const { symbols: inner, ...bound } = bindSymbols(declaration, request);
  const symbols: Record<string, unknown> = { ...inner };
  const outputs = new Map<string, Expression>();
  for (const [port, { quantity, symbol = port }] of Object.entries(declaration.outputs)) {
    const output = leaf('input', symbol, portDimension(quantity));
    outputs.set(port, output);
    symbols[symbol] = output;
  }
  const limits = new Map<string, { min?: Expression; max?: Expression }>();
  const potentials = new Map<string, Expression>();
  const write = (): Record<string, Expression> => {
    for (const [port, given] of ask<PortLimits>(declaration.limits, symbols)) {
      limits.set(port, limitsOf(declaration, port, given));
    }
    for (const [port, given] of ask<Expression>(declaration.potentials, symbols)) potentials.set(port, given);
    return {};
  };
  // Recorded only so that `isZero` can be asked.
  recordEquations(write, (expression) => request.decide(expression, bound));
  return { ...bound, outputs, limits, potentials };
}

function ask<T>(
  write: ((symbols: never) => Readonly<Record<string, T | undefined>>) | undefined,
  symbols: unknown,
): [string, T][] {
  const given = Object.entries((write as ((symbols: unknown) => object) | undefined)?.(symbols) ?? {});
  return given.filter(([, value]) => value !== undefined);
}

function limitsOf(
  { inputs, outputs }: KindDeclaration,
  port: string,
  { min, max }: PortLimits,
): { min?: Expression; max?: Expression } {
  const quantity: PortQuantity = (inputs[port] ?? outputs[port])?.quantity ?? 'voltage';
  const dimension = quantity === 'node' ? dimensions.current : portDimension(quantity);
  return {
    ...(min === undefined ? {} : { min: operandIn(dimension, min) }),
    ...(max === undefined ? {} : { max: operandIn(dimension, max) }),
  };
}
