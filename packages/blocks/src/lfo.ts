import {
  choice,
  constant,
  defineBlock,
  hertz,
  isZero,
  onCrossing,
  ratio,
  set,
  voltage,
  volts,
} from '@tailpair/core/block';
import { cycle } from './shared/cycle.ts';
import { trigger } from './shared/trigger.ts';
import { shapes, waveform } from './shared/waveform.ts';

/** Low-frequency oscillator for modulation. */
export const lfo = defineBlock({
  kind: 'lfo',
  summary: 'Low-frequency oscillator: a slow waveform for modulation, which a reset pulse restarts.',
  inputs: { reset: voltage({ optional: true, doc: 'restarts the period whenever it rises through 1 V' }) },
  outputs: { out: voltage({ doc: 'the waveform' }) },
  params: {
    shape: choice(shapes, 'sine', { doc: 'waveform; a pulse is high for half of the period' }),
    frequency: hertz('1 Hz', { min: '0 Hz', doc: 'frequency' }),
    amplitude: volts('5 V', { min: '0 V', doc: 'peak of the waveform' }),
    offset: volts('0 V', { doc: 'voltage added to the waveform' }),
    phase: ratio('0 %', {
      min: 0,
      max: '100 %',
      doc: 'position in the period at the start and after a reset',
    }),
  },
  equations: ({ reset, shape, frequency, amplitude, offset, phase }) => {
    const turn = cycle(frequency, phase);
    if (!isZero(reset)) {
      const high = trigger(reset, '1 V', '0.2 V');
      onCrossing(high.sub(0.5), () => [set(turn, phase)]);
    }
    return { out: waveform(shape, turn, constant(0.5)).mul(amplitude).add(offset) };
  },
});
