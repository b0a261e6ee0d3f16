import { evaluate } from '../equation/evaluate.ts';
import type { Expression } from '../equation/expression.ts';
import { CellStepper } from '../equation/kernel/cell.ts';
import type { BackEnd, Clock, Kernel, KernelContext, KernelPorts } from '../equation/kernel/kernel.ts';
import { kernelMemory } from '../equation/kernel/memory.ts';
import type { Program, Slot } from '../equation/program.ts';

/**
 * A block's program on memory of its own, ready to run.
 *
 * @param bindings values of the parameters and surroundings the program was written in
 */
export function blockKernel(
  program: Program,
  bindings: ReadonlyMap<Expression, number>,
  ports: KernelPorts,
  clock: Clock,
  backEnd: BackEnd,
): Kernel {
  const memory = kernelMemory(program);
  const context: KernelContext = { program, memory, ports, clock };
  fill(memory.fixed, program.fixed, bindings);
  const formulas = backEnd.formulas(context);
  const stepper = new CellStepper(context, formulas);
  const loop = backEnd.loop(context, formulas, (n) => stepper.step(n));
  return {
    start: (n) => {
      fill(memory.states, program.states, bindings);
      fill(memory.held, program.helds, bindings);
      stepper.settleAt(n);
      formulas.emit(n);
    },
    run: loop,
  };
}

function fill(values: Float64Array, slots: readonly Slot[], bindings: ReadonlyMap<Expression, number>): void {
  slots.forEach(({ from }, i) => {
    values[i] = evaluate(from, new Map(bindings));
  });
}
