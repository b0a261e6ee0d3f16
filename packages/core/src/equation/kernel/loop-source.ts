import type { Expression } from '../expression.ts';
import type { EquationNode } from '../node.ts';
import type { LinearGroup, Program } from '../program.ts';
import { variabilityOf } from '../variability.ts';
import { Emitter } from './emitter.ts';
import { weightsAt } from './linear-weights.ts';

/**
 * Body of the generated loop over samples. Blocks without memory compute their outputs; blocks
 * whose states are all linear take the whole-cell step with everything in local variables and
 * hand the cell over when an event falls in it; blocks with implicit groups hand over every cell.
 */
export function loopSource(program: Program): string[] {
  const moves = program.states.length > 0 || program.crossings.length > 0;
  if (!moves) return new LoopText(program).instant();
  if (program.groups.some((group) => group.kind === 'implicit')) return stepped;
  return new LoopText(program).linear();
}

const stepped = [
  'const { emit } = this;',
  'return function run(from, to) {',
  '  for (let n = from; n < to; n++) {',
  '    cell(n);',
  '    emit(n);',
  '  }',
  '};',
];

class LoopText {
  private readonly program: Program;
  private readonly texts: Map<EquationNode, string>;
  /** Declarations the loop's leaves need: before the function, before the loop, in the loop. */
  private readonly constants = new Map<string, string>();
  private readonly locals = new Map<string, string>();
  private readonly reads = new Map<string, string>();

  constructor(program: Program) {
    this.program = program;
    this.texts = new Map();
  }

  /** Loop of a block without memory. */
  instant(): string[] {
    const outputs = this.outputs();
    return this.assemble([], outputs);
  }

  /** Loop of a block whose states are linear in themselves, with its events. */
  linear(): string[] {
    const { program } = this;
    const groups = program.groups as readonly LinearGroup[];
    const states = program.states.map((_, i) => `x${i}`);
    const next = program.states.map((_, i) => `y${i}`);
    const memory = [
      ...states.map((name, i) => [name, `X[${i}]`] as const),
      ...groups.flatMap(({ steady }, g) =>
        steady ? [] : [[`d${g}`, `drives[${2 * g}]`] as const, [`e${g}`, `drives[${2 * g + 1}]`] as const],
      ),
    ];
    const step: string[] = [];
    const endLeaves = new Map(program.states.map(({ symbol }, i) => [symbol as EquationNode, next[i]!]));
    const roots = [
      ...(program.states.length === 0 ? outputRoots(program) : []),
      ...groups.flatMap(({ drive, driveSlope }) => [drive, driveSlope]),
      ...program.crossings.map(({ expression }) => expression),
    ];
    const emitter = new Emitter(roots, (leaf) => endLeaves.get(leaf) ?? this.leaf(leaf));
    groups.forEach((group, g) => {
      const w = [0, 1, 2, 3, 4].map((i) => this.local(`w${g}_${i}`, `weights[${weightsAt(g) + i}]`));
      const state = group.states[0];
      const drive = emitter.text(group.drive);
      if (group.steady) {
        emitter.lines.push(`const y${state} = ${w[0]} * x${state} + (${w[1]} + ${w[2]}) * ${drive};`);
        return;
      }
      const slope = emitter.text(group.driveSlope);
      emitter.lines.push(
        `const f${g} = ${drive}, g${g} = ${slope};`,
        `const y${state} = ${w[0]} * x${state} + ${w[1]} * d${g} + ${w[2]} * f${g} + ${w[3]} * e${g} + ${w[4]} * g${g};`,
      );
    });
    const variability = variabilityOf();
    // What only events can lift over zero is looked at when they happen.
    const watched = program.crossings.flatMap(({ expression }, i) =>
      variability(expression) === 'sample' ? [{ i, text: emitter.text(expression) }] : [],
    );
    step.push(...emitter.lines, ...watched.map(({ i, text }) => `const r${i} = ${text};`));

    const commit = [
      ...states.map((name, i) => `${name} = ${next[i]};`),
      ...groups.flatMap(({ steady }, g) => (steady ? [] : [`d${g} = f${g};`, `e${g} = g${g};`])),
    ];
    if (watched.length === 0) step.push(...commit);
    else {
      const corner = (i: number): boolean => program.crossings[i]!.corner;
      const hit = watched
        .map(({ i }) =>
          corner(i) ? `(r${i} >= 0 ? 1 : 0) !== past[${i}]` : `(r${i} >= 0 && past[${i}] === 0)`,
        )
        .join(' || ');
      step.push(
        `if (${hit}) {`,
        ...memory.map(([name, cell]) => `  ${cell} = ${name};`),
        '  cell(n);',
        ...memory.map(([name, cell]) => `  ${name} = ${cell};`),
        '  /*reload*/',
        '} else {',
        ...watched.filter(({ i }) => !corner(i)).map(({ i }) => `  if (r${i} < 0) past[${i}] = 0;`),
        ...commit.map((line) => `  ${line}`),
        '}',
      );
    }
    program.states.forEach(({ symbol }, i) => {
      this.texts.set(symbol, states[i]!);
    });
    // Without memory an event changes no value, so the outputs may use what has been computed.
    const forgetful = program.states.length === 0 && program.helds.length === 0;
    return this.assemble(step, this.outputs(forgetful ? emitter : undefined), memory);
  }

  private outputs(computed?: Emitter): string[] {
    const { outputs } = this.program;
    const emitter =
      computed?.continued() ?? new Emitter(outputRoots(this.program), (leaf) => this.leaf(leaf));
    const writes = outputs.flatMap(({ value, slope }, i) => [
      `${this.constant(`O${i}`, `outputs[${i}]`)}[n] = ${emitter.text(value)};`,
      ...(slope === undefined
        ? []
        : [`${this.constant(`Q${i}`, `outputSlopes[${i}]`)}[n] = ${emitter.text(slope)};`]),
    ]);
    return ['{', ...[...emitter.lines, ...writes].map((line) => `  ${line}`), '}'];
  }

  private assemble(
    step: readonly string[],
    outputs: readonly string[],
    memory: readonly (readonly [string, string])[] = [],
  ): string[] {
    const locals = [...this.locals];
    const reload = locals.map(([name, from]) => `${name} = ${from};`).join(' ');
    return [
      ...[...this.constants].map(([name, from]) => `const ${name} = ${from};`),
      'return function run(from, to) {',
      ...[...memory, ...locals].map(([name, from]) => `  let ${name} = ${from};`),
      '  for (let n = from; n < to; n++) {',
      ...[...this.reads].map(([name, from]) => `    const ${name} = ${from};`),
      ...[...step, ...outputs].map((line) => `    ${line.replace('/*reload*/', reload)}`),
      '  }',
      ...memory.map(([name, cell]) => `  ${cell} = ${name};`),
      '};',
    ];
  }

  private leaf(leaf: EquationNode): string {
    let text = this.texts.get(leaf);
    if (text === undefined) {
      text = this.declare(leaf);
      this.texts.set(leaf, text);
    }
    return text;
  }

  private declare(leaf: EquationNode): string {
    const { program } = this;
    const at = (slots: readonly { readonly symbol: EquationNode }[]): number =>
      slots.findIndex(({ symbol }) => symbol === leaf);
    if (leaf === program.time) return this.read('t', '(clock.base + n) / clock.rate');
    const input = program.inputs.indexOf(leaf as never);
    if (input >= 0) return this.read(`u${input}`, `${this.constant(`U${input}`, `inputs[${input}]`)}[n]`);
    const slope = program.inputSlopes.indexOf(leaf as never);
    if (slope >= 0)
      return this.read(`s${slope}`, `${this.constant(`S${slope}`, `inputSlopes[${slope}]`)}[n]`);
    const fixed = at(program.fixed);
    if (fixed >= 0) return this.local(`p${fixed}`, `p[${fixed}]`);
    const cached = at(program.cached);
    if (cached >= 0) return this.local(`c${cached}`, `c[${cached}]`);
    const held = at(program.helds);
    return this.local(`k${held}`, `k[${held}]`);
  }

  private constant(name: string, from: string): string {
    this.constants.set(name, from);
    return name;
  }

  private local(name: string, from: string): string {
    this.locals.set(name, from);
    return name;
  }

  private read(name: string, from: string): string {
    this.reads.set(name, from);
    return name;
  }
}

function outputRoots({ outputs }: Program): Expression[] {
  return outputs.flatMap(({ value, slope }) => (slope === undefined ? [value] : [value, slope]));
}
