import type { Expression } from '../equation/expression.ts';
import { type Dimension, dimensions, formatDimension, sameDimension } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import type { BindingRequest } from './bind-equations.ts';
import { bindOperation } from './bind-operation.ts';
import type { KindDeclaration } from './kind.ts';
import { portDimension } from './port.ts';

/** Checks what a declaration says of its ports at an operating point: that they exist, and the units. */
export function checkOperation(
  declaration: KindDeclaration,
  request: Pick<BindingRequest, 'words' | 'wiring'>,
): void {
  const { kind, inputs, outputs } = declaration;
  const { limits, potentials } = bindOperation(declaration, { ...request, decide: () => false });
  const wrong = (message: string): TailpairError =>
    new TailpairError('declaration', message, { where: kind });
  const demand = (what: string, value: Expression | undefined, dimension: Dimension): void => {
    if (value === undefined || sameDimension(value.dimension, dimension)) return;
    const [is, must] = [value.dimension, dimension].map(formatDimension);
    throw new TailpairError('dimension', `${what} = ${value} is in ${is}; it must be in ${must}`, {
      where: kind,
    });
  };
  for (const [port, { min, max }] of limits) {
    const declared = inputs[port] ?? outputs[port];
    if (declared === undefined) throw wrong(`limits names ${port}, which is no port`);
    const { quantity } = declared;
    const dimension = quantity === 'node' ? dimensions.current : portDimension(quantity);
    demand(`the lower limit of ${port}`, min, dimension);
    demand(`the upper limit of ${port}`, max, dimension);
  }
  for (const [port, value] of potentials) {
    if (inputs[port]?.quantity !== 'node') throw wrong(`potentials names ${port}, which is no node input`);
    demand(`the potential of ${port}`, value, dimensions.voltage);
  }
}
