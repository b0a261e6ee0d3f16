import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { WaveFile } from 'wavefile';
import { waveEncoder } from '../../../packages/core/src/trace/wave-encoder.ts';
import type { WaveEncoding } from '../../../packages/core/src/trace/wave-format.ts';
import { joinWave, readWave } from './read-wave.ts';

const file = (options: Parameters<typeof waveEncoder>[0], ...blocks: Float64Array[][]): Uint8Array => {
  const encoder = waveEncoder(options);
  const data = blocks.map((block) => encoder.encode(block));
  const { header, padding } = encoder.finish();
  expect(header.length).toBe(encoder.header.length);
  return joinWave(header, ...data, padding);
};
const plain = { rate: 48_000, fullScale: 1, dither: false };

describe('files read as those put together field by field elsewhere', () => {
  const stored = readFileSync(new URL('../../reference/wave/wave-files.csv', import.meta.url), 'utf8')
    .trim()
    .split('\n')
    .slice(1);
  const references = stored.map((line) =>
    readWave(Uint8Array.from(Buffer.from(line.slice(line.lastIndexOf(',') + 1), 'hex'))),
  );
  const full24 = 2 ** 23;
  const ours = [
    file({ ...plain, channels: 1, encoding: 'pcm24' }, [
      Float64Array.of(0, (full24 - 1) / full24, -1, 1 / full24),
    ]),
    file({ ...plain, channels: 1, encoding: 'pcm16' }, [Float64Array.of(0, 1 / 2 ** 15)]),
    file({ ...plain, channels: 2, encoding: 'float32' }, [Float64Array.of(0, 0.5), Float64Array.of(1, -1)]),
    file({ ...plain, channels: 2, encoding: 'pcm24' }, [
      Float64Array.of(0, -1),
      Float64Array.of((full24 - 1) / full24, 1 / full24),
    ]),
  ].map(readWave);

  test.each(ours.map((content, index) => ({ content, reference: references[index]! })))(
    'file %#',
    ({ content, reference }) => {
      const { tag, channels, rate, bits, frameSize, dataSize, samples } = reference;
      expect(content).toMatchObject({ tag, channels, rate, bits, frameSize, dataSize, samples });
    },
  );
});

describe.each(['pcm16', 'pcm24', 'float32', 'float64'] as WaveEncoding[])('%s', (encoding) => {
  const bits = Number(encoding.slice(-2));
  const left = Float64Array.from({ length: 101 }, (_, i) => 4 * Math.sin(i));
  const right = Float64Array.from({ length: 101 }, (_, i) => -2 * Math.cos(i));

  test.each([1, 2, 3])('%d channels: sizes, alignment and order of the chunks', (channels) => {
    const bytes = file(
      { ...plain, encoding, channels, fullScale: 5 },
      Array.from({ length: channels }, () => left),
    );
    const { chunks, dataAt, dataSize, isExtensible, frameSize } = readWave(bytes);
    expect(new DataView(bytes.buffer).getUint32(4, true)).toBe(bytes.length - 8);
    expect(chunks[0]).toMatchObject({ name: 'JUNK', size: 28 });
    expect(dataAt % 8).toBe(0);
    expect(dataSize).toBe(101 * frameSize);
    expect(dataAt + dataSize + (dataSize % 2)).toBe(bytes.length);
    expect(isExtensible).toBe(channels > 2 || bits === 24);
    expect(chunks.some((chunk) => chunk.name === 'fact')).toBe(bits === 32 || bits === 64);
  });

  test('a general reader finds the samples', () => {
    const reader = new WaveFile(file({ ...plain, encoding, channels: 2, fullScale: 5 }, [left, right]));
    const format = reader.fmt as { sampleRate: number; numChannels: number; bitsPerSample: number };
    expect(format).toMatchObject({ sampleRate: 48_000, numChannels: 2, bitsPerSample: bits });
    const scale = bits < 32 ? 2 ** (bits - 1) : 1;
    // Half a step of the integers, or half a unit in the last place of the floating point.
    const half = bits < 32 ? 0.5 : 2 ** (bits === 32 ? -25 : -54);
    [left, right].forEach((samples, channel) => {
      for (let i = 0; i < samples.length; i++) {
        expect(Math.abs(reader.getSample(i * 2 + channel) - (samples[i]! / 5) * scale)).toBeLessThanOrEqual(
          half * (1 + 1e-9),
        );
      }
    });
  });
});
