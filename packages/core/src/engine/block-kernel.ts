import { evaluate } from '../equation/evaluate.ts';
import type { Expression } from '../equation/expression.ts';
import { CellStepper } from '../equation/kernel/cell.ts';
import type { BackEnd, Clock, Kernel, KernelContext, KernelPorts } from '../equation/kernel/kernel.ts';
import { kernelMemory } from '../equation/kernel/memory.ts';
import type { Program, Slot } from '../equation/program.ts';
import { nextEdge } from './gather.ts';

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
  carry: boolean,
): Kernel {
  const memory = kernelMemory(program);
  const context: KernelContext = { program, memory, ports, clock, carry };
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
    run: (from, to) => {
      for (const edges of ports.outputEdges) edges.clear();
      stepper.rewind();
      let n = from;
      for (let edge = nextEdge(ports.inputEdges, n); edge < to; edge = nextEdge(ports.inputEdges, n)) {
        if (edge > n) loop(n, edge);
        stepper.step(edge);
        formulas.emit(edge);
        n = edge + 1;
      }
      if (n < to) loop(n, to);
    },
  };
}

function fill(values: Float64Array, slots: readonly Slot[], bindings: ReadonlyMap<Expression, number>): void {
  slots.forEach(({ from }, i) => {
    values[i] = evaluate(from, new Map(bindings));
  });
}
