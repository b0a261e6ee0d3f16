import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { root } from './root.ts';

const mostLines = 300;

test.each(['core', 'blocks', 'cli'])(`no source file of %s is longer than ${mostLines} lines`, (name) => {
  const source = join(root, 'packages', name, 'src');
  const files = readdirSync(source, { recursive: true, encoding: 'utf8' }).filter((file) =>
    file.endsWith('.ts'),
  );
  const lines = (file: string) => readFileSync(join(source, file), 'utf8').trimEnd().split('\n').length;

  expect(files).not.toHaveLength(0);
  expect(files.filter((file) => lines(file) > mostLines)).toEqual([]);
});
