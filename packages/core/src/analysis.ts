/**
 * Measurements on traces: pure numbers, with no notion of the blocks that made them.
 *
 * @packageDocumentation
 */

export { dc } from './analysis/dc.ts';
export type { Tone } from './analysis/fit-lines.ts';
export { fitTones, type ToneFit } from './analysis/fit-tones.ts';
export type { Frequency } from './analysis/frequency.ts';
export { type Harmonic, type HarmonicsOptions, harmonics } from './analysis/harmonics.ts';
export { level } from './analysis/level.ts';
export { type ModulationDepthOptions, modulationDepth } from './analysis/modulation-depth.ts';
export { peak } from './analysis/peak.ts';
export { type Sideband, type SidebandsOptions, sidebands } from './analysis/sidebands.ts';
export { thd, thdR } from './analysis/thd.ts';
