import { bindOperation } from '../block/bind-operation.ts';
import { bindingRequest, bindLeaves, setUpBlock } from '../block/set-up.ts';
import { tangent } from '../equation/differentiate.ts';
import { evaluate } from '../equation/evaluate.ts';
import { constant, type Expression } from '../equation/expression.ts';
import type { EquationNode } from '../equation/node.ts';
import type { Patch } from '../patch/patch.ts';
import type { PlacedBlock } from '../patch/placed.ts';
import { portName } from '../patch/wire.ts';
import { dimensions } from '../quantity/dimension.ts';
import { settingOf, sourcesOf } from './assemble.ts';

/** How an output current follows an input voltage at an instant. */
export interface TransconductancePoint {
  /** The input and the output, `block.port`. */
  readonly from: string;
  readonly to: string;
  /** ∂I/∂V in siemens, exact. */
  readonly transconductance: number;
}

/** What a block's kind says of it at an instant, in numbers. */
export interface OperatingBlock {
  readonly limits: ReadonlyMap<string, { readonly min?: number; readonly max?: number }>;
  /** V at node inputs that are no virtual ground. */
  readonly potentials: ReadonlyMap<string, number>;
  /** Sum of 1/R at each node input with resistors, S. */
  readonly conductances: ReadonlyMap<string, number>;
  readonly gains: readonly TransconductancePoint[];
}

/**
 * Evaluates limits, potentials and transconductances of a block.
 *
 * @param outputValue value of an output of the patch at the instant, by its name
 */
export function operatingBlock(
  block: PlacedBlock,
  patch: Patch,
  time: number,
  outputValue: (output: string) => number,
): OperatingBlock {
  const { declaration, name } = block;
  const setting = settingOf(block, patch);
  const bound = bindOperation(declaration, bindingRequest(setting));
  const arriving = (port: string, part: 'direct' | 'drive'): number =>
    sourcesOf(patch, block, port, part).reduce(
      (sum, { name: from, gain }) => sum + gain * outputValue(from),
      0,
    );
  const bindings = bindLeaves(bound, setting).set(bound.surroundings.time, time);
  for (const { symbol, port, part } of bound.inputs) bindings.set(symbol, arriving(port, part));
  for (const [port, symbol] of bound.outputs)
    bindings.set(symbol, outputValue(portName({ block: name, port })));

  const value = (expression: Expression): number => evaluate(expression, bindings);
  return {
    limits: new Map(
      [...bound.limits].map(([port, { min, max }]) => [
        port,
        { ...(min && { min: value(min) }), ...(max && { max: value(max) }) },
      ]),
    ),
    potentials: new Map([...bound.potentials].map(([port, expression]) => [port, value(expression)])),
    conductances: new Map([...bound.conductances].map(([port, expression]) => [port, value(expression)])),
    gains: declaration.equations === undefined ? [] : gainsOf(block, patch, time, arriving),
  };
}

function gainsOf(
  block: PlacedBlock,
  patch: Patch,
  time: number,
  arriving: (port: string, part: 'direct' | 'drive') => number,
): TransconductancePoint[] {
  const { declaration, name } = block;
  const { bound, bindings: still } = setUpBlock(declaration, settingOf(block, patch));
  const bindings = new Map(still).set(bound.surroundings.time, time);
  for (const { symbol, port, part } of bound.inputs) bindings.set(symbol, arriving(port, part));

  const currents = Object.entries(declaration.outputs).filter(([, { quantity }]) => quantity === 'current');
  const voltages = bound.inputs.filter(({ port }) => declaration.inputs[port]?.quantity === 'voltage');
  return currents.flatMap(([to]) =>
    voltages.flatMap(({ port: from, symbol }): TransconductancePoint[] => {
      const seeds = new Map([[symbol, constant(1)]]);
      const slope = tangent(bound.equations.outputs[to]!, seeds, dimensions.voltage);
      if (remembers(slope)) return [];
      const [input, output] = [from, to].map((port) => portName({ block: name, port })) as [string, string];
      return [{ from: input, to: output, transconductance: evaluate(slope, bindings) }];
    }),
  );
}

/** Whether an expression takes part of its value from memory, which is not looked into here. */
function remembers(root: EquationNode): boolean {
  const seen = new Set<EquationNode>();
  const visit = (node: EquationNode): boolean => {
    if (seen.has(node)) return false;
    seen.add(node);
    return node.role === 'state' || node.role === 'held' || node.args.some(visit);
  };
  return visit(root);
}
