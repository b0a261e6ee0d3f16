import type { Trace } from '../trace/trace.ts';
import { resolutionOf } from './record-resolution.ts';

/** Most lines fitted at once: enough for what is audible, and a fit of a second's record stays far below a second. */
const mostLines = 256;

/**
 * The lines to measure followed by those of `others` (Hz, most important first) that a record can tell
 * apart from them, from each other, from DC and from the image about half the rate. A fit of all of them
 * keeps the others from biasing the lines measured.
 */
export function accompany(
  trace: Trace,
  measured: readonly number[],
  others: Iterable<number>,
): readonly number[] {
  const resolution = resolutionOf(trace);
  const highest = (trace.rate - resolution) / 2;
  const lines = [...measured];
  for (const line of others) {
    if (lines.length >= mostLines) break;
    if (line < resolution || line > highest) continue;
    if (lines.every((taken) => Math.abs(taken - line) >= resolution)) lines.push(line);
  }
  return lines;
}
