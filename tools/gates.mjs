// Runs the package scripts that guard the repository, quick and static ones first, two lanes side by side.
// `npm test -- lint boundaries` runs only those named.
import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const live = 'unit';
const phases = [
  [['build'], ['lint', 'boundaries']],
  [
    ['typecheck', 'package'],
    ['unused', 'docs:check'],
  ],
  [[live]],
];
const named = process.argv.slice(2);
const all = phases.flat(2);
const unknown = named.filter((gate) => !all.includes(gate));

if (unknown.length > 0) {
  console.error(`No gate named ${unknown.join(', ')}; there are ${all.join(', ')}`);
  process.exit(2);
}

let failure = 0;

/** Runs one gate; its output is held back until it fails, unless it is the live one. */
function run(gate) {
  const started = performance.now();
  const output = [];
  const child = spawn(`npm run --silent ${gate}`, {
    cwd: root,
    shell: true,
    stdio: gate === live ? ['ignore', 'inherit', 'inherit'] : ['ignore', 'pipe', 'pipe'],
  });
  child.stdout?.on('data', (data) => output.push(data));
  child.stderr?.on('data', (data) => output.push(data));
  return new Promise((resolve, reject) => {
    child.on('error', reject);
    child.on('close', (code) => {
      const seconds = ((performance.now() - started) / 1000).toFixed(1);
      console.log(`${code === 0 ? 'ok    ' : 'FAILED'} ${gate} (${seconds} s)`);
      if (code !== 0) process.stdout.write(Buffer.concat(output));
      failure ||= code ?? 1;
      resolve();
    });
  });
}

/** Runs gates one after another until any gate anywhere fails. */
async function runLane(gates) {
  for (const gate of gates) {
    if (failure === 0 && (named.length === 0 || named.includes(gate))) await run(gate);
  }
}

for (const lanes of phases) await Promise.all(lanes.map(runLane));
process.exitCode = failure;
