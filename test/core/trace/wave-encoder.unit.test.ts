import { describe, expect, test } from 'vitest';
import { waveEncoder } from '../../../packages/core/src/trace/wave-encoder.ts';
import type { WaveEncoding } from '../../../packages/core/src/trace/wave-format.ts';
import { joinWave, readWave } from './read-wave.ts';

const options = { rate: 48_000, channels: 1, encoding: 'pcm16', fullScale: 10 } as const;
const sine = Float64Array.from({ length: 1000 }, (_, i) => 9 * Math.sin(i / 7));

describe('waveEncoder', () => {
  test('gives the same bytes for any division into blocks', () => {
    const whole = waveEncoder({ ...options, channels: 2 });
    const parts = waveEncoder({ ...options, channels: 2 });
    const cuts = [0, 1, 130, 131, 999, 1000];
    const pieces = cuts
      .slice(1)
      .map((to, i) => parts.encode([sine.subarray(cuts[i]!, to), sine.subarray(cuts[i]!, to)]));
    expect(joinWave(parts.header, ...pieces)).toEqual(joinWave(whole.header, whole.encode([sine, sine])));
    expect(parts.finish()).toEqual(whole.finish());
  });
  test('dithers each channel by itself, and the same for the same seed', () => {
    const bytes = (seed: number): Uint8Array =>
      waveEncoder({ ...options, channels: 2, seed }).encode([sine, sine]);
    const codes = new Int16Array(bytes(1).buffer);
    expect(codes.some((code, i) => i % 2 === 0 && code !== codes[i + 1])).toBe(true);
    expect(bytes(1)).toEqual(bytes(1));
    expect(bytes(1)).not.toEqual(bytes(2));
  });
  test('limits integers to full scale and counts them', () => {
    const encoder = waveEncoder({ ...options, dither: false });
    const codes = new Int16Array(encoder.encode([Float64Array.of(-11, -10, 9.9996, 10, 1e9)]).buffer);
    expect([...codes]).toEqual([-32_768, -32_768, 32_767, 32_767, 32_767]);
    expect(encoder.finish()).toMatchObject({ clipped: 3, frames: 5 });
  });
  test('keeps floating point beyond full scale', () => {
    const encoder = waveEncoder({ ...options, encoding: 'float64' });
    expect([...new Float64Array(encoder.encode([Float64Array.of(25)]).buffer)]).toEqual([2.5]);
    expect(encoder.finish().clipped).toBe(0);
  });
  test('ends an odd number of bytes with a padding byte that the chunk does not count', () => {
    const encoder = waveEncoder({ ...options, encoding: 'pcm24' });
    const data = encoder.encode([Float64Array.of(1)]);
    const { header, padding } = encoder.finish();
    const bytes = joinWave(header, data, padding);
    expect(readWave(bytes).dataSize).toBe(3);
    expect(bytes.length % 2).toBe(0);
    expect(new DataView(bytes.buffer).getUint32(4, true)).toBe(bytes.length - 8);
  });
  test.each([
    [{ channels: 0 }, 'channels'],
    [{ rate: 48_000.5 }, 'rate'],
    [{ encoding: 'pcm8' as WaveEncoding }, 'encoding'],
  ])('refuses %j', (change, where) => {
    expect(() => waveEncoder({ ...options, ...change })).toThrowError(
      expect.objectContaining({ code: 'wave-format', where }),
    );
  });
  test.each([0, -1, Number.NaN])('refuses a full scale of %d', (fullScale) => {
    expect(() => waveEncoder({ ...options, fullScale })).toThrowError(
      expect.objectContaining({ code: 'value-range', where: 'fullScale' }),
    );
  });
  test('refuses a block that does not fit the channels', () => {
    expect(() => waveEncoder({ ...options, channels: 2 }).encode([sine])).toThrowError(
      expect.objectContaining({ code: 'wave-format' }),
    );
    expect(() => waveEncoder({ ...options, channels: 2 }).encode([sine, sine.subarray(1)])).toThrowError(
      /\[1000, 999\]/,
    );
  });
  test('refuses a sample that is not finite', () => {
    expect(() => waveEncoder(options).encode([Float64Array.of(0, Number.NaN)])).toThrowError(
      expect.objectContaining({
        code: 'not-finite',
        message: 'encode: frame 1 of channel 0 is NaN; only finite samples are written',
      }),
    );
  });
});
