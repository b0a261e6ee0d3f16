import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { root } from './root.ts';

test('the lock file ties packages to their contents, not to a host', () => {
  const lock = readFileSync(join(root, 'package-lock.json'), 'utf8');

  expect(lock).toContain('"integrity": "sha512-');
  expect(lock).not.toMatch(/"resolved": "\w+:/);
});
