import { createRequire } from 'node:module';

/** The part of the solver used here; its own types do not compile under our options. */
interface Solver {
  absoluteTolerance: number;
  relativeTolerance: number;
  initialStepSize: number;
  maxSteps: number;
  solve(slope: Slope, from: number, start: readonly number[], to: number): { y: number[]; outcome: number };
}

/** Right-hand side of a system of ordinary differential equations. */
export type Slope = (time: number, state: readonly number[]) => number[];

const require = createRequire(import.meta.url);
const { Solver } = require('odex') as { Solver: new (states: number) => Solver };

/**
 * State at `to` of a system that stands at `start` at `from`, by the extrapolation method of E. Hairer, S. Nørsett,
 * G. Wanner, Solving Ordinary Differential Equations I, 2nd ed., 1993, doi:10.1007/978-3-540-78862-1 (code ODEX, in
 * JavaScript by the package odex), with a tolerance of 1e-12.
 */
export function solveOde(slope: Slope, from: number, start: readonly number[], to: number): number[] {
  const solver = new Solver(start.length);
  solver.relativeTolerance = 1e-12;
  solver.absoluteTolerance = 1e-15;
  solver.initialStepSize = (to - from) / 4;
  solver.maxSteps = 1_000_000;
  const { y, outcome } = solver.solve(slope, from, start, to);
  if (outcome !== 0) throw new Error(`the solver stopped at outcome ${outcome}`);
  return y;
}
