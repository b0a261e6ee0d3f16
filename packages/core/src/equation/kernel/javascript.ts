import { exp2 } from '../../numeric/exp2.ts';
import { tanh } from '../../numeric/tanh.ts';
import type { EquationNode } from '../node.ts';
import type { Program } from '../program.ts';
import { Emitter } from './emitter.ts';
import type { BackEnd, CellStep, Clock, Formulas, KernelContext, KernelPorts } from './kernel.ts';
import { loopSource } from './loop-source.ts';
import type { KernelMemory } from './memory.ts';

/** What generated source may call. */
const library = { exp2, tanh };

interface Generated extends Formulas {
  loop(cell: CellStep): (from: number, to: number) => void;
}

type Factory = (memory: KernelMemory, ports: KernelPorts, clock: Clock, lib: typeof library) => Generated;

/** Compiled sources; blocks whose programs read alike share one. */
const compiled = new Map<string, Factory>();

/** The back-end that turns a program into JavaScript, once for all blocks of the same program. */
export const javascript: BackEnd = {
  formulas: ({ program, memory, ports, clock }) => {
    const source = kernelSource(program);
    let factory = compiled.get(source);
    if (factory === undefined) {
      factory = new Function('memory', 'ports', 'clock', 'lib', source) as Factory;
      compiled.set(source, factory);
    }
    return factory(memory, ports, clock, library);
  },
  loop: (_: KernelContext, formulas, cell) => (formulas as Generated).loop(cell),
};

/** The generated source of a program; it holds numbers and indices only. */
export function kernelSource(program: Program): string {
  const leaves = leafTexts(program);
  const functions = [
    ['refresh()', refresh(program, leaves)],
    ['drive(group, x, u, s, t, out)', perGroup(program, drive(leaves))],
    ['field(group, x, u, t, f, jacobian)', perGroup(program, field(leaves))],
    ['stateSlopes(x, u, t, out)', writeAll(program.stateSlopes, 'out', leaves)],
    [
      'crossings(x, u, t, out)',
      writeAll(
        program.crossings.map(({ expression }) => expression),
        'out',
        leaves,
      ),
    ],
    [
      'crossingSlopes(x, u, s, t, out)',
      writeAll(
        program.crossings.map(({ slope }) => slope),
        'out',
        leaves,
      ),
    ],
    ['change(crossing, u, t)', change(program, leaves)],
    ['emit(n)', emit(program, leaves)],
    ['loop(cell)', loopSource(program)],
  ] as const;
  return [
    '"use strict";',
    'const { fixed: p, cached: c, states: X, held: k, past, rates, weights, drives } = memory;',
    'const { inputs, inputSlopes, outputs, outputSlopes } = ports;',
    'return {',
    ...functions.map(([head, body]) => `  ${head} {\n${indent(body, 4)}  },`),
    '};',
  ].join('\n');
}

function indent(lines: readonly string[], by: number): string {
  return lines.map((line) => `${' '.repeat(by)}${line}\n`).join('');
}

/** Leaves as elements of the arrays that hold them. */
function leafTexts(program: Program): Map<EquationNode, string> {
  const texts = new Map<EquationNode, string>([[program.time, 't']]);
  program.fixed.forEach(({ symbol }, i) => texts.set(symbol, `p[${i}]`));
  program.cached.forEach(({ symbol }, i) => texts.set(symbol, `c[${i}]`));
  program.helds.forEach(({ symbol }, i) => texts.set(symbol, `k[${i}]`));
  program.states.forEach(({ symbol }, i) => texts.set(symbol, `x[${i}]`));
  program.inputs.forEach((input, i) => texts.set(input, `u[${i}]`));
  program.inputSlopes.forEach((slope, i) => texts.set(slope, `s[${i}]`));
  return texts;
}

type Leaves = ReadonlyMap<EquationNode, string>;

function writer(roots: readonly EquationNode[], leaves: Leaves): Emitter {
  return new Emitter(roots, (leaf) => leaves.get(leaf)!);
}

function writeAll(roots: readonly EquationNode[], target: string, leaves: Leaves): string[] {
  const emitter = writer(roots, leaves);
  const texts = roots.map((root) => emitter.text(root));
  return [...emitter.lines, ...texts.map((text, i) => `${target}[${i}] = ${text};`)];
}

function refresh(program: Program, leaves: Leaves): string[] {
  const rates = program.groups.flatMap((group, i) =>
    group.kind === 'linear' ? [{ i, rate: group.rate }] : [],
  );
  const emitter = writer(
    [...program.cached.map(({ from }) => from), ...rates.map(({ rate }) => rate)],
    leaves,
  );
  program.cached.forEach(({ from }, i) => emitter.lines.push(`c[${i}] = ${emitter.text(from)};`));
  for (const { i, rate } of rates) emitter.lines.push(`rates[${i}] = ${emitter.text(rate)};`);
  return emitter.lines;
}

type GroupBody = (group: Program['groups'][number], index: number) => string[];

function perGroup(program: Program, body: GroupBody): string[] {
  return program.groups.flatMap((group, index) => {
    const lines = body(group, index);
    return lines.length === 0 ? [] : [`if (group === ${index}) {`, ...lines.map((line) => `  ${line}`), '}'];
  });
}

function drive(leaves: Leaves): GroupBody {
  return (group, index) => {
    if (group.kind !== 'linear') return [];
    const emitter = writer([group.drive, group.driveSlope], leaves);
    const value = emitter.text(group.drive);
    const slope = emitter.text(group.driveSlope);
    return [...emitter.lines, `out[${2 * index}] = ${value};`, `out[${2 * index + 1}] = ${slope};`];
  };
}

function field(leaves: Leaves): GroupBody {
  return (group) => {
    if (group.kind !== 'implicit') return [];
    const emitter = writer([...group.field, ...group.jacobian], leaves);
    const values = group.field.map((value, i) => `f[${i}] = ${emitter.text(value)};`);
    const entries = group.jacobian.map((value, i) => `jacobian[${i}] = ${emitter.text(value)};`);
    return [...emitter.lines, ...values, ...entries];
  };
}

function change(program: Program, leaves: Leaves): string[] {
  const ofMemory = new Map(leaves);
  program.states.forEach(({ symbol }, i) => ofMemory.set(symbol, `X[${i}]`));
  return program.crossings.flatMap(({ changes }, crossing) => {
    const emitter = writer(
      changes.map(({ value }) => value),
      ofMemory,
    );
    const values = changes.map(({ value }, i) => `const n${i} = ${emitter.text(value)};`);
    const writes = changes.map(
      ({ kind, memory }, i) => `${kind === 'state' ? 'X' : 'k'}[${memory}] = n${i};`,
    );
    return [
      `if (crossing === ${crossing}) {`,
      ...[...emitter.lines, ...values, ...writes].map((l) => `  ${l}`),
      '}',
    ];
  });
}

function emit(program: Program, leaves: Leaves): string[] {
  const own = new Map(leaves);
  program.states.forEach(({ symbol }, i) => own.set(symbol, `X[${i}]`));
  program.inputs.forEach((input, i) => own.set(input, `inputs[${i}][n]`));
  program.inputSlopes.forEach((slope, i) => own.set(slope, `inputSlopes[${i}][n]`));
  own.set(program.time, '((clock.base + n) / clock.rate)');
  const slopes = program.outputs.flatMap(({ slope }) => (slope === undefined ? [] : [slope]));
  const emitter = writer([...program.outputs.map(({ value }) => value), ...slopes], own);
  const writes = program.outputs.flatMap(({ value, slope }, i) => [
    `outputs[${i}][n] = ${emitter.text(value)};`,
    ...(slope === undefined ? [] : [`outputSlopes[${i}][n] = ${emitter.text(slope)};`]),
  ]);
  return [...emitter.lines, ...writes];
}
