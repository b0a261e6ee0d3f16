import {
  count,
  defineBlock,
  held,
  onCrossing,
  seconds,
  select,
  set,
  voltage,
  volts,
} from '@tailpair/core/block';

/** Edges come this much early, so that the rounding of sums cannot push one past the sample it is set for. */
const early = '1 ps';

/** Gate pulses at set times. */
export const gate = defineBlock({
  kind: 'gate',
  summary: 'Gate: high for a set time, again and again at a set period.',
  inputs: {},
  outputs: { out: voltage({ doc: 'the gate: high, or 0 V' }) },
  params: {
    high: volts('5 V', { doc: 'voltage while the gate is open' }),
    delay: seconds('0 s', { min: '0 s', doc: 'time before the first pulse' }),
    held: seconds('0.5 s', { above: '0 s', doc: 'length of a pulse' }),
    period: seconds('1 s', { above: '0 s', doc: 'time from one pulse to the next' }),
    count: count(0, { doc: 'number of pulses; 0 goes on for ever' }),
  },
  requires: (p) => [
    { holds: p.held.lt(p.period), says: 'held must be shorter than period, or the gate never falls' },
  ],
  equations: ({ high, delay, held: length, period, count: most, time }) => {
    const open = held(0);
    const pulse = held(0);
    const opens = delay.add(pulse.mul(period));
    const more = most.eq(0).or(pulse.lt(most));
    onCrossing(select(more, time.add(early).sub(opens), '-1 s'), () => [set(open, 1)]);
    onCrossing(time.add(early).sub(opens.add(length)), () => [set(open, 0), set(pulse, pulse.add(1))]);
    return { out: high.mul(open) };
  },
});
