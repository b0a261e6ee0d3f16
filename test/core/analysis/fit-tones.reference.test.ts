import { expect, test } from 'vitest';
import { decibels } from '../../../packages/core/src/analysis/decibels.ts';
import { fitTones } from '../../../packages/core/src/analysis/fit-tones.ts';
import { record } from './record.ts';

// Three-parameter sine fit of IEEE Std 1057 (from memory) on the same record, computed with numpy 2.4.6
// (`numpy.linalg.lstsq`, a singular value decomposition): a second method in another language.
test('a distorted tone without whole periods fits as a general least-squares solver fits it', () => {
  const thermalVoltage = (1.380649e-23 * 298.15) / 1.602176634e-19;
  const trace = record(
    (t) => 0.01 + Math.tanh((0.02 * Math.sin(2 * Math.PI * 997 * t + 0.3)) / (2 * thermalVoltage)),
    {
      length: 4096,
    },
  );
  const { tones, dc, residual } = fitTones(trace, ['997 Hz']);
  // Printed to 13 digits or more; the two solvers round differently.
  expect(Math.abs(tones[0]!.amplitude - 0.3751868081063249)).toBeLessThan(1e-12);
  expect(Math.abs(dc - 0.010003804887809)).toBeLessThan(1e-12);
  // Printed to seven decimals.
  expect(Math.abs(decibels(tones[0]!.amplitude / Math.SQRT2 / residual) - 38.2944497)).toBeLessThan(6e-8);
});
