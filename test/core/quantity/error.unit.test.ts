import { describe, expect, test } from 'vitest';
import { TailpairError } from '../../../packages/core/src/quantity/error.ts';

describe('TailpairError', () => {
  test('puts the place before the message and keeps code and place apart', () => {
    const error = new TailpairError('value-range', 'must be above 0 Hz, got -5 Hz', {
      where: 'horn.frequency',
    });
    expect(error).toBeInstanceOf(Error);
    expect(error).toMatchObject({
      name: 'TailpairError',
      code: 'value-range',
      where: 'horn.frequency',
      message: 'horn.frequency: must be above 0 Hz, got -5 Hz',
      faults: [],
    });
  });

  test('may have no place, and may gather others', () => {
    const single = new TailpairError('loop', 'a → b → a');
    const error = new TailpairError('patch-faults', 'one fault', { where: undefined, faults: [single] });
    expect(error.message).toBe('one fault');
    expect(error.where).toBeUndefined();
    expect(error.faults).toEqual([single]);
  });
});
