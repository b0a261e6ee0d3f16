import { breather } from '../engine/breathe.ts';
import { Run, requireGoing } from '../engine/run.ts';
import { type RunOptions, readLength, readOptions } from '../engine/run-options.ts';
import type { Patch } from '../patch/patch.ts';
import { TailpairError } from '../quantity/error.ts';
import { requireWhole } from '../quantity/guard.ts';
import { type ProbeTraces, probeTraces } from './probe-traces.ts';

/** What a stream is told. */
export interface StreamOptions<Probe extends string> extends RunOptions<Probe> {
  /** Length of the whole: a text such as `2 s`, or seconds. Default: until it is no longer read. */
  readonly length?: string | number;
  /** Samples in each piece, default 4096; the last may be shorter. */
  readonly piece?: number;
}

/**
 * Runs a patch and hands its probes over piece by piece, in memory that does not depend on the
 * length. The pieces joined are, bit for bit, the traces of `simulate`.
 *
 * @throws TailpairError as `simulate`
 */
export async function* stream<const Output extends string, const Probe extends Output>(
  patch: Patch<Output>,
  options: StreamOptions<Probe>,
): AsyncGenerator<ProbeTraces<Probe>, void, undefined> {
  const read = readOptions(options);
  if (options.probes.length === 0)
    throw new TailpairError('value-range', 'name at least one output to be recorded', { where: 'probes' });
  const piece = requireWhole(options.piece ?? 4096, { where: 'piece', min: 1 });
  const run = new Run(patch, options.probes, read);
  const count =
    options.length === undefined ? Number.POSITIVE_INFINITY : readLength(options.length, run.rate);
  const total = run.samplesFor(count);
  // One chunk may complete samples beyond the piece; they open the next.
  const buffers = options.probes.map(() => new Float64Array(piece + read.chunk + 1));
  const breathe = breather();
  let filled = 0;
  let given = 0;
  let computed = 0;
  while (given < count) {
    requireGoing(options.signal, computed / (read.rate * read.oversample));
    while (filled < piece && computed < total) {
      const step = run.advance(total - computed, buffers, filled);
      computed += step.computed;
      filled += step.appended;
    }
    const length = Math.min(piece, filled);
    yield probeTraces<Probe>(
      options.probes.map((name, i) => ({
        name,
        unit: run.units[i]!,
        rate: run.rate,
        start: given / run.rate,
        samples: buffers[i]!.slice(0, length),
      })),
    );
    for (const buffer of buffers) buffer.copyWithin(0, length, filled);
    filled -= length;
    given += length;
    await breathe();
  }
}
