import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { saveWav, streamWav } from '@tailpair/cli/node';
import { cut, type Trace } from '@tailpair/core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { readWave } from '../core/trace/read-wave.ts';

const trace: Trace = {
  name: 'load.out',
  unit: 'V',
  rate: 48_000,
  start: 0,
  samples: Float64Array.from({ length: 40_000 }, (_, i) => 2 * Math.sin((2 * Math.PI * i) / 40)),
};
const map = (change: (value: number) => number): Trace => ({ ...trace, samples: trace.samples.map(change) });

describe('saveWav', () => {
  let folder = '';
  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'tailpair-'));
  });
  afterAll(() => rm(folder, { recursive: true }));
  const read = async (path: string): Promise<ReturnType<typeof readWave>> => readWave(await readFile(path));

  test('writes a trace against a full scale, whole and under its own name only', async () => {
    const path = join(folder, 'horn.wav');
    const saved = await saveWav(path, trace, { fullScale: '10 V', encoding: 'float64' });
    expect(saved).toMatchObject({
      path,
      encoding: 'float64',
      fullScale: 10,
      clipped: 0,
      seconds: 40_000 / 48_000,
      warnings: [],
    });
    expect(saved.peak).toBeCloseTo(20 * Math.log10(0.2), 12);
    const content = await read(path);
    expect(content).toMatchObject({ rate: 48_000, channels: 1, bits: 64, dataSize: 320_000 });
    expect(Float64Array.from(content.samples)).toEqual(trace.samples.map((value) => value / 10));
    expect(await readdir(folder)).toEqual(['horn.wav']);
  });

  test('brings the peak to −6 dBFS where no full scale is given, and tells the one it took', async () => {
    const path = join(folder, 'new', 'rest.wav');
    const saved = await saveWav(path, trace);
    expect(saved).toMatchObject({ encoding: 'pcm24', warnings: [] });
    expect(saved.peak).toBeCloseTo(-6, 12);
    const content = await read(path);
    // One step of dither either way.
    expect(Math.abs(Math.max(...content.samples) - 10 ** (-6 / 20) * 2 ** 23)).toBeLessThan(2);
    expect(saved.fullScale).toBeCloseTo(2 / 10 ** (-6 / 20), 12);
  });

  test('writes several traces as channels', async () => {
    const path = join(folder, 'two.wav');
    await saveWav(path, [trace, map((v) => -v)], { fullScale: 4, encoding: 'float32' });
    const { channels, samples } = await read(path);
    expect(channels).toBe(2);
    expect(samples[21]).toBe(-samples[20]!);
  });

  test('warns of clipping, of DC and of hardly a signal', async () => {
    const path = join(folder, 'warn.wav');
    const clipping = await saveWav(path, trace, { fullScale: '1 V', dither: false });
    expect(clipping.clipped).toBeGreaterThan(0);
    expect(clipping.warnings).toEqual([expect.stringMatching(/samples are limited to full scale/)]);
    expect(
      (
        await saveWav(
          path,
          map((v) => v + 0.1),
        )
      ).warnings,
    ).toEqual([expect.stringMatching(/V of DC/)]);
    const faint = await saveWav(
      path,
      map((v) => v * 1e-4),
    );
    expect(faint.warnings).toEqual([expect.stringMatching(/hardly a signal/)]);
    expect(faint.fullScale).toBe(1);
    expect(
      (
        await saveWav(
          path,
          map(() => 0),
        )
      ).peak,
    ).toBe(-Infinity);
  });

  test('leaves an older file and no other behind when it fails', async () => {
    const place = await mkdtemp(join(folder, 'fail-'));
    const path = join(place, 'old.wav');
    await writeFile(path, 'old');
    await expect(
      saveWav(
        path,
        map((v) => v / 0),
      ),
    ).rejects.toMatchObject({ code: 'record-invalid' });
    await expect(saveWav(path, { ...trace, rate: 0.5 })).rejects.toMatchObject({ code: 'wave-format' });
    expect(await readdir(place)).toEqual(['old.wav']);
    expect(await readFile(path, 'utf8')).toBe('old');
  });

  test('names path and cause where the file system refuses', async () => {
    const place = await mkdtemp(join(folder, 'file-'));
    await writeFile(join(place, 'file'), '');
    const path = join(place, 'file', 'under.wav');
    await expect(saveWav(path, trace)).rejects.toMatchObject({
      code: 'file-system',
      where: path,
      message: expect.stringMatching(/EEXIST|ENOTDIR/),
    });
    const taken = join(place, 'folder.wav');
    await saveWav(join(taken, 'inside.wav'), trace);
    await expect(saveWav(taken, trace)).rejects.toMatchObject({ code: 'file-system' });
    expect((await readdir(place)).sort()).toEqual(['file', 'folder.wav']);
  });

  test('takes traces in pieces and writes the same file', async () => {
    const [whole, streamed] = [join(folder, 'whole.wav'), join(folder, 'streamed.wav')];
    const options = { fullScale: '5 V', encoding: 'pcm16', seed: 7 } as const;
    async function* pieces(): AsyncGenerator<Trace> {
      for (let from = 0; from < trace.samples.length; from += 777) {
        const to = Math.min(from + 777, trace.samples.length);
        yield cut(trace, { from: from / trace.rate, to: to / trace.rate });
      }
    }
    const saved = await saveWav(whole, trace, options);
    expect(await streamWav(streamed, pieces(), options)).toEqual({ ...saved, path: streamed });
    expect(await readFile(streamed)).toEqual(await readFile(whole));
  });

  test('passes on what the pieces throw, and leaves nothing behind', async () => {
    const place = await mkdtemp(join(folder, 'throw-'));
    async function* pieces(): AsyncGenerator<Trace> {
      yield trace;
      throw new Error('stopped');
    }
    await expect(streamWav(join(place, 'a.wav'), pieces(), { fullScale: 1 })).rejects.toThrowError('stopped');
    await expect(streamWav(join(place, 'b.wav'), [], { fullScale: 1 })).rejects.toMatchObject({
      code: 'wave-format',
    });
    await expect(
      streamWav(join(place, 'c.wav'), [trace, [trace, trace]], { fullScale: 1 }),
    ).rejects.toThrowError(/2 traces follows one of 1/);
    expect(await readdir(place)).toEqual([]);
  });

  test('refuses samples that are not there or not finite', async () => {
    const path = join(folder, 'no.wav');
    const [empty, broken] = [{ ...trace, samples: new Float64Array(0) }, map((v) => v / 0)];
    await expect(saveWav(path, empty)).rejects.toMatchObject({ code: 'record-short' });
    await expect(saveWav(path, empty, { fullScale: 1 })).rejects.toMatchObject({ code: 'wave-format' });
    await expect(saveWav(path, broken, { fullScale: 1 })).rejects.toMatchObject({ code: 'not-finite' });
  });

  test('refuses traces that do not fit together', async () => {
    const path = join(folder, 'no.wav');
    await expect(saveWav(path, [])).rejects.toMatchObject({ code: 'wave-format' });
    await expect(saveWav(path, [trace, { ...trace, rate: 96_000 }])).rejects.toMatchObject({
      code: 'wave-format',
    });
    await expect(saveWav(path, [trace, { ...trace, unit: 'A' }])).rejects.toThrowError(/in A at 48000 Hz/);
    await expect(saveWav(path, trace, { fullScale: '1 A' })).rejects.toMatchObject({ code: 'quantity-unit' });
    await expect(saveWav(path, trace, { fullScale: '-1 V' })).rejects.toMatchObject({ code: 'value-range' });
  });
});
