import { join } from 'node:path';
import ts from 'typescript';
import { expect, test } from 'vitest';
import { root } from './root.ts';

const probe = `
export const ways: unknown[] = [
  console,
  process,
  Buffer,
  setTimeout,
  document,
  window,
  fetch,
];
export * from 'node:fs';
`;

/** Compiles a package as its own configuration says, with one more file in it, and returns that file's faults. */
function faultsOfProbe(name: string): string[] {
  const folder = join(root, 'packages', name);
  const { config } = ts.readConfigFile(join(folder, 'tsconfig.json'), ts.sys.readFile);
  const { fileNames, options } = ts.parseJsonConfigFileContent(config, ts.sys, folder);
  const probeFile = join(folder, 'src', 'probe.ts');
  const host = ts.createCompilerHost(options);
  const { fileExists, getSourceFile } = host;
  host.fileExists = (file) => file === probeFile || fileExists(file);
  host.getSourceFile = (file, version) =>
    file === probeFile ? ts.createSourceFile(file, probe, version) : getSourceFile(file, version);
  const program = ts.createProgram([...fileNames, probeFile], { ...options, noEmit: true }, host);

  return program
    .getSemanticDiagnostics(program.getSourceFile(probeFile))
    .map(
      (fault) => /'([\w:]+)'/.exec(ts.flattenDiagnosticMessageText(fault.messageText, '\n'))?.[1] ?? 'other',
    );
}

test.each(['core', 'blocks'])('%s compiles without the types of Node and of browsers', (name) => {
  expect(faultsOfProbe(name)).toEqual([
    'console',
    'process',
    'Buffer',
    'setTimeout',
    'document',
    'window',
    'fetch',
    'node:fs',
  ]);
});

test('cli is compiled with the types of Node, so the probe tells the difference', () => {
  expect(faultsOfProbe('cli')).toEqual(['document', 'window']);
});
