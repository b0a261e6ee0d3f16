import type { Clock, Kernel } from '../equation/kernel/kernel.ts';
import type { PlacedBlock } from '../patch/placed.ts';
import { plainValues } from '../patch/read-blocks.ts';
import type { OutputBuffers } from './output-buffers.ts';
import { SlopeEstimate } from './slope-estimate.ts';

/** A block that is a loop over samples of its author's own; slopes asked of it are estimated. */
export function plainKernel(
  block: PlacedBlock,
  inputOf: (port: string) => Float64Array,
  outputs: readonly OutputBuffers[],
  { period }: Clock,
): Kernel {
  const { declaration } = block;
  const ports = Object.keys(declaration.outputs);
  const own = declaration.kernel!({
    inputs: Object.fromEntries(Object.keys(declaration.inputs).map((port) => [port, inputOf(port)])),
    outputs: Object.fromEntries(ports.map((port, i) => [port, outputs[i]!.values])),
    params: plainValues(block.parameters),
    dt: period,
  });
  const estimates = outputs
    .filter(({ slopes }) => slopes.length > 0)
    .map(({ values, slopes }) => new SlopeEstimate(values, slopes, period));
  return {
    start: (n) => {
      own.run(n, n + 1);
      for (const estimate of estimates) estimate.start(n);
    },
    run: (from, to) => {
      own.run(from, to);
      for (const estimate of estimates) estimate.run(from, to);
    },
  };
}
