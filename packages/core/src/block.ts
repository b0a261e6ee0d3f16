/**
 * For authors of block kinds: declare the ports and parameters of a stage and write its equations
 * in continuous time.
 *
 * @packageDocumentation
 */

export { boltzmannConstant, elementaryCharge, zeroCelsius } from './quantity/constants.ts';
export { type Dimension, dimensions } from './quantity/dimension.ts';
export { Condition } from './equation/condition.ts';
export {
  type Assignment,
  held,
  isZero,
  onCrossing,
  type StateLimits,
  set,
  state,
  states,
} from './equation/declare.ts';
export { constant, Expression, type Operand } from './equation/expression.ts';
export type { EquationNode, LeafRole, LogicOp, NumericOp } from './equation/node.ts';
export { cos, exp, exp2, floor, log, select, sin, sqrt, tanh } from './equation/functions.ts';
export { solve } from './equation/solve.ts';
export { type BlockDefinition, defineBlock } from './block/define-block.ts';
export { type DescribedEquations, describeEquations, type EquationLine } from './block/describe-equations.ts';
export type {
  Block,
  BlockKind,
  EquationSymbols,
  GivenParameters,
  Inputs,
  KindDeclaration,
  NodeSymbols,
  OperatingSymbols,
  Outputs,
  ParameterSymbol,
  ParameterSymbols,
  Parameters,
  PlainKernel,
  PlainKernelContext,
  PortLimits,
  PortSymbol,
  Requirement,
} from './block/kind.ts';
export {
  amperes,
  type ChoiceParameter,
  choice,
  count,
  farads,
  hertz,
  hertzPerVolt,
  type NumberOptions,
  type NumberParameter,
  ohms,
  type Parameter,
  type ParameterValue,
  ratio,
  seconds,
  volts,
} from './block/parameter.ts';
export {
  current,
  node,
  type PortDeclaration,
  type PortOptions,
  type PortQuantity,
  voltage,
} from './block/port.ts';
export type { SurroundingSymbols } from './block/surroundings.ts';
