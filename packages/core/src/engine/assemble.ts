import { type SetUpBlock, setUpBlock } from '../block/set-up.ts';
import type { BackEnd, Clock, Kernel } from '../equation/kernel/kernel.ts';
import { lower } from '../equation/lower.ts';
import type { Program } from '../equation/program.ts';
import type { Patch } from '../patch/patch.ts';
import type { PlacedBlock, PlacedWire } from '../patch/placed.ts';
import { plainValues } from '../patch/read-blocks.ts';
import { portName } from '../patch/wire.ts';
import { schedule } from '../schedule/schedule.ts';
import { blockKernel } from './block-kernel.ts';
import { type Gather, gather } from './gather.ts';
import type { OutputBuffers } from './output-buffers.ts';
import { plainKernel } from './plain-kernel.ts';

/** One block of a machine, with the sums to be formed before it runs. */
export interface Stage {
  readonly name: string;
  readonly gathers: readonly Gather[];
  readonly kernel: Kernel;
  readonly outputs: readonly OutputBuffers[];
}

/** Everything a machine runs on. */
export interface Assembly {
  readonly stages: readonly Stage[];
  readonly outputs: ReadonlyMap<string, OutputBuffers>;
  /** Every buffer there is. */
  readonly buffers: readonly Float64Array[];
}

interface Lowered extends SetUpBlock {
  readonly program: Program;
}

const nothing = new Float64Array(0);

/** Compiles the blocks of a patch and joins them by buffers of `chunk` + 1 samples. */
export function assemble(patch: Patch, clock: Clock, chunk: number, backEnd: BackEnd): Assembly {
  const { order } = schedule(patch);
  const { lowered, slopesOf } = lowerAll(order, patch);
  const outputs = new Map<string, OutputBuffers>();
  const buffers: Float64Array[] = [];
  const allocate = (): Float64Array => {
    const buffer = new Float64Array(chunk + 1);
    buffers.push(buffer);
    return buffer;
  };

  const stages = order.map((block): Stage => {
    const gathers: Gather[] = [];
    const input = (sources: readonly Source[], take: (from: OutputBuffers) => Float64Array): Float64Array => {
      const [only] = sources;
      if (sources.length === 1 && only!.gain === 1) return take(outputs.get(only!.name)!);
      const target = allocate();
      gathers.push(
        gather(
          sources.map(({ name, gain }) => ({ buffer: take(outputs.get(name)!), gain })),
          target,
        ),
      );
      return target;
    };
    const own = Object.entries(block.declaration.outputs).map(([port, { quantity }]): OutputBuffers => {
      const name = portName({ block: block.name, port });
      const slopes = slopesOf.has(name) ? allocate() : nothing;
      return { name, unit: quantity === 'voltage' ? 'V' : 'A', values: allocate(), slopes };
    });
    const ready = lowered.get(block);
    const kernel =
      ready === undefined
        ? plainKernel(
            block,
            (port) => input(sourcesOf(patch, block, port), ({ values }) => values),
            own,
            clock,
          )
        : blockKernel(
            ready.program,
            ready.bindings,
            inputPorts(ready, patch, block, input, own),
            clock,
            backEnd,
          );
    for (const output of own) outputs.set(output.name, output);
    return { name: block.name, gathers, kernel, outputs: own };
  });
  return { stages, outputs, buffers };
}

/** Lowers all blocks from the last to the first, so that each knows whose slopes are asked of it. */
function lowerAll(
  order: readonly PlacedBlock[],
  patch: Patch,
): { lowered: ReadonlyMap<PlacedBlock, Lowered>; slopesOf: ReadonlySet<string> } {
  const lowered = new Map<PlacedBlock, Lowered>();
  const slopesOf = new Set<string>();
  for (const block of [...order].reverse()) {
    if (block.declaration.equations === undefined) continue;
    const ready = setUp(block, patch);
    const { bound } = ready;
    const program = lower(bound.equations, {
      inputs: bound.inputs.map(({ symbol }) => symbol),
      time: bound.surroundings.time,
      slopesOf: new Set(
        Object.keys(block.declaration.outputs).filter((port) =>
          slopesOf.has(portName({ block: block.name, port })),
        ),
      ),
    });
    bound.inputs.forEach(({ port, part }, i) => {
      if (program.slopesWanted[i])
        for (const { name } of sourcesOf(patch, block, port, part)) slopesOf.add(name);
    });
    lowered.set(block, { ...ready, program });
  }
  return { lowered, slopesOf };
}

function setUp(block: PlacedBlock, patch: Patch): SetUpBlock {
  return setUpBlock(block.declaration, {
    values: plainValues(block.parameters),
    surroundings: patch.surroundings,
    wiring: (port) => ({
      direct: sourcesOf(patch, block, port, 'direct').length > 0,
      resistors: sourcesOf(patch, block, port, 'drive').length > 0,
    }),
    conductance: (port) => sourcesOf(patch, block, port, 'drive').reduce((sum, { gain }) => sum + gain, 0),
  });
}

interface Source {
  /** Output it comes from, `block.port`. */
  readonly name: string;
  /** 1, or the conductance of the wire's resistor. */
  readonly gain: number;
}

/** What comes into a port: directly, through resistors, or (where `part` is left out) both. */
function sourcesOf(patch: Patch, block: PlacedBlock, port: string, part?: 'direct' | 'drive'): Source[] {
  const into = ({ to, via }: PlacedWire): boolean =>
    to.block === block.name &&
    to.port === port &&
    (part === undefined || (part === 'drive') === (via !== undefined));
  return patch.wires.filter(into).map(({ from, via }) => ({
    name: portName(from),
    gain: via === undefined ? 1 : 1 / via.value,
  }));
}

type InputOf = (sources: readonly Source[], take: (from: OutputBuffers) => Float64Array) => Float64Array;

function inputPorts(
  { bound, program }: Lowered,
  patch: Patch,
  block: PlacedBlock,
  input: InputOf,
  own: readonly OutputBuffers[],
): Parameters<typeof blockKernel>[2] {
  return {
    inputs: bound.inputs.map(({ port, part }) =>
      input(sourcesOf(patch, block, port, part), ({ values }) => values),
    ),
    inputSlopes: bound.inputs.map(({ port, part }, i) =>
      program.slopesWanted[i] ? input(sourcesOf(patch, block, port, part), ({ slopes }) => slopes) : nothing,
    ),
    outputs: own.map(({ values }) => values),
    outputSlopes: own.map(({ slopes }) => slopes),
  };
}
