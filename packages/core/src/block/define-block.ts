import type { Expression } from '../equation/expression.ts';
import { checkDeclaration } from './check-declaration.ts';
import type {
  Block,
  BlockKind,
  EquationSymbols,
  GivenParameters,
  Inputs,
  KindDeclaration,
  OperatingSymbols,
  Outputs,
  ParameterSymbols,
  Parameters,
  PlainKernel,
  PlainKernelContext,
  PortLimits,
  Requirement,
} from './kind.ts';

/** A kind as its author declares it: the face, and either equations or a plain kernel. */
export interface BlockDefinition<I extends Inputs, O extends Outputs, P extends Parameters> {
  /** Name of the kind, as a patch file writes it. */
  readonly kind: string;
  /** What the stage does, in one line. */
  readonly summary: string;
  readonly inputs: I;
  readonly outputs: O;
  readonly params: P;
  /** Input resistance of voltage inputs (infinite where left out) and source resistance of outputs (0 where left out). */
  readonly resistances?: (values: ParameterSymbols<P>) => { readonly [K in keyof I | keyof O]?: Expression };
  /**
   * Limits within which ports work as meant, by port: what is left to them is the margin of an operating
   * point. They may depend on other ports. Nothing is limited by them: that is for the equations.
   */
  readonly limits?: (symbols: OperatingSymbols<I, O, P>) => {
    readonly [K in keyof I | keyof O]?: PortLimits;
  };
  /** Voltage of node inputs, for operating points; 0 V, a virtual ground, where left out. */
  readonly potentials?: (symbols: OperatingSymbols<I, O, P>) => { readonly [K in keyof I]?: Expression };
  /** Rules between parameters. */
  readonly requires?: (values: ParameterSymbols<P>) => readonly Requirement[];
  /** The physics, in continuous time. */
  readonly equations?: (symbols: EquationSymbols<I, P>) => { readonly [K in keyof O]: Expression };
  /** For what is no equation (a recording, a list of notes): a loop over samples. */
  readonly kernel?: (context: PlainKernelContext) => PlainKernel;
}

/**
 * Defines a kind of block from its declaration. Equations are traced here once for every variant,
 * so that a mistake in them throws at once.
 *
 * @returns the kind: call it with parameters to make a block for a patch
 * @throws TailpairError `declaration` where the declaration contradicts itself, `dimension` where
 *   its equations add, compare or bend what does not fit
 */
export function defineBlock<const I extends Inputs, const O extends Outputs, const P extends Parameters>(
  definition: BlockDefinition<I, O, P>,
): BlockKind<I, O, P> {
  const declaration = Object.freeze({ ...definition }) as unknown as KindDeclaration & {
    inputs: I;
    outputs: O;
    params: P;
  };
  checkDeclaration(declaration);
  const make = (params: GivenParameters<P> = {}): Block<I, O> => ({ kind, given: { ...params } });
  const kind: BlockKind<I, O, P> = Object.assign(make, { declaration });
  return kind;
}
