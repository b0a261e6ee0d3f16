import { defineBlock, ohms, voltage } from '@tailpair/core/block';

/** Two resistors that divide a voltage. */
export const divider = defineBlock({
  kind: 'divider',
  summary: 'Voltage divider of two resistors: the input pad of a cell.',
  inputs: { in: voltage({ doc: 'voltage to be divided' }) },
  outputs: { out: voltage({ doc: 'voltage across the bottom resistor' }) },
  params: {
    top: ohms('10k', { min: 0, doc: 'resistor from the input to the output' }),
    bottom: ohms('10k', { doc: 'resistor from the output to ground' }),
  },
  resistances: ({ top, bottom }) => ({
    in: top.add(bottom),
    out: top.mul(bottom).div(top.add(bottom)),
  }),
  equations: ({ in: input, top, bottom }) => ({ out: input.mul(bottom.div(top.add(bottom))) }),
});
