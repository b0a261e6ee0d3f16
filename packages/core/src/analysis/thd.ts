import type { Trace } from '../trace/trace.ts';
import { type HarmonicsOptions, harmonics } from './harmonics.ts';

/**
 * Total harmonic distortion referred to the fundamental, THD_F = √(ΣVₙ², n = 2 … highest)/V₁, as a ratio
 * (0.01 is 1 %). Highest order 9 unless given. Other conventions refer to the total: {@link thdR}.
 *
 * @throws TailpairError as {@link harmonics} does.
 * @example thd(load.out, { fundamental: '1 kHz' })
 */
export function thd(trace: Trace, options: HarmonicsOptions): number {
  const [fundamental, ...rest] = harmonics(trace, options);
  return Math.hypot(...rest.map((harmonic) => harmonic.amplitude)) / fundamental!.amplitude;
}

/**
 * Total harmonic distortion referred to the rms of fundamental and harmonics together, as IEC 60268-3
 * does (from memory): THD_R = THD_F/√(1 + THD_F²), a ratio that stays below 1.
 *
 * @throws TailpairError as {@link harmonics} does.
 */
export function thdR(trace: Trace, options: HarmonicsOptions): number {
  const ratio = thd(trace, options);
  return ratio / Math.hypot(1, ratio);
}
