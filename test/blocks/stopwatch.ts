import { choice, constant, defineBlock, held, onCrossing, set, voltage, volts } from '@tailpair/core/block';

/**
 * A kind for tests: the instant, located between samples, at which its input last passed a level, as 1 V per second;
 * −1 V before.
 */
export const stopwatch = defineBlock({
  kind: 'stopwatch',
  summary: 'Instant at which a voltage last passed a level.',
  inputs: { in: voltage() },
  outputs: { at: voltage() },
  params: { level: volts('1 V'), direction: choice(['rising', 'falling'], 'rising') },
  equations: ({ in: input, level, direction, time }) => {
    const at = held(constant(-1));
    const above = input.sub(level);
    onCrossing(direction === 'rising' ? above : above.neg(), () => [set(at, time.div('1 s'))]);
    return { at: at.mul('1 V') };
  },
});
