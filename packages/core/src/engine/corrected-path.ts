import type { BackEnd } from '../equation/kernel/kernel.ts';
import type { CorrectedSignal } from './corrected-signal.ts';
import type { CorrectionKernel } from './correction-kernel.ts';
import { EdgeCorrector } from './edge-corrector.ts';
import { hasFastPole, isLinear, LinearTail } from './linear-tail.ts';
import type { Machine } from './machine.ts';

/** What correcting a machine's outputs takes. */
export interface CorrectedPath {
  readonly machine: Machine;
  readonly kernel: CorrectionKernel;
  readonly chunk: number;
  /** Internal samples per second. */
  readonly rate: number;
  readonly backEnd: BackEnd;
}

/**
 * An output with its edges corrected: right where it leaves or, where it comes out of a linear
 * block too fast for that, in front of that block, which is then run once more.
 *
 * @param name `block.port`
 * @param sloped whether slopes are asked for as well
 */
export function correctedSignal(name: string, path: CorrectedPath, sloped: boolean): CorrectedSignal {
  const { machine, kernel, chunk, rate } = path;
  const block = blockOf(name);
  const compiled = machine.compiled(block);
  if (compiled === undefined || !isFastTail(name, path)) {
    return new EdgeCorrector(machine.output(name)!, kernel, chunk, rate, sloped);
  }
  const port = compiled.program.outputs.findIndex((output) => name === `${block}.${output.name}`);
  return new LinearTail(compiled, port, (source, steep) => correctedSignal(source, path, steep), {
    ...path,
    sloped,
  });
}

/** Whether an output comes through linear blocks only from one with a fast pole. */
function isFastTail(name: string, path: CorrectedPath): boolean {
  const compiled = path.machine.compiled(blockOf(name));
  if (compiled === undefined || !isLinear(compiled)) return false;
  return (
    hasFastPole(compiled, path.rate) ||
    compiled.sources.flat().some(({ name: source }) => isFastTail(source, path))
  );
}

function blockOf(name: string): string {
  return name.split('.')[0]!;
}
