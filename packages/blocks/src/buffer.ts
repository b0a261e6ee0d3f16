import { defineBlock, ratio, voltage, volts } from '@tailpair/core/block';
import { hasSwing, swing } from './shared/rails.ts';

/** An amplifier that no load disturbs. */
export const buffer = defineBlock({
  kind: 'buffer',
  summary: 'Buffer: set gain, no load on its source, output within the supply.',
  inputs: { in: voltage({ doc: 'voltage to be passed on' }) },
  outputs: { out: voltage({ doc: 'buffered voltage' }) },
  params: {
    gain: ratio(1, { doc: 'voltage gain' }),
    headroomPositive: volts('1.5 V', { min: '0 V', doc: 'how close the output comes to the positive rail' }),
    headroomNegative: volts('1.5 V', { min: '0 V', doc: 'how close the output comes to the negative rail' }),
  },
  requires: (p) => [hasSwing(p)],
  limits: (p) => ({ out: swing(p) }),
  equations: ({ in: input, gain, ...rails }) => {
    const { min, max } = swing(rails);
    return { out: input.mul(gain).clamp(min, max) };
  },
});
