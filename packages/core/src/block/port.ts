import { type Dimension, dimensions } from '../quantity/dimension.ts';

/**
 * What a port carries: a voltage, a current, or (inputs only) a node at which currents sum and
 * voltages come in through resistors.
 */
export type PortQuantity = 'voltage' | 'current' | 'node';

/** A port of a block kind. */
export interface PortDeclaration<
  Q extends PortQuantity = PortQuantity,
  Symbol extends string | undefined = string | undefined,
> {
  readonly quantity: Q;
  /** An optional input may stay unwired and then reads 0 V or 0 A. */
  readonly optional: boolean;
  /** Name of the port in the equations, where it is not its own. */
  readonly symbol: Symbol;
  readonly doc: string;
}

/** What a port's declaration may say. */
export interface PortOptions<Symbol extends string | undefined> {
  /** Input only: may stay unwired. */
  readonly optional?: boolean;
  /** Name in the equations, where a parameter already has the port's own. */
  readonly symbol?: Symbol;
  /** What the port is for, in one line. */
  readonly doc?: string;
}

/** A voltage port, buffered (outputs) or of infinite resistance (inputs) unless `resistances` says otherwise. */
export function voltage<const S extends string | undefined = undefined>(
  options: PortOptions<S> = {},
): PortDeclaration<'voltage', S> {
  return port('voltage', options);
}

/** A current port. */
export function current<const S extends string | undefined = undefined>(
  options: PortOptions<S> = {},
): PortDeclaration<'current', S> {
  return port('current', options);
}

/**
 * A node input: currents come in directly, voltages through a resistor. The equations see
 * `current` (sum of the currents), `drive` (sum of V/R) and `conductance` (sum of 1/R).
 */
export function node<const S extends string | undefined = undefined>(
  options: PortOptions<S> = {},
): PortDeclaration<'node', S> {
  return port('node', options);
}

function port<Q extends PortQuantity, S extends string | undefined>(
  quantity: Q,
  { optional = false, symbol, doc = '' }: PortOptions<S>,
): PortDeclaration<Q, S> {
  return { quantity, optional, symbol: symbol as S, doc };
}

/** Dimension of the signal at a voltage or current port. */
export function portDimension(quantity: 'voltage' | 'current'): Dimension {
  return quantity === 'voltage' ? dimensions.voltage : dimensions.current;
}
