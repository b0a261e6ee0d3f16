import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { root } from './root.ts';

const { scripts } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
const documents = readdirSync(root).filter((name) => name.endsWith('.md'));

describe.each(documents)('%s', (name) => {
  const text = readFileSync(join(root, name), 'utf8');
  const found = (pattern: RegExp) => [...text.matchAll(pattern)].map((match) => match[1]!);

  test('names only scripts that exist', () => {
    const named = [...found(/\bnpm run ([\w:]+)/g), ...found(/\bnpm (start|test)\b/g)];
    expect(named.filter((script) => !(script in scripts))).toEqual([]);
  });

  test('names only files and folders that exist', () => {
    const linked = found(/\]\((?!\w+:|#)([^)#]+)/g);
    const quoted = found(/`((?:packages|test|tools|bench|examples|docs)\/[\w./-]*)`/g);
    expect([...linked, ...quoted].filter((path) => !existsSync(join(root, path)))).toEqual([]);
  });
});
