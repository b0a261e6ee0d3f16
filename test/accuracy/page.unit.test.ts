import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { root } from '../workspace/root.ts';
import { committedRows, formatPage, type PageRow, pageFile, parsePage, rowOf } from './page.ts';

const sources = new Map(
  readdirSync(join(root, 'test'), { recursive: true, encoding: 'utf8' })
    .filter((file) => file.endsWith('.reference.test.ts'))
    .map((file) => [
      file.split(/[\\/]/).at(-1)!.split('.')[0]!,
      readFileSync(join(root, 'test', file), 'utf8'),
    ]),
);

describe('docs/accuracy.md', () => {
  test('is what the page writer makes of its rows', () => {
    expect(readFileSync(pageFile, 'utf8')).toBe(formatPage(committedRows()));
  });

  // That each claim made has its row, `claim` itself checks.
  test('holds no row that no test claims any more', () => {
    const claimed = ({ topic, what }: PageRow) => sources.get(topic)?.includes(what);
    expect(committedRows().filter((row) => !claimed(row))).toEqual([]);
  });
});

describe('rowOf', () => {
  const row = (error: number): PageRow =>
    rowOf('a-topic', { what: 'this', source: 'there', tolerance: 1e-6, because: 'so', unit: 'dB' }, error);

  test.each([
    [2.1e-13, 3e-13],
    [3e-13, 3e-13],
    [9.5e-7, 1e-6],
    [0, 1e-15],
  ])('rounds %d up to %d', (error, bound) => {
    expect(row(error).bound).toBe(bound);
  });

  test('survives being printed and read back', () => {
    const rows = [row(4e-7), { ...row(1), what: 'that', unit: '' }];
    expect(parsePage(formatPage(rows))).toEqual(rows);
  });
});
