import type { Clock } from '../equation/kernel/kernel.ts';
import type { Patch } from '../patch/patch.ts';
import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { type Assembly, type AssemblyOptions, assemble, type CompiledBlock, type Stage } from './assemble.ts';
import type { OutputBuffers } from './output-buffers.ts';

/** How a machine is built. */
export interface MachineOptions extends AssemblyOptions {
  /** Internal samples per second. */
  readonly rate: number;
}

/**
 * A patch made ready to run: all buffers allocated, all kernels compiled. Slot 0 of every buffer
 * holds the last sample before the present chunk.
 */
export class Machine {
  readonly clock: Clock;
  private readonly assembly: Assembly;

  constructor(patch: Patch, options: MachineOptions) {
    this.clock = { rate: options.rate, period: 1 / options.rate, base: 0 };
    this.assembly = assemble(patch, this.clock, options);
  }

  /** Buffers of an output, by its name `block.port`. */
  output(name: string): OutputBuffers | undefined {
    return this.assembly.outputs.get(name);
  }

  /** The compiled program of a block; undefined for plain kernels. */
  compiled(block: string): CompiledBlock | undefined {
    return this.assembly.compiled.get(block);
  }

  /** Names of all outputs. */
  outputNames(): Iterable<string> {
    return this.assembly.outputs.keys();
  }

  /** Computes sample 0 into slot 0. */
  start(): void {
    this.clock.base = 0;
    this.compute(0, 1, ({ kernel }) => kernel.start(0));
  }

  /** Computes the next `count` samples into slots 1 … count. */
  advance(count: number): void {
    this.compute(1, count + 1, ({ kernel }) => kernel.run(1, count + 1));
  }

  /** Makes the last of `count` samples the one before the next chunk. */
  rotate(count: number): void {
    for (const buffer of this.assembly.buffers) buffer[0] = buffer[count]!;
    this.clock.base += count;
  }

  private compute(from: number, to: number, run: (stage: Stage) => void): void {
    for (const stage of this.assembly.stages) {
      for (const sum of stage.gathers) sum(from, to);
      named(stage.name, () => run(stage));
      for (const output of stage.outputs) this.requireFinite(output, from, to);
    }
  }

  private requireFinite({ name, values, unit }: OutputBuffers, from: number, to: number): void {
    let first = from;
    while (first < to && Number.isFinite(values[first]!)) first += 1;
    if (first === to) return;
    const time = (this.clock.base + first) / this.clock.rate;
    throw new TailpairError(
      'not-finite',
      `became ${values[first]} ${unit} at ${formatQuantity(time, 's', 9)}; its equation has no finite value there, so look at the block's inputs and part values`,
      { where: name },
    );
  }
}

/** Runs a block; a fault in it is given the block's name. */
function named(block: string, run: () => void): void {
  try {
    run();
  } catch (error) {
    if (!(error instanceof TailpairError) || error.where !== undefined) throw error;
    throw new TailpairError(error.code, error.message, { where: block });
  }
}
