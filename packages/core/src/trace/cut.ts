import { dimensions } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';
import { durationOf, type Trace } from './trace.ts';

/** Which part of a trace to keep. Times are texts with a unit (`'0.5 s'`) or bare numbers in seconds. */
export interface CutOptions {
  /** Time of the first sample kept, on the clock of the run. Default: the start of the trace. */
  readonly from?: string | number;
  /** Time of the first sample no longer kept. Default: the end of the trace. */
  readonly to?: string | number;
  /** Length kept, in place of `to`. */
  readonly length?: string | number;
}

/** Share of a sample by which a time may miss the grid and still mean the grid point: forgives rounding only. */
const gridSlack = 1e-6;

/**
 * The part of a trace from `from` up to, not including, `to`: a view onto the same samples, nothing is
 * copied. A cut of a whole number of periods needs `length` = periods / frequency, from anywhere.
 *
 * @returns a trace whose `start` is the exact time of its first sample, which is `from` rounded up to the grid.
 * @throws TailpairError `value-range` where a time lies outside the trace or both `to` and `length` are given,
 * `record-short` where no sample is left.
 * @example cut(traces.load.out, { from: '0.5 s', length: '1 s' })
 */
export function cut(trace: Trace, options: CutOptions): Trace {
  const where = 'cut';
  const { rate, start, samples } = trace;
  if (options.to !== undefined && options.length !== undefined) {
    throw new TailpairError('value-range', 'both to and length are given; leave one of them out', { where });
  }
  const end = start + durationOf(trace);
  const from = options.from === undefined ? start : seconds(options.from, 'cut.from');
  let to = end;
  if (options.to !== undefined) to = seconds(options.to, 'cut.to');
  if (options.length !== undefined) to = from + seconds(options.length, 'cut.length');

  const indexOf = (time: number, option: string): number => {
    const index = Math.ceil((time - start) * rate - gridSlack);
    if (index >= 0 && index <= samples.length) return index;
    throw new TailpairError(
      'value-range',
      `${show(time)} lies outside the trace, which spans ${show(start)} to ${show(end)}`,
      { where: `${where}.${option}` },
    );
  };
  const first = indexOf(from, 'from');
  const last = indexOf(to, options.length === undefined ? 'to' : 'length');
  if (last <= first) {
    throw new TailpairError(
      'record-short',
      `no sample of ${trace.name} lies between ${show(from)} and ${show(to)}; choose a longer part`,
      { where },
    );
  }
  return { ...trace, start: start + first / rate, samples: samples.subarray(first, last) };
}

function seconds(input: string | number, where: string): number {
  return parseQuantity(input, dimensions.time, { where, bare: true });
}

function show(time: number): string {
  return formatQuantity(time, 's', 9);
}
