import { type Expression, onCrossing, set, state } from '@tailpair/core/block';

/**
 * Position in the period of an oscillation, 0 … 1: a state whose slope is the frequency, taken
 * back by one when it passes the end of the period (or, at a negative frequency, its start).
 *
 * @param frequency in hertz; may move, and may be negative
 * @param start position at the start of a run, as a ratio of the period
 */
export function cycle(frequency: Expression, start: Expression): Expression {
  const turn = state(start, () => frequency);
  onCrossing(turn.sub(1), () => [set(turn, turn.sub(1))]);
  onCrossing(turn.neg(), () => [set(turn, turn.add(1))]);
  return turn;
}
