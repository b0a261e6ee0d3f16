import { breather } from '../engine/breathe.ts';
import { Run, requireGoing } from '../engine/run.ts';
import { type RunOptions, readLength, readOptions } from '../engine/run-options.ts';
import type { Patch } from '../patch/patch.ts';
import type { Warning } from '../patch/placed.ts';
import { TailpairError } from '../quantity/error.ts';
import { type ProbeTraces, probeTraces } from './probe-traces.ts';

/** What a simulation is told. */
export interface SimulateOptions<Probe extends string> extends RunOptions<Probe> {
  /** Length of the traces: a text such as `2 s`, or seconds. */
  readonly length: string | number;
  /** Told from time to time how much is done, 0 … 1. */
  readonly onProgress?: (done: number) => void;
}

/** What a run says about itself. */
export interface Diagnostics {
  /** Hz: rate of the traces, and rate at which the patch was stepped. */
  readonly rate: number;
  readonly internalRate: number;
  /** Internal samples computed. */
  readonly samples: number;
  /** What the patch itself warns of. */
  readonly warnings: readonly Warning[];
}

/** Traces of the probes, and what is to be known about the run. */
export interface Simulation<Probe extends string> {
  readonly traces: ProbeTraces<Probe>;
  readonly diagnostics: Diagnostics;
}

/** Samples that one simulation may hold: two gigabytes of them. */
const mostSamples = 2 ** 28;

function requireRoom(samples: number): void {
  if (samples <= mostSamples) return;
  throw new TailpairError(
    'value-range',
    `the traces would hold ${samples} samples, ${mostSamples} are allowed; shorten the run, or take it piece by piece with stream`,
    { where: 'length' },
  );
}

/** Chunks between two looks at the clock. */
const chunksPerLook = 16;

/**
 * Runs a patch from rest and records its probes.
 *
 * Every trace starts at time 0 and has one sample per 1/rate; what lies above the audible band is
 * removed on the way down from the internal rate (flat to 20 kHz at 48 kHz).
 *
 * @throws TailpairError for options out of range, `unknown-port` for a probe that is no output,
 *   `loop`, `not-finite`, `no-solution` or `event-storm` from the patch, `aborted` when stopped
 */
export async function simulate<const Output extends string, const Probe extends Output>(
  patch: Patch<Output>,
  options: SimulateOptions<Probe>,
): Promise<Simulation<Probe>> {
  const read = readOptions(options);
  const run = new Run(patch, options.probes, read);
  const count = readLength(options.length, run.rate);
  requireRoom(count * options.probes.length);
  const samples = options.probes.map(() => new Float64Array(count));
  const total = run.samplesFor(count);
  const breathe = breather();
  let filled = 0;
  let computed = 0;
  for (let chunks = 0; computed < total; chunks++) {
    if (chunks % chunksPerLook === 0) {
      requireGoing(options.signal, computed / (read.rate * read.oversample));
      options.onProgress?.(computed / total);
      await breathe();
    }
    const step = run.advance(total - computed, samples, filled);
    computed += step.computed;
    filled += step.appended;
  }
  options.onProgress?.(1);
  const traces = options.probes.map((name, i) => ({
    name,
    unit: run.units[i]!,
    rate: run.rate,
    start: 0,
    samples: samples[i]!,
  }));
  return {
    traces: probeTraces<Probe>(traces),
    diagnostics: {
      rate: run.rate,
      internalRate: read.rate * read.oversample,
      samples: computed,
      warnings: patch.warnings,
    },
  };
}
