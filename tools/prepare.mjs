// Installs the locked packages when any is missing or differs, so that `npm start` and `npm test`
// need nothing typed before. Uses Node alone, for on a fresh clone there is nothing else.
import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));

function packagesOf(lockFile) {
  try {
    return JSON.parse(readFileSync(`${root}${lockFile}`, 'utf8')).packages;
  } catch (error) {
    if (error.code === 'ENOENT') return {};
    throw error;
  }
}

const installed = packagesOf('node_modules/.package-lock.json');
const stale = Object.entries(packagesOf('package-lock.json')).some(
  ([path, locked]) =>
    path.startsWith('node_modules/') &&
    !locked.optional &&
    (!installed[path] ||
      installed[path].version !== locked.version ||
      installed[path].integrity !== locked.integrity),
);

if (stale) {
  const npm = process.env.npm_execpath;
  const [command, ...first] = npm ? [process.execPath, npm] : ['npm'];
  const { error, status } = spawnSync(command, [...first, 'ci', '--include=dev'], {
    cwd: root,
    stdio: 'inherit',
  });
  if (error) throw error;
  process.exitCode = status ?? 1;
}
