/**
 * What a design script on Node needs beside the library itself: files.
 *
 * @packageDocumentation
 */

export { type SaveWavOptions, type StreamWavOptions, saveWav, streamWav } from './save-wav.ts';
export type { SavedWav, WavOptions } from './write-wav.ts';
