import { describe, expect, test } from 'vitest';
import type { WaveFormat } from '../../../packages/core/src/trace/wave-format.ts';
import { waveHeader } from '../../../packages/core/src/trace/wave-header.ts';
import { readWave } from './read-wave.ts';

// RF64 after EBU Tech 3306 and ITU-R BS.2088 (from memory): a 64-bit size chunk first, 32-bit sizes all ones.
describe('a file beyond 32-bit sizes', () => {
  const format: WaveFormat = { rate: 48_000, channels: 2, encoding: 'pcm24' };
  // 24-bit stereo at 48 kHz reaches 4 GiB after 14 913.08 s.
  const [below, beyond] = [14_913.0 * 48_000, 14_913.1 * 48_000].map(Math.floor) as [number, number];

  test('is plain RIFF up to the limit', () => {
    const content = readWave(waveHeader(format, below));
    expect(content.chunks.map((chunk) => chunk.name)).toEqual(['JUNK', 'fmt ', 'data']);
    expect(content.dataSize).toBe(below * 6);
  });
  test('is RF64 with 64-bit sizes from there', () => {
    const header = waveHeader(format, beyond);
    const view = new DataView(header.buffer);
    const { chunks, dataSize } = readWave(header);
    expect(String.fromCharCode(...header.subarray(0, 4))).toBe('RF64');
    expect(view.getUint32(4, true)).toBe(0xffff_ffff);
    expect(chunks[0]).toMatchObject({ name: 'ds64', size: 28 });
    expect(chunks.at(-1)).toMatchObject({ name: 'data', size: 0xffff_ffff });
    expect(Number(view.getBigUint64(20, true))).toBe(header.length + beyond * 6 - 8);
    expect(dataSize).toBe(beyond * 6);
    expect(Number(view.getBigUint64(36, true))).toBe(beyond);
    expect(view.getUint32(44, true)).toBe(0);
  });
  test('has a header of the same length', () => {
    expect(waveHeader(format, beyond).length).toBe(waveHeader(format, 0).length);
  });
  test('states in the fact chunk what 32 bits hold', () => {
    const header = waveHeader({ ...format, encoding: 'float32' }, 5e9);
    const fact = readWave(header).chunks.find((chunk) => chunk.name === 'fact')!;
    expect(new DataView(header.buffer).getUint32(fact.at, true)).toBe(0xffff_ffff);
  });
});

test('an extensible header names its speakers and its sub-format', () => {
  const header = waveHeader({ rate: 96_000, channels: 2, encoding: 'pcm24' }, 0);
  const { at, size } = readWave(header).chunks.find((chunk) => chunk.name === 'fmt ')!;
  expect(size).toBe(40);
  // Valid bits 24, speakers front left and right, then the sixteen bytes of the integer sub-format.
  expect(Buffer.from(header.subarray(at + 16, at + 40)).toString('hex')).toBe(
    '16001800030000000100000000001000800000aa00389b71',
  );
});
