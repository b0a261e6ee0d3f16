import type { PortQuantity } from '../block/port.ts';

/** An output of a block in a patch, as the wiring function sees it. */
export interface OutputHandle<Q extends 'voltage' | 'current' = 'voltage' | 'current'> {
  readonly side: 'output';
  readonly quantity: Q;
  readonly block: string;
  readonly port: string;
}

/** An input of a block in a patch. */
export interface InputHandle<Q extends PortQuantity = PortQuantity> {
  readonly side: 'input';
  readonly quantity: Q;
  readonly block: string;
  readonly port: string;
}

/** The resistor of a wire into a node: a real part, as text (`120k 1%`) or in ohms. */
export interface Via {
  readonly via: string | number;
}

/** A wire: output → input, at a node through a resistor where the output is a voltage. */
export interface Wire {
  readonly from: OutputHandle;
  readonly to: InputHandle;
  readonly via: string | number | undefined;
}

/** Joins a voltage output to a voltage input. */
export function wire(from: OutputHandle<'voltage'>, to: InputHandle<'voltage'>): Wire;
/** Joins a current output to a current input, where currents sum. */
export function wire(from: OutputHandle<'current'>, to: InputHandle<'current'>): Wire;
/** Joins a current output to a node, directly. */
export function wire(from: OutputHandle<'current'>, to: InputHandle<'node'>): Wire;
/** Joins a voltage output to a node through a resistor. */
export function wire(from: OutputHandle<'voltage'>, to: InputHandle<'node'>, through: Via): Wire;
export function wire(from: OutputHandle, to: InputHandle, through?: Via): Wire {
  return { from, to, via: through?.via };
}

/** `block.port`, as messages and probes name a port. */
export function portName({ block, port }: { readonly block: string; readonly port: string }): string {
  return `${block}.${port}`;
}
