import {
  choice,
  defineBlock,
  exp2,
  hertz,
  hertzPerVolt,
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

/** Voltage-controlled oscillator of an ideal shape. */
export const oscillator = defineBlock({
  kind: 'oscillator',
  summary: 'Voltage-controlled oscillator: a classic waveform of set frequency, peak and offset.',
  inputs: {
    pitch: voltage({ optional: true, doc: 'raises the frequency by one octave per volt' }),
    fm: voltage({ optional: true, doc: 'moves the frequency in proportion, by fm-depth' }),
    width: voltage({
      optional: true,
      symbol: 'widening',
      doc: 'widens the pulse by 10 % of the period per volt',
    }),
    sync: voltage({ optional: true, doc: 'restarts the period whenever it rises through the threshold' }),
  },
  outputs: { out: voltage({ doc: 'the waveform' }) },
  params: {
    shape: choice(shapes, 'sine', { doc: 'waveform' }),
    frequency: hertz('440 Hz', { min: '0 Hz', doc: 'frequency at 0 V of pitch and fm' }),
    amplitude: volts('5 V', { min: '0 V', doc: 'peak of the waveform' }),
    offset: volts('0 V', { doc: 'voltage added to the waveform' }),
    phase: ratio('0 %', {
      min: 0,
      max: '100 %',
      doc: 'position in the period at the start and after a sync',
    }),
    width: ratio('50 %', { min: 0, max: '100 %', doc: 'share of the period for which the pulse is high' }),
    fmDepth: hertzPerVolt('100 Hz/V', { doc: 'frequency added per volt of fm' }),
    syncThreshold: volts('1 V', { doc: 'voltage through which sync must rise' }),
    syncHysteresis: volts('0.2 V', {
      min: '0 V',
      doc: 'how far sync must fall below the threshold to be heard again',
    }),
  },
  equations: ({ pitch, fm, widening, sync, shape, frequency, amplitude, offset, phase, width, ...p }) => {
    const turn = cycle(frequency.mul(exp2(pitch.div('1 V'))).add(fm.mul(p.fmDepth)), phase);
    if (!isZero(sync)) {
      const high = trigger(sync, p.syncThreshold, p.syncHysteresis);
      onCrossing(high.sub(0.5), () => [set(turn, phase)]);
    }
    const share = width.add(widening.div('10 V')).clamp(0, 1);
    return { out: waveform(shape, turn, share).mul(amplitude).add(offset) };
  },
});
