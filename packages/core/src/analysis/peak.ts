import type { Trace } from '../trace/trace.ts';
import { finiteRecord } from './finite-record.ts';

/**
 * Largest magnitude among the samples of a trace, in its unit, DC included. The waveform between two
 * samples may reach higher: a full-band signal by some decibels at the output rate.
 *
 * @throws TailpairError `record-short`, `record-invalid`.
 */
export function peak(trace: Trace): number {
  const samples = finiteRecord(trace, 'peak');
  let largest = 0;
  for (let i = 0; i < samples.length; i++) largest = Math.max(largest, Math.abs(samples[i]!));
  return largest;
}
