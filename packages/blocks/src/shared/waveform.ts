import { constant, type Expression, select, sin } from '@tailpair/core/block';

/** The classic shapes of an oscillation. */
export const shapes = ['sine', 'triangle', 'saw', 'pulse'] as const;

/** One of {@link shapes}. */
export type Shape = (typeof shapes)[number];

/**
 * An oscillation between −1 and 1. Sine and triangle cross zero upward at position 0; the saw
 * rises and resets there; the pulse is high first. The ideal shapes: what their corners and steps
 * fold back when sampled is not removed here.
 *
 * @param turn position in the period, 0 … 1
 * @param width share of the period for which the pulse is high
 */
export function waveform(shape: Shape, turn: Expression, width: Expression): Expression {
  switch (shape) {
    case 'sine':
      return sin(turn.mul(2 * Math.PI));
    case 'triangle': {
      const rising = turn.mul(4);
      const falling = constant(2).sub(rising);
      return select(turn.lt(0.25), rising, select(turn.lt(0.75), falling, rising.sub(4)));
    }
    case 'saw':
      return turn.mul(2).sub(1);
    case 'pulse':
      return select(turn.lt(width), 1, -1);
  }
}
