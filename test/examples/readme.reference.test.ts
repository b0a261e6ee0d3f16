import { execFileSync } from 'node:child_process';
import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { root } from '../workspace/root.ts';

test('the script of the README prints the numbers beside it', () => {
  const readme = readFileSync(`${root}/README.md`, 'utf8');
  const script = /```ts\n(.*?)```/s.exec(readme)![1]!;
  const printed = /```text\n(.*?)```/s.exec(readme)![1]!;
  // Beside the sources, so that the packages resolve as they do for a reader of the repository.
  const file = `${root}/out-readme-script.ts`;
  writeFileSync(file, script);
  try {
    const shown = execFileSync('npx', ['tsx', '--conditions=@tailpair/source', file], {
      cwd: root,
      encoding: 'utf8',
    });
    expect(shown).toBe(printed);
  } finally {
    rmSync(file);
  }
  // From outside: the Fourier series of tanh at 50 mV peak and 25 °C gives 6.4148 %; an independent
  // solution of the bias pin by Lambert W gives sidebands of 0.262251 of the carrier, −11.626 dBc.
  expect(printed).toContain('thd 0.06415');
  expect(printed).toContain('sideband 1 -11.626 dBc');
});
