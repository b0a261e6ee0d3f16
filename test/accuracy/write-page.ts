// Runs the reference tests and writes docs/accuracy.md from the claims they make.
import { writeFileSync } from 'node:fs';
import { startVitest } from 'vitest/node';
import { committedRows, formatPage, type PageRow, pageFile } from './page.ts';

const vitest = await startVitest('test', ['.reference.test.ts'], {
  watch: false,
  env: { ACCURACY: 'write' },
});
const failed = vitest.state.getCountOfFailedTests();
if (failed === 0) {
  const claims = vitest.state
    .getTestModules()
    .flatMap((module) => [...module.children.allTests()].flatMap((test) => test.meta().claims ?? []));
  const worst = new Map<string, PageRow>();
  for (const row of claims) {
    const key = `${row.topic} ${row.what}`;
    const bound = Math.max(row.bound, worst.get(key)?.bound ?? 0);
    worst.set(key, { ...row, bound });
  }
  writeFileSync(pageFile, formatPage([...worst.values()].map(steady)));
}
await vitest.close();

/** Keeps the committed bound while it holds and is at most three times too wide, so that the page is stable. */
function steady(row: PageRow): PageRow {
  const before = committedRows().find(({ topic, what }) => topic === row.topic && what === row.what);
  const holds = before !== undefined && before.bound >= row.bound && before.bound <= 3 * row.bound;
  return holds ? { ...row, bound: before.bound } : row;
}
