import { tangent } from './differentiate.ts';
import { asFactor, constant, Expression, leaf, type Operand } from './expression.ts';
import { internNode } from './node.ts';

/**
 * The quantity for which `residual` is zero: an implicit equation without memory, solved anew at
 * every sample by Halley's method with exact derivatives. A sample that cannot be solved stops
 * the run and names the block.
 *
 * @param residual expression that must vanish, given the unknown
 * @param guess start of the search and dimension of the unknown; a close one saves steps
 */
export function solve(residual: (unknown: Expression) => Expression, guess: Operand): Expression {
  const start = asFactor(guess);
  const unknown = leaf('unknown', 'x', start.dimension);
  const equation = residual(unknown);
  const seeds = new Map([[unknown, constant(1)]]);
  const slope = tangent(equation, seeds, start.dimension);
  const curvature = tangent(slope, seeds, start.dimension);
  const args = [unknown, start, equation, slope, curvature];
  return internNode(
    `solve ${args.map((arg) => arg.id).join(' ')}`,
    () => new Expression('solve', args, start.dimension),
  );
}
