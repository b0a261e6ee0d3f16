import { spawnSync } from 'node:child_process';
import { copyFileSync, mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { expect, onTestFinished, test } from 'vitest';
import { root } from './root.ts';

const require = createRequire(import.meta.url);
const rulesFile = join(root, '.dependency-cruiser.cjs');
const cruiser = join(root, 'node_modules/dependency-cruiser/bin/dependency-cruise.mjs');
const layers = [
  'quantity',
  'numeric',
  'equation',
  'block',
  'patch',
  'schedule',
  'engine',
  'trace',
  'analysis',
  'study',
];

type Import = [from: string, to: string];

const allowed: Import[] = [
  ...layers
    .slice(1)
    .map((layer, below): Import => [`core/src/${layer}/leaf.ts`, `../${layers[below]}/leaf.ts`]),
  ['core/src/quantity/leaf.ts', 'fft.js'],
  ['core/src/index.ts', './engine/leaf.ts'],
  ['core/src/block.ts', './block/leaf.ts'],
  ['blocks/src/shared/leaf.ts', '@tailpair/core/block'],
  ['blocks/src/ota.ts', './shared/leaf.ts'],
  ['blocks/src/index.ts', './ota.ts'],
  ['cli/src/both.ts', '@tailpair/core'],
  ['cli/src/disk.ts', 'node:fs'],
  ['cli/src/forth.ts', './back.ts'], // half of the circle below, which is reported once
];

const breaches: [rule: string, ...Import][] = [
  ...layers
    .slice(0, -1)
    .map((layer, index): [string, ...Import] => [
      `core-${layer}-imports-upward`,
      `core/src/${layer}/upward.ts`,
      `../${layers[index + 1]}/leaf.ts`,
    ]),
  ['core-folder-unknown', 'core/src/helpers/any.ts', '../quantity/leaf.ts'],
  ['core-folder-imports-entry', 'core/src/patch/entry.ts', '../index.ts'],
  ['analysis-knows-blocks', 'core/src/analysis/block.ts', '../block/leaf.ts'],
  ['core-imports-other-package', 'core/src/outward.ts', '@tailpair/blocks'],
  ['blocks-import-only-core-block', 'blocks/src/shared/whole-core.ts', '@tailpair/core'],
  ['block-imports-block', 'blocks/src/load.ts', './ota.ts'],
  ['package-imports-outside', 'cli/src/outside.ts', '../../../test/leaf.ts'],
  ['node-import-outside-cli', 'blocks/src/shared/disk.ts', 'node:fs'],
  ['undeclared-package', 'core/src/stray.ts', 'stray'],
  ['unresolvable', 'cli/src/lost.ts', './nowhere.ts'],
  ['circular', 'cli/src/back.ts', './forth.ts'],
];

/** Lays out a workspace of one-line files with these imports, and the real package.json files. */
function layOut(imports: Import[]): string {
  const folder = mkdtempSync(join(tmpdir(), 'tailpair-boundaries-'));
  const write = (path: string, text: string) => {
    mkdirSync(dirname(join(folder, path)), { recursive: true });
    writeFileSync(join(folder, path), text);
  };

  for (const name of ['stray', 'fft.js']) {
    write(`node_modules/${name}/package.json`, JSON.stringify({ name, main: 'index.js' }));
    write(`node_modules/${name}/index.js`, '');
  }
  write('test/leaf.ts', '');
  for (const [from, to] of imports) write(`packages/${from}`, `import '${to}';\n`);

  mkdirSync(join(folder, 'node_modules/@tailpair'));
  for (const name of ['core', 'blocks', 'cli']) {
    copyFileSync(
      join(root, 'packages', name, 'package.json'),
      join(folder, 'packages', name, 'package.json'),
    );
    symlinkSync(join('../../packages', name), join(folder, 'node_modules/@tailpair', name));
  }
  return folder;
}

test('every import rule catches its breach, and lets the allowed imports pass', () => {
  const folder = layOut([...allowed, ...breaches.map(([, from, to]): Import => [from, to])]);
  onTestFinished(() => rmSync(folder, { recursive: true }));

  const { stdout } = spawnSync(
    process.execPath,
    [cruiser, '--config', rulesFile, '--output-type', 'json', 'packages'],
    { cwd: folder, encoding: 'utf8' },
  );
  const { summary } = JSON.parse(stdout);
  const found = summary.violations.map((violation: { rule: { name: string }; from: string }) => [
    violation.rule.name,
    violation.from.replace('packages/', ''),
  ]);

  expect(found.sort()).toEqual(breaches.map(([rule, from]) => [rule, from]).sort());
});

test('no rule is without a breach above', () => {
  const rules: { forbidden: { name: string }[] } = require(rulesFile);

  expect(rules.forbidden.map((rule) => rule.name).sort()).toEqual(
    [...new Set(breaches.map(([rule]) => rule))].sort(),
  );
});
