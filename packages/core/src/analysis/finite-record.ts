import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import type { Trace } from '../trace/trace.ts';

/**
 * The samples of a trace, known to be there and finite.
 *
 * @throws TailpairError `record-short` for a trace without samples, `record-invalid` for a sample that is
 * not finite.
 */
export function finiteRecord(trace: Trace, where: string): Float64Array {
  const { samples } = trace;
  if (samples.length === 0) {
    throw new TailpairError('record-short', `${trace.name} holds no samples; record at least one`, { where });
  }
  // A sum is finite only where every term is, so the common case needs no test per sample.
  let sum = 0;
  for (let i = 0; i < samples.length; i++) sum += Math.abs(samples[i]!);
  if (Number.isFinite(sum)) return samples;
  const bad = samples.findIndex((value) => !Number.isFinite(value));
  if (bad < 0) return samples;
  throw new TailpairError(
    'record-invalid',
    `sample ${bad} of ${trace.name} at ${formatQuantity(trace.start + bad / trace.rate, 's', 9)} is ${samples[bad]}; only finite samples can be measured`,
    { where },
  );
}
