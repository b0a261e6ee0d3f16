import { current, defineBlock, farads, isZero, ohms, state, voltage, volts } from '@tailpair/core/block';
import { hasSwing, swing } from './shared/rails.ts';

/** What a cell's output current flows into. */
export const load = defineBlock({
  kind: 'load',
  summary:
    'Load: resistor, and capacitor if any, to ground; the cell feeding it reaches to within the headroom of the rails.',
  inputs: { in: current({ doc: 'currents that meet at the load' }) },
  outputs: { out: voltage({ doc: 'voltage across the load' }) },
  params: {
    resistance: ohms('10k', { doc: 'resistor to ground' }),
    capacitance: farads('0 F', { doc: 'capacitor to ground; 0 F for none' }),
    headroomPositive: volts('1 V', {
      min: '0 V',
      doc: 'output compliance of the cell below the positive rail',
    }),
    headroomNegative: volts('1 V', {
      min: '0 V',
      doc: 'output compliance of the cell above the negative rail',
    }),
  },
  resistances: ({ resistance }) => ({ out: resistance }),
  requires: (p) => [hasSwing(p)],
  limits: (p) => ({ out: swing(p) }),
  equations: ({ in: arriving, resistance, capacitance, ...rails }) => {
    const { min, max } = swing(rails);
    if (isZero(capacitance)) return { out: arriving.mul(resistance).clamp(min, max) };
    const slope = (v: typeof min): typeof min => arriving.sub(v.div(resistance)).div(capacitance);
    return { out: state('0 V', slope, { min, max }) };
  },
});
