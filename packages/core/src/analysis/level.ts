import type { Trace } from '../trace/trace.ts';
import { meanOf } from './dc.ts';
import { finiteRecord } from './finite-record.ts';

/**
 * Level of a trace without its DC: √(mean of (x − mean)²), in its unit, rms. A sine of 1 V peak has
 * 1/√2 V over whole periods.
 *
 * @throws TailpairError `record-short`, `record-invalid`.
 */
export function level(trace: Trace): number {
  const samples = finiteRecord(trace, 'level');
  const mean = meanOf(samples);
  let sum = 0;
  for (let i = 0; i < samples.length; i++) sum += (samples[i]! - mean) ** 2;
  return Math.sqrt(sum / samples.length);
}
