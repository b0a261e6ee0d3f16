import { TailpairError } from '../quantity/error.ts';
import { formatQuantity } from '../quantity/format-quantity.ts';
import type { Trace } from '../trace/trace.ts';
import { type SidebandsOptions, sidebands } from './sidebands.ts';

/** What to measure the depth of. */
export type ModulationDepthOptions = Pick<SidebandsOptions, 'carrier' | 'modulator'>;

/**
 * Depth of amplitude modulation from the first-order sidebands: m = (a₋₁ + a₊₁)/a₀, as a ratio. A carrier
 * whose amplitude follows 1 + m·sin has sidebands of m/2 (any communications text: A. Carlson,
 * Communication Systems, from memory), and unlike the envelope's extremes this holds above m = 1 too. It
 * does not ask whether the lines come from amplitude or from phase: a pure frequency modulation
 * has a depth by this measure as well.
 *
 * @throws TailpairError as {@link sidebands} does, and `record-invalid` where a first-order line is shared with
 * another product, as with a modulator at half the carrier.
 * @example modulationDepth(load.out, { carrier: '1 kHz', modulator: '100 Hz' })
 */
export function modulationDepth(trace: Trace, options: ModulationDepthOptions): number {
  const { carrier, modulator } = options;
  const [lower, centre, upper] = sidebands(trace, { carrier, modulator, orders: 1 });
  for (const line of [lower!, upper!]) {
    if (line.sharedWith === undefined) continue;
    throw new TailpairError(
      'record-invalid',
      `the sideband of order ${line.order} at ${formatQuantity(line.frequency, 'Hz')} falls on ${line.sharedWith}; choose another modulator frequency`,
      { where: 'modulationDepth' },
    );
  }
  return (lower!.amplitude + upper!.amplitude) / centre!.amplitude;
}
