/**
 * Measurements on traces: pure numbers, with no notion of the blocks that made them.
 *
 * @packageDocumentation
 */

export { fitTones, type Tone, type ToneFit } from './analysis/fit-tones.ts';
export type { Frequency } from './analysis/frequency.ts';
export { type Harmonic, type HarmonicsOptions, harmonics } from './analysis/harmonics.ts';
export { thd, thdR } from './analysis/thd.ts';
export { type Sideband, type SidebandsOptions, sidebands } from './analysis/sidebands.ts';
export { type ModulationDepthOptions, modulationDepth } from './analysis/modulation-depth.ts';
export { level } from './analysis/level.ts';
export { peak } from './analysis/peak.ts';
export { dc } from './analysis/dc.ts';
