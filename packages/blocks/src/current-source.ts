import { amperes, current, defineBlock } from '@tailpair/core/block';

/** A steady current. */
export const currentSource = defineBlock({
  kind: 'current-source',
  summary: 'Steady current.',
  inputs: {},
  outputs: { out: current({ doc: 'the current' }) },
  params: { current: amperes('0 A', { doc: 'its value' }) },
  equations: ({ current: value }) => ({ out: value }),
});
