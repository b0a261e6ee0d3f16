import { describe, expect, test } from 'vitest';
import { type RandomStream, randomStream } from '../../../packages/core/src/numeric/random.ts';

const first = (stream: RandomStream, count = 8) => Array.from({ length: count }, () => stream.uniform());

describe('randomStream(seed, ...path)', () => {
  test('the same names give the same numbers', () => {
    expect(first(randomStream(7, 'horn', 'noise'))).toEqual(first(randomStream(7, 'horn', 'noise')));
    expect(first(randomStream(7, 'draw', 3))).toEqual(first(randomStream('7', 'draw', '3')));
  });

  test('each seed and each path has a stream of its own', () => {
    const streams = [
      randomStream(7),
      randomStream(8),
      randomStream(7, 'horn'),
      randomStream(7, 'horn', 'noise'),
      randomStream(7, 'hornnoise'),
      randomStream(7, 'horn,noise'),
      randomStream(7, 'horn","noise'),
      randomStream('7,horn'),
      randomStream(7, '', 'horn'),
      randomStream(0),
      randomStream(-1),
      randomStream(0.5),
    ];
    const draws = streams.flatMap((stream) => first(stream, 100));
    expect(new Set(draws).size).toBe(draws.length);
  });

  test('a stream does not move when others are opened and read', () => {
    const alone = first(randomStream('quay', 'horn', 'noise'));
    const stream = randomStream('quay', 'horn', 'noise');
    const amongOthers = alone.map((_, i) => {
      randomStream('quay', 'bell', String(i)).gaussian();
      return stream.uniform();
    });
    expect(amongOthers).toEqual(alone);
  });

  test('uniform stays in [0, 1) and uses more than 32 bits', () => {
    const draws = first(randomStream(1), 10000);
    expect(draws.every((value) => value >= 0 && value < 1)).toBe(true);
    expect(draws.some((value) => !Number.isInteger(value * 2 ** 40))).toBe(true);
    expect(draws.every((value) => Number.isInteger(value * 2 ** 53))).toBe(true);
  });
});
