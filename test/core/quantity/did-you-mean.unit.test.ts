import { describe, expect, test } from 'vitest';
import { nearestName } from '../../../packages/core/src/quantity/did-you-mean.ts';

const kinds = [
  'oscillator',
  'lfo',
  'gate',
  'envelope',
  'divider',
  'buffer',
  'current-drive',
  'bias',
  'ota',
  'load',
];

describe('nearestName', () => {
  test.each([
    ['osclilator', 'oscillator'],
    ['ocillater', 'oscillator'],
    ['OTA', 'ota'],
    ['laod', 'load'],
    ['current drive', 'current-drive'],
    ['evelope', 'envelope'],
    ['bais', 'bias'],
  ])('%s → %s', (word, name) => {
    expect(nearestName(word, kinds)).toBe(name);
  });

  test.each(['', 'x', 'reverb', 'capacitor', 'z'.repeat(100_000)])('%s is near to nothing', (word) => {
    expect(nearestName(word, kinds)).toBeUndefined();
  });

  test('one letter is not near to another', () => {
    expect(nearestName('a', ['b', 'c'])).toBeUndefined();
    expect(nearestName('im', ['in', 'out'])).toBe('in');
  });

  test('the nearest wins, then the first', () => {
    expect(nearestName('gated', ['gates', 'gate', 'gated-in'])).toBe('gates');
    expect(nearestName('gatee', ['gate', 'gates'])).toBe('gate');
  });
});
