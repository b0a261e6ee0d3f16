import { defineBlock, voltage, volts } from '@tailpair/core/block';

/** A steady voltage. */
export const constant = defineBlock({
  kind: 'constant',
  summary: 'Steady voltage.',
  inputs: {},
  outputs: { out: voltage({ doc: 'the voltage' }) },
  params: { voltage: volts('0 V', { doc: 'its value' }) },
  equations: ({ voltage: value }) => ({ out: value }),
});
