import type { Block, Inputs, Outputs } from '../block/kind.ts';
import type { Surroundings } from '../block/surroundings.ts';
import { TailpairError } from '../quantity/error.ts';
import { collectFaults } from './collect-faults.ts';
import { loadingWarnings } from './loading.ts';
import type { PlacedBlock, PlacedWire, Warning } from './placed.ts';
import { readBlocks } from './read-blocks.ts';
import { readSurroundings } from './read-surroundings.ts';
import { readWires } from './read-wires.ts';
import type { InputHandle, OutputHandle, Wire } from './wire.ts';

/** Blocks by name, as `patch` takes them. */
export type Blocks = Readonly<Record<string, Block>>;

/** The ports of a block, by name. */
export type PortHandles<B extends Block> =
  B extends Block<infer I extends Inputs, infer O extends Outputs>
    ? { readonly [K in keyof I]: InputHandle<I[K]['quantity']> } & {
        readonly [K in keyof O]: OutputHandle<O[K]['quantity']>;
      }
    : never;

/** Every output of a set of blocks, as probes name them: `load.out`. */
export type OutputName<B extends Blocks> = {
  [N in keyof B & string]: B[N] extends Block<infer _I extends Inputs, infer O extends Outputs>
    ? `${N}.${keyof O & string}`
    : never;
}[keyof B & string];

/** What a patch is made of. */
export interface PatchParts<B extends Blocks> {
  /** What the patch is, in a few words. */
  readonly title?: string;
  /** Negative and positive supply rail. Default ±12 V. */
  readonly supply?: readonly [negative: string, positive: string];
  /** Temperature of the board. Default 25 °C. */
  readonly ambient?: string;
  readonly blocks: B;
}

/** Blocks and the wires between them, checked and read: what a run needs to know. */
export interface Patch<Probe extends string = string> {
  readonly title: string;
  readonly surroundings: Surroundings;
  readonly blocks: readonly PlacedBlock[];
  readonly wires: readonly PlacedWire[];
  readonly warnings: readonly Warning[];
  /** Never present; carries the names of the outputs in the type, so that a patch with more serves where fewer are asked for. */
  outputs?(name: Probe): void;
}

/**
 * Builds a patch from blocks and wires, and checks it whole.
 *
 * @param parts supply, ambient temperature and the blocks by name
 * @param connect returns the wires, given the ports of every block
 * @throws TailpairError the fault, or `patch-faults` with all of them where there are several
 */
export function patch<const B extends Blocks>(
  parts: PatchParts<B>,
  connect: (blocks: { readonly [N in keyof B]: PortHandles<B[N]> }) => readonly Wire[],
): Patch<OutputName<B>> {
  return collectFaults((faults) => {
    const surroundings = readSurroundings(parts, faults);
    const blocks = readBlocks(parts.blocks, surroundings, faults);
    const drawn = connect(handles(blocks) as never);
    if (!Array.isArray(drawn)) {
      throw new TailpairError('value-kind', 'must return a list of wires, such as [wire(a.out, b.in)]', {
        where: 'the wiring of the patch',
      });
    }
    const wires = readWires(blocks, drawn, faults);
    return {
      title: parts.title ?? '',
      surroundings,
      blocks,
      wires,
      warnings: faults.length > 0 ? [] : loadingWarnings(blocks, wires, surroundings),
    };
  });
}

function handles(blocks: readonly PlacedBlock[]): Record<string, Record<string, InputHandle | OutputHandle>> {
  return Object.fromEntries(
    blocks.map(({ name, declaration }) => {
      const inputs = Object.entries(declaration.inputs).map(
        ([port, { quantity }]) => [port, { side: 'input', quantity, block: name, port }] as const,
      );
      const outputs = Object.entries(declaration.outputs).map(
        ([port, { quantity }]) => [port, { side: 'output', quantity, block: name, port }] as const,
      );
      return [name, Object.fromEntries([...inputs, ...outputs])];
    }),
  );
}
