import { describe, expect, test } from 'vitest';
import { modulationDepth } from '../../../packages/core/src/analysis/modulation-depth.ts';
import { sidebands } from '../../../packages/core/src/analysis/sidebands.ts';
import { record, turn } from './record.ts';

const tone = record((t) => Math.sin(turn(1000, t)));

describe('sidebands', () => {
  test('come as a table, lowest order first', () => {
    const table = sidebands(tone, { carrier: '1 kHz', modulator: '100 Hz', orders: 2 });
    expect(table.map(({ order, frequency }) => [order, frequency])).toEqual([
      [-2, 800],
      [-1, 900],
      [0, 1000],
      [1, 1100],
      [2, 1200],
    ]);
    expect(table.every((line) => !('sharedWith' in line))).toBe(true);
  });
  test('say with what they share a line', () => {
    const table = sidebands(tone, { carrier: '1 kHz', modulator: '100 Hz', orders: 5 });
    expect(table[10]).toMatchObject({ frequency: 1500, sharedWith: '2·carrier − 5·modulator' });
    expect(table[0]).toMatchObject({ frequency: 500, sharedWith: '5·modulator' });
    expect(table[6]).not.toHaveProperty('sharedWith');
  });
  test('are not biased by the harmonics of the carrier on a record without whole periods', () => {
    const saw = (t: number): number =>
      Array.from({ length: 20 }, (_, i) => Math.sin(turn(1003.3 * (i + 1), t)) / (i + 1)).reduce(
        (a, b) => a + b,
      );
    const trace = record((t) => (1 + 0.2 * Math.sin(turn(50.7, t))) * saw(t), { length: 20_000 });
    // Every product of carrier and modulator is fitted along, so only rounding is left.
    expect(Math.abs(modulationDepth(trace, { carrier: 1003.3, modulator: 50.7 }) - 0.2)).toBeLessThan(1e-11);
  });
  test('refuse two lines on one frequency', () => {
    expect(() => sidebands(tone, { carrier: '1 kHz', modulator: '400 Hz', orders: 3 })).toThrowError(
      expect.objectContaining({
        code: 'record-invalid',
        message: expect.stringMatching(/falls on carrier − 3·modulator, 200 Hz/),
      }),
    );
  });
  test('refuse a line on DC', () => {
    expect(() => sidebands(tone, { carrier: '1 kHz', modulator: '500 Hz' })).toThrowError(
      /carrier − 2·modulator falls on DC/,
    );
    expect(() => sidebands(tone, { carrier: 0.3, modulator: 0.1, orders: 3 })).toThrowError(/falls on DC/);
  });
  test('refuse a record without a carrier', () => {
    expect(() =>
      sidebands(
        record(() => 0),
        { carrier: '1 kHz', modulator: '100 Hz' },
      ),
    ).toThrowError(/nothing at the carrier/);
  });
  test('refuse a line above half the rate', () => {
    expect(() => sidebands(tone, { carrier: '23 kHz', modulator: '1 kHz' })).toThrowError(
      expect.objectContaining({ code: 'value-range' }),
    );
  });
  test.each([0, 1.5, -1])('refuse %d orders', (orders) => {
    expect(() => sidebands(tone, { carrier: '1 kHz', modulator: '100 Hz', orders })).toThrowError(
      expect.objectContaining({ code: 'value-range', where: 'sidebands.orders' }),
    );
  });
});

test('modulationDepth refuses a modulator at half the carrier, whose own feedthrough falls on a sideband', () => {
  expect(() => modulationDepth(tone, { carrier: '1 kHz', modulator: '500 Hz' })).toThrowError(
    expect.objectContaining({
      code: 'record-invalid',
      message: expect.stringContaining('falls on modulator'),
    }),
  );
});
