import { interpreter } from '../equation/kernel/interpreter.ts';
import { javascript } from '../equation/kernel/javascript.ts';
import type { BackEnd } from '../equation/kernel/kernel.ts';
import { nearestName } from '../quantity/did-you-mean.ts';
import { dimensions } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { requireRange, requireWhole } from '../quantity/guard.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';

/** What a run is told, beside its length. */
export interface RunOptions<Probe extends string> {
  /** Outputs to record, as `block.port`. */
  readonly probes: readonly Probe[];
  /** Samples per second of the traces: a text, or hertz. Default 48 kHz. */
  readonly rate?: string | number;
  /** Internal samples per sample of a trace: 1, 2, 4, 8, 16 or 32. Default 4. */
  readonly oversample?: number;
  /** Whether traces are brought down to `rate` (default) or kept at the internal rate, raw. */
  readonly decimate?: boolean;
  /**
   * What becomes of steps and corners. `sampled` (default): signals are point samples, and what
   * their edges fold back is left. `carried`: edges travel with their exact time through every block
   * and are corrected once, where a probe takes them. A pole above about 16 kHz ahead of a bend wants
   * more oversampling; see docs/edges.md.
   */
  readonly edges?: 'sampled' | 'carried';
  /** Stops the run when it becomes aborted; an `AbortSignal` will do. */
  readonly signal?: { readonly aborted: boolean };
  /** Internal samples computed at a time, default 128. Changes the speed, never a sample. */
  readonly chunk?: number;
  /** How equations are computed: compiled (default), or by the slow reference interpreter. */
  readonly backEnd?: 'compiled' | 'interpreted';
}

/** The options of a run, read and checked. */
export interface ReadOptions {
  readonly rate: number;
  readonly oversample: number;
  readonly decimate: boolean;
  readonly chunk: number;
  readonly backEnd: BackEnd;
  readonly carry: boolean;
}

/** Reads what the options say about the computation. */
export function readOptions({
  rate = 48000,
  oversample = 4,
  decimate = true,
  chunk = 128,
  backEnd = 'compiled',
  edges = 'sampled',
}: RunOptions<string>): ReadOptions {
  const hertz = parseQuantity(rate, dimensions.frequency, { where: 'rate', bare: true });
  requireRange(hertz, { where: 'rate', above: 0, unit: dimensions.frequency });
  requireWhole(oversample, { where: 'oversample', min: 1, max: 32 });
  requireWhole(chunk, { where: 'chunk', min: 1 });
  if (backEnd !== 'compiled' && backEnd !== 'interpreted') {
    throw new TailpairError('value-kind', `must be compiled or interpreted, got ${String(backEnd)}`, {
      where: 'backEnd',
    });
  }
  if (edges !== 'sampled' && edges !== 'carried') {
    throw new TailpairError('value-kind', `must be sampled or carried, got ${String(edges)}`, {
      where: 'edges',
    });
  }
  return {
    rate: hertz,
    oversample,
    decimate,
    chunk,
    backEnd: backEnd === 'compiled' ? javascript : interpreter,
    carry: edges === 'carried',
  };
}

/**
 * Reads a length of time as a number of samples of a trace.
 *
 * @throws TailpairError `value-range` where it is not above 0 or shorter than one sample
 */
export function readLength(length: string | number, rate: number): number {
  const seconds = parseQuantity(length, dimensions.time, { where: 'length', bare: true });
  requireRange(seconds, { where: 'length', unit: dimensions.time, min: 1 / rate });
  return Math.round(seconds * rate);
}

/** The fault of a probe that names no output. */
export function unknownProbe(probe: string, outputs: Iterable<string>): TailpairError {
  const known = [...outputs];
  const near = nearestName(probe, known);
  const cure = near === undefined ? `the outputs are ${known.join(', ')}` : `did you mean ${near}?`;
  return new TailpairError('unknown-port', `${probe} is no output of the patch; ${cure}`, {
    where: 'probes',
  });
}
