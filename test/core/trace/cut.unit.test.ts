import { describe, expect, test } from 'vitest';
import { cut } from '../../../packages/core/src/trace/cut.ts';
import { durationOf, type Trace } from '../../../packages/core/src/trace/trace.ts';

const trace: Trace = {
  name: 'load.out',
  unit: 'V',
  rate: 1000,
  start: 2,
  samples: Float64Array.from({ length: 1000 }, (_, i) => i),
};

describe('cut', () => {
  test('is a view of the samples from `from` up to `to`', () => {
    const part = cut(trace, { from: '2.1 s', to: '2.3 s' });
    expect(part).toMatchObject({ name: 'load.out', unit: 'V', rate: 1000 });
    expect(part.start).toBeCloseTo(2.1, 12);
    expect(part.samples.length).toBe(200);
    expect(part.samples[0]).toBe(100);
    expect(part.samples.buffer).toBe(trace.samples.buffer);
    expect(durationOf(part)).toBe(0.2);
  });
  test('takes a length in place of an end, and bare numbers as seconds', () => {
    expect(cut(trace, { from: 2.5, length: '50 ms' }).samples.length).toBe(50);
  });
  test('keeps everything unless told otherwise', () => {
    expect(cut(trace, {}).samples).toEqual(trace.samples);
  });
  test('starts with the next sample where a time lies between two', () => {
    const part = cut(trace, { from: 2.0104, to: 2.0206 });
    expect(part.samples[0]).toBe(11);
    expect(part.start).toBe(2 + 11 / 1000);
    expect(part.samples.at(-1)).toBe(20);
  });
  test('of a cut starts on the clock of the run', () => {
    expect(cut(cut(trace, { from: 2.25 }), { from: 2.5, length: 0.1 }).samples[0]).toBe(500);
  });
  test.each([
    [{ from: 1.9 }, 'value-range', 'cut.from'],
    [{ to: 3.1 }, 'value-range', 'cut.to'],
    [{ from: 2.5, length: 1 }, 'value-range', 'cut.length'],
    [{ to: 2.5, length: 0.5 }, 'value-range', 'cut'],
    [{ from: 2.5, to: 2.5 }, 'record-short', 'cut'],
    [{ from: '1 V' }, 'quantity-unit', 'cut.from'],
  ])('refuses %j', (options, code, where) => {
    expect(() => cut(trace, options)).toThrowError(expect.objectContaining({ code, where }));
  });
});
