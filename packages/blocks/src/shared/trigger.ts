import { type Expression, held, type Operand, onCrossing, set } from '@tailpair/core/block';

/**
 * A comparator with hysteresis: 1 from when the input rises above the threshold until it falls
 * below the threshold less the hysteresis, then 0.
 */
export function trigger(input: Expression, threshold: Operand, hysteresis: Operand): Expression {
  const high = held(0);
  onCrossing(input.sub(threshold), () => [set(high, 1)]);
  onCrossing(input.sub(threshold).add(hysteresis).neg(), () => [set(high, 0)]);
  return high;
}
