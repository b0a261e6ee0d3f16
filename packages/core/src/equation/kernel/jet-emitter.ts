import { jetLength } from '../jet/jet-arithmetic.ts';
import { JetTape, type Side } from '../jet/jet-tape.ts';
import type { CellInputs } from './cell-inputs.ts';
import type { KernelContext } from './kernel.ts';

/** Jumps smaller than this share of the jets are rounding, not edges. */
const negligible = 1e-13;

/**
 * Works out the jets of a block's outputs on both sides of an instant and, where they differ,
 * writes an edge to the output.
 */
export class JetEmitter {
  private readonly context: KernelContext;
  private readonly inputs: CellInputs;
  private tape: JetTape | undefined;
  private readonly before: Float64Array;
  private readonly after: Float64Array;
  private readonly jet = new Float64Array(jetLength);

  constructor(context: KernelContext, inputs: CellInputs) {
    const outputs = context.program.outputs.length;
    this.context = context;
    this.inputs = inputs;
    this.before = new Float64Array(outputs * jetLength);
    this.after = new Float64Array(outputs * jetLength);
  }

  /** Notes the jets of all outputs just before a share of the cell; the memory stands there. */
  noteBefore(at: number, time: number): void {
    this.evaluate(at, time, -1, this.before);
  }

  /** Works out the jets just after it and writes the edges of cell `n`. */
  emit(n: number, at: number, time: number): void {
    this.evaluate(at, time, 1, this.after);
    this.context.ports.outputEdges.forEach((edges, output) => {
      const offset = output * jetLength;
      if (!this.jumps(offset)) return;
      const edge = edges.add(n, at) * jetLength;
      for (let k = 0; k < jetLength; k++) {
        edges.before[edge + k] = this.before[offset + k]!;
        edges.after[edge + k] = this.after[offset + k]!;
      }
    });
  }

  private jumps(offset: number): boolean {
    let scale = 0;
    let largest = 0;
    for (let k = 0; k < jetLength; k++) {
      const a = this.before[offset + k]!;
      const b = this.after[offset + k]!;
      scale = Math.max(scale, Math.abs(a), Math.abs(b));
      largest = Math.max(largest, Math.abs(b - a));
    }
    return largest > negligible * scale;
  }

  private evaluate(at: number, time: number, side: Side, out: Float64Array): void {
    const { program, memory, clock } = this.context;
    const { states, outputs } = program;
    const tape = this.prepared();
    program.inputs.forEach((_, i) => {
      this.inputs.jet(i, at, side, this.jet);
      tape.setLeaf(i, this.jet, 0);
    });
    let leaf = program.inputs.length;
    tape.setConstant(leaf, time);
    tape.setCoefficient(leaf, 1, clock.period);
    leaf += 1;
    const firstState = leaf;
    const constants = [memory.states, memory.held, memory.fixed, memory.cached];
    for (const values of constants)
      for (let i = 0; i < values.length; i++) tape.setConstant(leaf++, values[i]!);
    tape.run(side);
    // A state's next coefficient is its slope's present one: x′ = f gives (k + 1)·x₍ₖ₊₁₎ = fₖ.
    for (let k = 0; k < jetLength - 1 && states.length > 0; k++) {
      for (let i = 0; i < states.length; i++) {
        const slope = tape.coefficient(outputs.length + i, k);
        tape.setCoefficient(firstState + i, k + 1, (clock.period * slope) / (k + 1));
      }
      tape.run(side);
    }
    for (let i = 0; i < outputs.length; i++) {
      for (let k = 0; k < jetLength; k++) out[i * jetLength + k] = tape.coefficient(i, k);
    }
  }

  private prepared(): JetTape {
    if (this.tape === undefined) {
      const { outputs, jetSlopes, inputs, time, states, helds, fixed, cached } = this.context.program;
      const symbols = [states, helds, fixed, cached].flatMap((slots) => slots.map(({ symbol }) => symbol));
      this.tape = new JetTape(
        [...outputs.map(({ value }) => value), ...jetSlopes],
        [...inputs, time, ...symbols],
      );
    }
    return this.tape;
  }
}
