import { type BlockSetting, type SetUpBlock, setUpBlock } from '../block/set-up.ts';
import { findCorners } from '../equation/corners.ts';
import type { Expression } from '../equation/expression.ts';
import { EdgeList } from '../equation/kernel/edge-list.ts';
import type { BackEnd, Clock, Kernel } from '../equation/kernel/kernel.ts';
import { lower } from '../equation/lower.ts';
import type { Program } from '../equation/program.ts';
import type { Patch } from '../patch/patch.ts';
import type { PlacedBlock, PlacedWire } from '../patch/placed.ts';
import { plainValues } from '../patch/read-blocks.ts';
import { portName } from '../patch/wire.ts';
import { schedule } from '../schedule/schedule.ts';
import { blockKernel } from './block-kernel.ts';
import { type Gather, gather, gatherEdges } from './gather.ts';
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
  /** Compiled blocks by name. */
  readonly compiled: ReadonlyMap<string, CompiledBlock>;
  /** Every buffer there is. */
  readonly buffers: readonly Float64Array[];
}

interface Lowered extends SetUpBlock {
  readonly program: Program;
}

/** A block's program with its values, and what comes into each of its inputs. */
export interface CompiledBlock {
  readonly program: Program;
  readonly bindings: ReadonlyMap<Expression, number>;
  readonly sources: readonly (readonly Source[])[];
}

const nothing = new Float64Array(0);

/** How the blocks of a patch are compiled and joined. */
export interface AssemblyOptions {
  /** Samples in a full chunk. */
  readonly chunk: number;
  readonly backEnd: BackEnd;
  /** Whether edges are carried from block to block. */
  readonly carry: boolean;
}

/** Compiles the blocks of a patch and joins them by buffers of `chunk` + 1 samples. */
export function assemble(patch: Patch, clock: Clock, { chunk, backEnd, carry }: AssemblyOptions): Assembly {
  const { order } = schedule(patch);
  const { lowered, slopesOf } = lowerAll(order, patch, carry);
  const outputs = new Map<string, OutputBuffers>();
  const buffers: Float64Array[] = [];
  const allocate = (): Float64Array => {
    const buffer = new Float64Array(chunk + 1);
    buffers.push(buffer);
    return buffer;
  };

  const stages = order.map((block): Stage => {
    const gathers: Gather[] = [];
    const own = Object.entries(block.declaration.outputs).map(([port, { quantity }]): OutputBuffers => {
      const name = portName({ block: block.name, port });
      const slopes = slopesOf.has(name) ? allocate() : nothing;
      return {
        name,
        unit: quantity === 'voltage' ? 'V' : 'A',
        values: allocate(),
        slopes,
        edges: new EdgeList(),
      };
    });
    const input = (sources: readonly Source[], sloped: boolean): InputBuffers => {
      const from = sources.map(({ name, gain }) => ({ from: outputs.get(name)!, gain }));
      const [only] = from;
      if (from.length === 1 && only!.gain === 1) return only!.from;
      const sum = { values: allocate(), slopes: sloped ? allocate() : nothing, edges: new EdgeList() };
      const buffers = (key: 'values' | 'slopes'): { buffer: Float64Array; gain: number }[] =>
        from.map(({ from: source, gain }) => ({ buffer: source[key], gain }));
      gathers.push(gather(buffers('values'), sum.values));
      if (sloped) gathers.push(gather(buffers('slopes'), sum.slopes));
      if (carry) gathers.push(gatherEdges(from, sum.edges, clock));
      return sum;
    };
    const ready = lowered.get(block);
    let kernel: Kernel;
    if (ready === undefined) {
      kernel = plainKernel(block, (port) => input(sourcesOf(patch, block, port), false).values, own, clock);
    } else {
      const { bound, program } = ready;
      const inputs = bound.inputs.map(({ port, part }, i) =>
        input(sourcesOf(patch, block, port, part), program.slopesWanted[i]!),
      );
      const ports = {
        inputs: inputs.map(({ values }) => values),
        inputSlopes: inputs.map(({ slopes }, i) => (program.slopesWanted[i] ? slopes : nothing)),
        inputEdges: inputs.map(({ edges }) => edges),
        outputs: own.map(({ values }) => values),
        outputSlopes: own.map(({ slopes }) => slopes),
        outputEdges: own.map(({ edges }) => edges),
      };
      kernel = blockKernel(program, ready.bindings, ports, clock, backEnd, carry);
    }
    for (const output of own) outputs.set(output.name, output);
    return { name: block.name, gathers, kernel, outputs: own };
  });
  const compiled = new Map(
    [...lowered].map(([block, { program, bindings, bound }]) => {
      const sources = bound.inputs.map(({ port, part }) => sourcesOf(patch, block, port, part));
      return [block.name, { program, bindings, sources }];
    }),
  );
  return { stages, outputs, compiled, buffers };
}

type InputBuffers = Pick<OutputBuffers, 'values' | 'slopes' | 'edges'>;

/** Lowers all blocks from the last to the first, so that each knows whose slopes are asked of it. */
function lowerAll(
  order: readonly PlacedBlock[],
  patch: Patch,
  carry: boolean,
): { lowered: ReadonlyMap<PlacedBlock, Lowered>; slopesOf: ReadonlySet<string> } {
  const ready = new Map<PlacedBlock, SetUpBlock>();
  const edged = new Set<string>();
  for (const block of order) {
    if (block.declaration.equations === undefined) continue;
    const set = setUp(block, patch);
    ready.set(block, set);
    const { crossings, states, outputs } = set.bound.equations;
    const makes =
      crossings.length > 0 ||
      findCorners([...Object.values(outputs), ...states.map(({ slope }) => slope)]).length > 0;
    if (carry && (makes || takesEdges(block, patch, edged))) edged.add(block.name);
  }
  const lowered = new Map<PlacedBlock, Lowered>();
  const slopesOf = new Set<string>();
  for (const block of [...order].reverse()) {
    const set = ready.get(block);
    if (set === undefined) continue;
    const edges = takesEdges(block, patch, edged);
    const program = lower(set.bound.equations, {
      inputs: set.bound.inputs.map(({ symbol }) => symbol),
      time: set.bound.surroundings.time,
      ...(carry ? { carry: { incoming: edges } } : {}),
      slopesOf: new Set(
        Object.keys(block.declaration.outputs).filter((port) =>
          slopesOf.has(portName({ block: block.name, port })),
        ),
      ),
    });
    set.bound.inputs.forEach(({ port, part }, i) => {
      const sources = sourcesOf(patch, block, port, part);
      const wanted = program.slopesWanted[i] || (edges && sources.length > 1);
      if (wanted) for (const { name } of sources) slopesOf.add(name);
    });
    lowered.set(block, { ...set, program });
  }
  return { lowered, slopesOf };
}

function takesEdges(block: PlacedBlock, { wires }: Patch, edged: ReadonlySet<string>): boolean {
  return wires.some(({ from, to }) => to.block === block.name && edged.has(from.block));
}

function setUp(block: PlacedBlock, patch: Patch): SetUpBlock {
  return setUpBlock(block.declaration, settingOf(block, patch));
}

/** How a block stands in its patch: its values, and what is wired to it. */
export function settingOf(block: PlacedBlock, patch: Patch): BlockSetting {
  return {
    values: plainValues(block.parameters),
    surroundings: patch.surroundings,
    wiring: (port) => ({
      direct: sourcesOf(patch, block, port, 'direct').length > 0,
      resistors: sourcesOf(patch, block, port, 'drive').length > 0,
    }),
    conductance: (port) => sourcesOf(patch, block, port, 'drive').reduce((sum, { gain }) => sum + gain, 0),
  };
}

/** One thing that comes into an input. */
export interface Source {
  /** Output it comes from, `block.port`. */
  readonly name: string;
  /** 1, or the conductance of the wire's resistor. */
  readonly gain: number;
}

/** What comes into a port: directly, through resistors, or (where `part` is left out) both. */
export function sourcesOf(
  patch: Patch,
  block: PlacedBlock,
  port: string,
  part?: 'direct' | 'drive',
): Source[] {
  const into = ({ to, via }: PlacedWire): boolean =>
    to.block === block.name &&
    to.port === port &&
    (part === undefined || (part === 'drive') === (via !== undefined));
  return patch.wires.filter(into).map(({ from, via }) => ({
    name: portName(from),
    gain: via === undefined ? 1 : 1 / via.value,
  }));
}
