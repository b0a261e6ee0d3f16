import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { root } from './root.ts';

const packageFolders = ['core', 'blocks', 'cli'].map((name) => join(root, 'packages', name));
const compiler = join(root, 'node_modules/typescript/bin/tsc');
const parcels = mkdtempSync(join(tmpdir(), 'tailpair-consumer-'));
const project = join(parcels, 'project');

interface Manifest {
  name: string;
  exports?: Record<string, { '@tailpair/source': string }>;
  dependencies?: Record<string, string>;
}

const manifest = (folder: string): Manifest => JSON.parse(readFileSync(join(folder, 'package.json'), 'utf8'));

/** Folders of the packages which these need from elsewhere, and which those need in turn. */
function outsideFolders(folders: string[]): string[] {
  const names = folders
    .flatMap((folder) => Object.keys(manifest(folder).dependencies ?? {}))
    .filter((name) => !name.startsWith('@tailpair/'));
  const needed = [...new Set(names)].map((name) => join(root, 'node_modules', name));
  return needed.length === 0 ? [] : [...new Set([...needed, ...outsideFolders(needed)])];
}

/** Every public path, with the source file behind it. */
const entries = packageFolders.flatMap((folder) => {
  const { name, exports = {} } = manifest(folder);
  return Object.entries(exports).map(([path, target]) => ({
    specifier: name + path.slice(1),
    source: join(folder, target['@tailpair/source']),
  }));
});

function run(command: string, args: string[], cwd: string): string {
  const { status, stdout, stderr, error } = spawnSync(command, args, { cwd, encoding: 'utf8' });
  if (error) throw error;
  if (status !== 0) throw new Error(`${command} ${args.join(' ')} ended with ${status}\n${stdout}${stderr}`);
  return stdout;
}

beforeAll(() => {
  run(process.execPath, [compiler, '-b'], root);

  const folders = [...packageFolders, ...outsideFolders(packageFolders)];
  const packed = run(
    'npm',
    ['pack', ...folders, '--json', '--ignore-scripts', '--pack-destination', parcels],
    root,
  );
  const tarballs = JSON.parse(packed).map(({ filename }: { filename: string }) => join(parcels, filename));

  mkdirSync(project);
  writeFileSync(join(project, 'package.json'), JSON.stringify({ private: true, type: 'module' }));
  // An empty cache and no network: everything comes from the tarballs.
  run('npm', ['install', ...tarballs, '--offline', '--cache', join(parcels, 'cache'), '--no-audit'], project);
}, 120_000);

afterAll(() => rmSync(parcels, { recursive: true, force: true }));

test('an installed package offers the names of its source', async () => {
  const script = `
    const names = {};
    for (const path of ${JSON.stringify(entries.map((entry) => entry.specifier))})
      names[path] = Object.keys(await import(path)).sort();
    console.log(JSON.stringify(names));
  `;
  const offered = JSON.parse(run(process.execPath, ['--input-type=module', '--eval', script], project));

  for (const { specifier, source } of entries) {
    expect(offered[specifier], specifier).toEqual(Object.keys(await import(source)).sort());
  }
});

const script = `
  import { constant, currentSource, load, ota } from '@tailpair/blocks';
  import { patch, simulate, wire } from '@tailpair/core';
  import { dc } from '@tailpair/core/analysis';

  const stage = patch(
    {
      supply: ['-12 V', '12 V'],
      blocks: {
        input: constant({ voltage: '10 mV' }),
        tail: currentSource({ current: '100 uA' }),
        cell: ota(),
        drop: load({ resistance: '10k' }),
      },
    },
    ({ input, tail, cell, drop }) => [
      wire(input.out, cell.plus),
      wire(tail.out, cell.bias),
      wire(cell.out, drop.in),
    ],
  );
  const { traces } = await simulate(stage, { length: '10 ms', probes: ['drop.out'] });
  console.log(dc(traces.drop.out));
`;

test('a project is compiled against the installed declarations, library checks on, and runs', () => {
  writeFileSync(join(project, 'main.ts'), script);
  const imports = entries.map(({ specifier }, index) => `export * as entry${index} from '${specifier}';`);
  writeFileSync(join(project, 'all.ts'), imports.join('\n'));

  for (const module of ['preserve', 'nodenext']) {
    const options = ['--strict', '--target', 'es2022', '--module', module];
    run(process.execPath, [compiler, ...options, 'main.ts', 'all.ts'], project);
  }
  const volts = Number(run(process.execPath, ['main.js'], project));

  // I·R·tanh(V/2V_T) at 25 °C, V_T = 25.69258 mV; the decimator passes DC to well below a part in a million.
  expect(volts / (100e-6 * 10e3 * Math.tanh(10 / (2 * 25.69258)))).toBeCloseTo(1, 6);
});
