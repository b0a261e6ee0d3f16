import { defineBlock, farads, ohms, state, voltage } from '@tailpair/core/block';

/** A capacitor that keeps direct voltage out. */
export const coupling = defineBlock({
  kind: 'coupling',
  summary: 'Coupling capacitor into a resistor to ground: passes what changes, keeps direct voltage out.',
  inputs: { in: voltage({ doc: 'voltage before the capacitor' }) },
  outputs: { out: voltage({ doc: 'voltage across the resistor' }) },
  params: {
    capacitance: farads('330 nF', { above: '0 F', doc: 'series capacitor' }),
    resistance: ohms('100k', { doc: 'resistor to ground' }),
  },
  resistances: ({ resistance }) => ({ in: resistance, out: resistance }),
  equations: ({ in: input, capacitance, resistance }) => {
    const held = state('0 V', (v) => input.sub(v).div(resistance.mul(capacitance)));
    return { out: input.sub(held) };
  },
});
