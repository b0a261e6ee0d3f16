import type { Trace } from '../trace/trace.ts';
import { finiteRecord } from './finite-record.ts';

/**
 * Mean of a trace, in its unit. Over a part of a period a periodic signal has a mean of its own: cut the
 * trace to whole periods, or take `dc` of a tone fit, which knows the tones.
 *
 * @throws TailpairError `record-short`, `record-invalid`.
 */
export function dc(trace: Trace): number {
  return meanOf(finiteRecord(trace, 'dc'));
}

/** Mean of finite samples, in two passes: the second takes back what rounding cost the first. */
export function meanOf(samples: Float64Array): number {
  const rough = sumOver(samples, 0) / samples.length;
  return rough + sumOver(samples, rough) / samples.length;
}

function sumOver(samples: Float64Array, origin: number): number {
  let sum = 0;
  for (let i = 0; i < samples.length; i++) sum += samples[i]! - origin;
  return sum;
}
