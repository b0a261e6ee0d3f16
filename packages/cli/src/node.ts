/**
 * What a design script on Node needs beside the library itself: files.
 *
 * @packageDocumentation
 */

export { type SavedWav, type SaveWavOptions, saveWav } from './save-wav.ts';
