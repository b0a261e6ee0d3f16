import { amperes, current, defineBlock, ohms, voltage } from '@tailpair/core/block';

/** A voltage made into a bias current. */
export const currentDrive = defineBlock({
  kind: 'current-drive',
  summary: 'Voltage-to-current stage: I = V/R from 0 V = off, limited; the way an envelope closes a cell.',
  inputs: { in: voltage({ doc: 'control voltage; at or below 0 V no current flows' }) },
  outputs: { out: current({ doc: 'the current' }) },
  params: {
    resistance: ohms('10k', { doc: 'resistor that sets the current' }),
    max: amperes('1 mA', { min: '0 A', doc: 'largest current it gives' }),
  },
  limits: ({ resistance, max }) => ({
    in: { min: '0 V', max: max.mul(resistance) },
    out: { min: '0 A', max },
  }),
  equations: ({ in: control, resistance, max }) => ({ out: control.div(resistance).clamp('0 A', max) }),
});
