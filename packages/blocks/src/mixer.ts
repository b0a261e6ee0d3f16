import { defineBlock, node, ohms, voltage, volts } from '@tailpair/core/block';
import { hasSwing, swing } from './shared/rails.ts';

/** An inverting summing stage. */
export const mixer = defineBlock({
  kind: 'mixer',
  summary:
    'Summing stage: currents and voltages meet at a virtual ground; the output is inverted, as the circuit does.',
  inputs: { sum: node({ doc: 'virtual ground' }) },
  outputs: { out: voltage({ doc: 'minus the sum of the currents, times the feedback resistor' }) },
  params: {
    feedback: ohms('100k', { doc: 'resistor from the output to the virtual ground' }),
    headroomPositive: volts('1.5 V', { min: '0 V', doc: 'how close the output comes to the positive rail' }),
    headroomNegative: volts('1.5 V', { min: '0 V', doc: 'how close the output comes to the negative rail' }),
  },
  requires: (p) => [hasSwing(p)],
  limits: (p) => ({ out: swing(p) }),
  equations: ({ sum, feedback, ...rails }) => {
    const { min, max } = swing(rails);
    return { out: sum.current.add(sum.drive).mul(feedback).neg().clamp(min, max) };
  },
});
