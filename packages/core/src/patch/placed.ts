import type { KindDeclaration } from '../block/kind.ts';
import type { ParameterValue } from '../block/parameter.ts';

/** A block placed in a patch: named, with all its parameters read. */
export interface PlacedBlock {
  readonly name: string;
  readonly declaration: KindDeclaration;
  readonly parameters: Readonly<Record<string, ParameterValue>>;
}

/** A wire of a patch with its resistor read. */
export interface PlacedWire {
  readonly from: { readonly block: string; readonly port: string };
  readonly to: { readonly block: string; readonly port: string };
  /** Resistor of a wire from a voltage into a node: ohms, and its tolerance as a ratio. */
  readonly via: { readonly value: number; readonly tolerance?: number } | undefined;
}

/** Something worth knowing that is no fault. */
export interface Warning {
  readonly code: 'loading';
  /** The wire or port concerned. */
  readonly where: string;
  readonly message: string;
}
