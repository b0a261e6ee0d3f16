import type { PortQuantity } from '../block/port.ts';
import type { Patch } from '../patch/patch.ts';
import type { PlacedBlock } from '../patch/placed.ts';
import { portName } from '../patch/wire.ts';
import { dimensions } from '../quantity/dimension.ts';
import { requireRange } from '../quantity/guard.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';
import { sourcesOf } from './assemble.ts';
import { breather } from './breathe.ts';
import { Machine } from './machine.ts';
import { type OperatingBlock, operatingBlock, type TransconductancePoint } from './operating-block.ts';
import { requireGoing } from './run.ts';
import { type RunOptions, readOptions } from './run-options.ts';

/** One port at an instant. */
export interface PortPoint {
  /** `block.port`. */
  readonly port: string;
  readonly kind: string;
  readonly side: 'input' | 'output';
  readonly quantity: PortQuantity;
  /** Whether a wire ends or starts here. */
  readonly wired: boolean;
  /** V; null at a current port, whose voltage is whatever its circuit makes it. */
  readonly voltage: number | null;
  /** A; at a node what flows into it, at a voltage port null. */
  readonly current: number | null;
  /** Limits within which the port works as meant, in V, or A where it carries a current; null for none. */
  readonly min: number | null;
  readonly max: number | null;
  /** How far the nearer limit is away; negative beyond it, null where there is none. */
  readonly margin: number | null;
}

/** A patch at an instant. */
export interface OperatingPoint {
  /** s; the instant asked for, to the nearest internal sample. */
  readonly time: number;
  /** Every port, in the order of the patch. */
  readonly ports: readonly PortPoint[];
  readonly gains: readonly TransconductancePoint[];
}

/** What an operating point is told. */
export interface OperatingPointOptions
  extends Pick<RunOptions<never>, 'rate' | 'oversample' | 'signal' | 'edges' | 'chunk' | 'backEnd'> {
  /** The instant: a text such as `1 s`, or seconds; at least 0. Default 1 s. */
  readonly at?: string | number;
  /** Told from time to time how much is done, 0 … 1. */
  readonly onProgress?: (done: number) => void;
}

/**
 * Runs a patch from rest to an instant and tells the voltage or current of every port there, what is left
 * to its limits, and the transconductance of every current output by the voltage inputs of its block
 * (where it does not go through memory), differentiated from the block's own equations.
 *
 * @throws TailpairError as `simulate`
 */
export async function operatingPoint(
  patch: Patch,
  options: OperatingPointOptions = {},
): Promise<OperatingPoint> {
  const { at = 1, signal, onProgress } = options;
  const { rate, oversample, chunk, backEnd, carry } = readOptions({ ...options, probes: [] });
  const seconds = requireRange(parseQuantity(at, dimensions.time, { where: 'at', bare: true }), {
    where: 'at',
    unit: dimensions.time,
    min: 0,
  });
  const internal = rate * oversample;
  const total = Math.round(seconds * internal);
  const machine = new Machine(patch, { rate: internal, chunk, backEnd, carry });
  machine.start();
  const breathe = breather();
  for (let done = 0; done < total; ) {
    const count = Math.min(chunk, total - done);
    machine.advance(count);
    machine.rotate(count);
    done += count;
    requireGoing(signal, done / internal);
    onProgress?.(done / total);
    await breathe();
  }
  const time = total / internal;
  const outputValue = (output: string): number => machine.output(output)!.values[0]!;
  const blocks = patch.blocks.map((block) => operatingBlock(block, patch, time, outputValue));
  return {
    time,
    ports: patch.blocks.flatMap((block, i) => portsOf(block, patch, blocks[i]!, outputValue)),
    gains: blocks.flatMap(({ gains }) => gains),
  };
}

function portsOf(
  block: PlacedBlock,
  patch: Patch,
  { limits, potentials, conductances }: OperatingBlock,
  outputValue: (output: string) => number,
): PortPoint[] {
  const { kind, inputs, outputs } = block.declaration;
  const point = (
    port: string,
    own: Pick<PortPoint, 'side' | 'quantity' | 'wired' | 'voltage' | 'current'>,
  ): PortPoint => {
    const value = (own.quantity === 'voltage' ? own.voltage : own.current)!;
    const { min = null, max = null } =
      (own.wired || own.side === 'output' ? limits.get(port) : undefined) ?? {};
    const room = Math.min(
      value - (min ?? Number.NEGATIVE_INFINITY),
      (max ?? Number.POSITIVE_INFINITY) - value,
    );
    const margin = Number.isFinite(room) ? room : null;
    return { port: portName({ block: block.name, port }), kind, ...own, min, max, margin };
  };
  const arrivals = Object.entries(inputs).map(([port, { quantity }]) => {
    const sources = sourcesOf(patch, block, port);
    const arriving = sources.reduce((sum, { name, gain }) => sum + gain * outputValue(name), 0);
    const potential = potentials.get(port) ?? 0;
    const voltage = { voltage: arriving, current: null, node: potential }[quantity];
    const inflow = arriving - potential * (conductances.get(port) ?? 0);
    const current = { voltage: null, current: arriving, node: inflow }[quantity];
    return point(port, { side: 'input', quantity, wired: sources.length > 0, voltage, current });
  });
  const departures = Object.entries(outputs).map(([port, { quantity }]) => {
    const value = outputValue(portName({ block: block.name, port }));
    const [voltage, current] = quantity === 'voltage' ? [value, null] : [null, value];
    const wired = patch.wires.some(({ from }) => from.block === block.name && from.port === port);
    return point(port, { side: 'output', quantity, wired, voltage, current });
  });
  return [...arrivals, ...departures];
}
