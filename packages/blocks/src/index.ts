/**
 * The kinds of block: sources, bias networks, cells and loads.
 *
 * @packageDocumentation
 */

export { bias } from './bias.ts';
export { buffer } from './buffer.ts';
export { constant } from './constant.ts';
export { coupling } from './coupling.ts';
export { currentDrive } from './current-drive.ts';
export { currentSource } from './current-source.ts';
export { divider } from './divider.ts';
export { envelope } from './envelope.ts';
export { gate } from './gate.ts';
export { lfo } from './lfo.ts';
export { load } from './load.ts';
export { mixer } from './mixer.ts';
export { oscillator } from './oscillator.ts';
export { ota } from './ota.ts';
