import { constant, load } from '@tailpair/blocks';
import { patch, TailpairError, wire } from '@tailpair/core';
import { defineBlock, type Expression, held, onCrossing, select, set, voltage } from '@tailpair/core/block';
import { describe, expect, test } from 'vitest';

/** What a script without types, or with `any`, can get past the compiler. */
type Loose = (v: never) => unknown;

function refusal(build: () => unknown): string {
  try {
    build();
  } catch (error) {
    if (error instanceof TailpairError) return `${error.code}: ${error.message}`;
    throw error;
  }
  throw new Error('nothing was refused');
}

const written = (equations: Loose): string =>
  refusal(() =>
    defineBlock({
      kind: 'loose',
      summary: 'For tests.',
      inputs: { in: voltage() },
      outputs: { out: voltage() },
      params: {},
      equations: ({ in: v }) => ({ out: equations(v as never) as Expression }),
    }),
  );

describe('what the compiler refuses is refused at definition too', () => {
  const noValue = 'declaration: in has no value while equations are written; use its operations';

  test.each<[string, Loose]>([
    ['a product by sign', (v) => (v as unknown as number) * 2],
    ['a sum by sign', (v) => (v as unknown as number) + 2],
    ['a comparison by sign', (v) => ((v as unknown as number) > 0 ? v : 0)],
    ['a function of numbers', (v) => Math.tanh(v)],
  ])('%s', (_, equations) => {
    expect(written(equations)).toContain(noValue);
  });

  test('text for messages is still given', () => {
    let text = '';
    expect(
      written((v) => {
        text = `${v}`;
        return undefined;
      }),
    ).toBe('declaration: loose: the equations give nothing for the output out');
    expect(text).toBe('in');
  });

  test('a value in place of a quantity', () => {
    expect(written(() => '5 V')).toContain('the equations give the string 5 V for the output out');
  });

  test('a choice by something else than a condition', () => {
    expect(written((v) => select(true as never, v, v))).toContain('select: true is no condition');
  });

  test('an event at a condition, or one whose change is no list', () => {
    const at = (expression: (v: Expression) => unknown, change: (kept: Expression) => unknown): string =>
      written((v) => {
        const kept = held('0 V');
        onCrossing(expression(v) as Expression, () => change(kept) as never);
        return kept;
      });
    expect(
      at(
        (v) => v.gt('1 V'),
        () => [],
      ),
    ).toContain('not a condition');
    expect(
      at(
        (v) => v,
        (kept) => set(kept, '1 V'),
      ),
    ).toContain('the change must return a list');
  });

  test('a comparison is named as it was written, and a bare number called one', () => {
    expect(written((v) => (v as Expression).gt(0))).toBe(
      'dimension: gt: in is in V, 0 is a bare number; both sides must have one dimension',
    );
  });
});

describe('patch says what it misses', () => {
  const blocks = { level: constant() };

  test('a wiring that returns nothing, or one wire', () => {
    const more = { ...blocks, drop: load() };
    for (const connect of [
      () => undefined,
      (b: never) => wire((b as { level: { out: never } }).level.out, b),
    ]) {
      expect(refusal(() => patch({ blocks: more }, connect as never))).toContain(
        'must return a list of wires',
      );
    }
  });

  test('a kind that was not called', () => {
    expect(refusal(() => patch({ blocks: { ...blocks, drop: load as never } }, () => []))).toBe(
      'value-kind: drop: is no block; call its kind, such as load()',
    );
  });
});
