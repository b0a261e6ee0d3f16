import * as kinds from '@tailpair/blocks';
import type { BlockKind } from '@tailpair/core';
import { choice, defineBlock, voltage, volts } from '@tailpair/core/block';
import { expect, test } from 'vitest';
import { setUpBlock } from '../../../packages/core/src/block/set-up.ts';
import { kernelSource } from '../../../packages/core/src/equation/kernel/javascript.ts';
import { lower } from '../../../packages/core/src/equation/lower.ts';
import { plainValues, readBlocks } from '../../../packages/core/src/patch/read-blocks.ts';

const surroundings = { temperature: 298.15, supplyPositive: 12, supplyNegative: -12 };

function source(kind: BlockKind, given: Record<string, unknown> = {}, name = 'x'): string {
  const [block] = readBlocks({ [name]: { kind, given } }, surroundings, []);
  const { bound } = setUpBlock(block!.declaration, {
    values: plainValues(block!.parameters),
    surroundings,
    wiring: () => ({ direct: true, resistors: true }),
    conductance: () => 1e-5,
  });
  return kernelSource(
    lower(bound.equations, {
      inputs: bound.inputs.map(({ symbol }) => symbol),
      time: bound.surroundings.time,
      slopesOf: new Set(Object.keys(block!.declaration.outputs)),
    }),
  );
}

/** Every word generated source may hold: JavaScript, the library's functions, and numbered names. */
const allowed = new RegExp(
  `^(${[
    'use|strict|const|let|return|function|for|if|else|break|NaN|Infinity|this',
    'fixed|cached|states|held|past|rates|weights|drives|memory|inputs|inputSlopes|outputs|outputSlopes|ports|clock|base|rate|lib',
    'refresh|drive|field|stateSlopes|crossings|crossingSlopes|change|emit|loop|cell|run|group|crossing|jacobian|out|from|to|start',
    'Math|abs|min|max|floor|sqrt|exp|exp2|log|sin|cos|tanh',
    '[a-zA-Z]|[a-zA-Z]\\d+(_\\d+)?|e\\d*',
  ].join('|')})$`,
);

test.each(Object.values(kinds) as unknown as BlockKind[])(
  'the kernel of $declaration.kind holds numbers and indices only',
  (kind) => {
    const words = source(kind).match(/[\p{L}_$][\p{L}\p{N}_$]*/gu) ?? [];
    expect(words.filter((word) => !allowed.test(word))).toEqual([]);
    expect(source(kind)).not.toMatch(/[`'\\]|\/\/|=>/);
  },
);

test('no text of a patch or a kind gets in', () => {
  const hostile = defineBlock({
    kind: 'hostile',
    summary: '"; process.exit(); //',
    inputs: { processExit: voltage({ doc: '`process.exit()`' }) },
    outputs: { out: voltage() },
    params: { evil: volts('1 V', { doc: "');process.exit();('" }), word: choice(['`;', '*/'], '`;') },
    equations: ({ processExit, evil }) => ({ out: processExit.add(evil) }),
  });
  const text = source(hostile as unknown as BlockKind, {}, 'a');
  for (const word of ['process', 'evil', 'word', '`', '*/']) expect(text).not.toContain(word);
});

test('blocks of one kind share their source, whatever their values', () => {
  const load = kinds.load as unknown as BlockKind;
  expect(source(load, { resistance: '22k', capacitance: '1 nF' }, 'one')).toBe(
    source(load, { resistance: 4700, capacitance: '10 nF' }, 'other'),
  );
  expect(source(load, { capacitance: '1 nF' })).not.toBe(source(load, { capacitance: '0 F' }));
});
