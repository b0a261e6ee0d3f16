import { readFileSync } from 'node:fs';

/** Rows of a table of numbers in this folder, without its header line. */
export function table(path: string): number[][] {
  return readFileSync(new URL(path, import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => line.split(',').map(Number));
}
