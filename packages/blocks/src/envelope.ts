import {
  defineBlock,
  held,
  log,
  onCrossing,
  ratio,
  seconds,
  select,
  set,
  state,
  voltage,
  volts,
} from '@tailpair/core/block';
import { trigger } from './shared/trigger.ts';

/** Stages of the envelope, in the order they are passed. */
const stages = { release: 0, attack: 1, decay: 2 } as const;

/** Envelope of resistor–capacitor segments. */
export const envelope = defineBlock({
  kind: 'envelope',
  summary:
    'Envelope of RC segments: attack aimed beyond the peak, decay to the sustain level, release to rest.',
  inputs: { gate: voltage({ doc: 'starts the attack when it rises, the release when it falls' }) },
  outputs: { out: voltage({ doc: 'the envelope, between rest and peak' }) },
  params: {
    attack: seconds('5 ms', { above: '0 s', doc: 'time from rest to peak' }),
    decay: seconds('100 ms', {
      above: '0 s',
      doc: 'time to within 1 % of the step down to the sustain level',
    }),
    sustain: ratio('60 %', {
      min: 0,
      max: 1,
      doc: 'level held while the gate is open, as a share of the way from rest to peak',
    }),
    release: seconds('200 ms', { above: '0 s', doc: 'time to within 1 % of the step down to rest' }),
    rest: volts('0 V', { doc: 'output at rest' }),
    peak: volts('8 V', { doc: 'output at the end of the attack' }),
    aim: ratio(1.3, {
      above: 1,
      doc: 'how far beyond the peak the attack aims, as a multiple of the way from rest to peak',
    }),
    threshold: volts('1 V', { doc: 'gate voltage that starts the attack; 0.1 V less starts the release' }),
  },
  equations: ({ gate, attack, decay, sustain, release, rest, peak, aim, threshold }) => {
    const stage = held(stages.release);
    const open = trigger(gate, threshold, '0.1 V');
    const attackTime = attack.div(log(aim.div(aim.sub(1))));
    const tail = Math.log(100);
    const target = select(stage.eq(stages.attack), aim, select(stage.eq(stages.decay), sustain, 0));
    const tau = select(
      stage.eq(stages.attack),
      attackTime,
      select(stage.eq(stages.decay), decay.div(tail), release.div(tail)),
    );
    const level = state(0, (x) => target.sub(x).div(tau));
    onCrossing(open.sub(0.5), () => [set(stage, stages.attack)]);
    onCrossing(open.sub(0.5).neg(), () => [set(stage, stages.release)]);
    onCrossing(select(stage.eq(stages.attack), level.sub(1), -1), () => [set(stage, stages.decay)]);
    return { out: rest.add(peak.sub(rest).mul(level)) };
  },
});
