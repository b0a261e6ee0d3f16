import { tangent } from '../equation/differentiate.ts';
import { evaluate } from '../equation/evaluate.ts';
import { constant, type Expression } from '../equation/expression.ts';
import { EdgeList } from '../equation/kernel/edge-list.ts';
import type { BackEnd, Kernel } from '../equation/kernel/kernel.ts';
import { variabilityOf } from '../equation/variability.ts';
import type { CompiledBlock } from './assemble.ts';
import { blockKernel } from './block-kernel.ts';
import type { CorrectedSignal } from './corrected-signal.ts';

/** Poles slower than this many radians per sample are left to the series of jumps. */
const fastPole = 0.8;

/**
 * Whether a block is linear and does not change with time, but for events such as reaching a rail:
 * then correcting what goes into it gives the same as correcting what comes out.
 */
export function isLinear({ program }: CompiledBlock): boolean {
  const { groups, crossings, outputs } = program;
  const variability = variabilityOf();
  const steady = (expression: Expression, leaf: Expression): boolean =>
    variability(tangent(expression, new Map([[leaf, constant(1)]]), leaf.dimension)) !== 'sample';
  const moving = [...program.inputs, ...program.states.map(({ symbol }) => symbol)];
  return (
    program.inputs.length > 0 &&
    crossings.every(({ corner }) => !corner) &&
    groups.every(
      (group) => group.kind === 'linear' && program.inputs.every((input) => steady(group.drive, input)),
    ) &&
    outputs.every(({ value }) => moving.every((leaf) => steady(value, leaf)))
  );
}

/** Whether one of its poles, as they stand at the start of a run, is too fast for the series of jumps. */
export function hasFastPole({ program, bindings }: CompiledBlock, rate: number): boolean {
  const values = new Map(bindings);
  for (const { symbol, from } of [...program.fixed, ...program.helds, ...program.cached]) {
    values.set(symbol, evaluate(from, values));
  }
  return program.groups.some(
    (group) => group.kind === 'linear' && Math.abs(evaluate(group.rate, values)) > fastPole * rate,
  );
}

/** A linear block run once more behind the correction of what goes into it. */
export class LinearTail implements CorrectedSignal {
  readonly values: Float64Array;
  readonly slopes: Float64Array;
  private readonly inputs: readonly (readonly { signal: CorrectedSignal; gain: number }[])[];
  private readonly inputValues: readonly Float64Array[];
  private readonly inputSlopes: readonly Float64Array[];
  private readonly buffers: readonly Float64Array[];
  private readonly kernel: Kernel;
  private started = false;
  private last = 0;

  constructor(
    block: CompiledBlock,
    output: number,
    signalOf: (name: string, sloped: boolean) => CorrectedSignal,
    { chunk, rate, backEnd, sloped }: { chunk: number; rate: number; backEnd: BackEnd; sloped: boolean },
  ) {
    const { program, bindings } = block;
    const buffer = (): Float64Array => new Float64Array(chunk + 2);
    this.inputs = block.sources.map((sources, i) =>
      sources.map(({ name, gain }) => ({ signal: signalOf(name, program.slopesWanted[i]!), gain })),
    );
    this.inputValues = this.inputs.map(buffer);
    this.inputSlopes = this.inputs.map(buffer);
    const outputs = program.outputs.map(buffer);
    const outputSlopes = program.outputs.map(buffer);
    this.values = outputs[output]!;
    this.slopes = sloped ? outputSlopes[output]! : new Float64Array(0);
    this.buffers = [...this.inputValues, ...this.inputSlopes, ...outputs, ...outputSlopes];
    const ports = {
      inputs: this.inputValues,
      inputSlopes: this.inputSlopes,
      inputEdges: this.inputs.map(() => new EdgeList()),
      outputs,
      outputSlopes,
      outputEdges: outputs.map(() => new EdgeList()),
    };
    this.kernel = blockKernel(program, bindings, ports, { rate, period: 1 / rate, base: 0 }, backEnd, false);
  }

  advance(from: number, to: number): number {
    for (const buffer of this.buffers) buffer[0] = buffer[this.last]!;
    let ready = 0;
    this.inputs.forEach((sources, i) => {
      const values = this.inputValues[i]!;
      const slopes = this.inputSlopes[i]!;
      values.fill(0, 1);
      slopes.fill(0, 1);
      for (const { signal, gain } of sources) {
        ready = signal.advance(from, to);
        for (let n = 1; n <= ready; n++) {
          values[n]! += gain * signal.values[n]!;
          slopes[n]! += gain * (signal.slopes[n] ?? 0);
        }
      }
    });
    this.last = ready;
    if (ready === 0) return 0;
    if (this.started) this.kernel.run(1, ready + 1);
    else {
      this.kernel.start(1);
      this.started = true;
      if (ready > 1) this.kernel.run(2, ready + 1);
    }
    return ready;
  }
}
