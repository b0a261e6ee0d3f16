import { basename } from 'node:path';
import { expect, TestRunner } from 'vitest';
import { type Claim, committedRows, type PageRow, rowOf, slack } from './page.ts';

declare module 'vitest' {
  interface TaskMeta {
    claims?: PageRow[];
  }
}

/**
 * Holds a figure to its tolerance and to its row in docs/accuracy.md, which `npm run accuracy` writes from
 * these claims. The error measured may exceed the row's by the factor `slack`.
 */
export function claim(made: Claim): void {
  const error = Math.max(...made.errors.map(Math.abs));
  expect(made.errors, made.what).not.toHaveLength(0);
  expect(`${made.what}${made.source}${made.because}`, 'a bar would part a cell of the page').not.toContain(
    '|',
  );
  expect(error, made.what).toBeLessThanOrEqual(made.tolerance);
  const topic = basename(expect.getState().testPath!).split('.')[0]!;
  const row = rowOf(topic, made, error);
  const { meta } = TestRunner.getCurrentTest()!;
  meta.claims = [...(meta.claims ?? []), row];
  const { ACCURACY } = process.env;
  if (ACCURACY === 'write') return;

  const stands = committedRows().find((other) => other.topic === topic && other.what === made.what);
  const { bound, ...rest } = row;
  expect(stands, 'docs/accuracy.md is out of date; run npm run accuracy').toMatchObject(rest);
  expect(bound, `${made.what}: worse than docs/accuracy.md says`).toBeLessThanOrEqual(slack * stands!.bound);
}
