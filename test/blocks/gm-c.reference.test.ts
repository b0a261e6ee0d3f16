import { oscillator } from '@tailpair/blocks';
import { patch, simulate, type Trace, wire } from '@tailpair/core';
import { amperes, defineBlock, farads, state, tanh, voltage } from '@tailpair/core/block';
import { describe, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { type Slope, solveOde } from '../reference/solve-ode.ts';

/** A user's own kind: one gm-C stage, C·dv/dt = I·tanh((u − v)/2V_T). */
const gmC = defineBlock({
  kind: 'gm-c',
  summary: 'One-pole low-pass of a cell and a capacitor, fed back.',
  inputs: { in: voltage() },
  outputs: { out: voltage() },
  params: { bias: amperes('10 µA'), capacitance: farads('10 nF') },
  equations: ({ in: u, bias, capacitance, thermalVoltage }) => ({
    out: state('0 V', (v) => bias.mul(tanh(u.sub(v).div(thermalVoltage.mul(2)))).div(capacitance)),
  }),
});

const twice = (2 * 1.380649e-23 * 298.15) / 1.602176634e-19;
const capacitance = 10e-9;
const peak = 0.1;

interface Stage {
  /** Small-signal corner, Hz. */
  readonly corner: number;
  readonly frequency: number;
}

const biasOf = ({ corner }: Stage): number => 2 * Math.PI * corner * capacitance * twice;

/** The stage under a sine of 100 mV, at the internal rate. */
async function stepped(stage: Stage, oversample = 4): Promise<Trace> {
  const filter = patch(
    {
      blocks: {
        bell: oscillator({ frequency: `${stage.frequency} Hz`, amplitude: `${peak} V` }),
        stage: gmC({ bias: `${biasOf(stage)} A`, capacitance: `${capacitance} F` }),
      },
    },
    ({ bell, stage }) => [wire(bell.out, stage.in)],
  );
  const run = { length: '4 ms', probes: ['stage.out'], decimate: false, oversample } as const;
  return (await simulate(filter, run)).traces.stage.out;
}

/** Its solution at every sample of 48 kHz. */
function solved(stage: Stage): number[] {
  const bias = biasOf(stage);
  const slope: Slope = (t, [v]) => [
    (bias * Math.tanh((peak * Math.sin(2 * Math.PI * stage.frequency * t) - v!) / twice)) / capacitance,
  ];
  const values = [0];
  for (let n = 1; n < 192; n++)
    values.push(solveOde(slope, (n - 1) / 48000, [values[n - 1]!], n / 48000)[0]!);
  return values;
}

/** Deviations at the samples of 48 kHz, as shares of the peak. */
function deviations({ samples, rate }: Trace, expected: readonly number[]): number[] {
  const largest = Math.max(...expected.map(Math.abs));
  return expected.map((value, n) => (samples[(n * rate) / 48000]! - value) / largest);
}

const worst = (errors: readonly number[]): number => Math.max(...errors.map(Math.abs));
const source =
  'E. Hairer, S. Nørsett, G. Wanner, Solving Ordinary Differential Equations I, 2nd ed., 1993, doi:10.1007/978-3-540-78862-1: extrapolation to 1e-12, by the package odex';
const hertz = [200, 500, 1000, 2000];

describe('a gm-C stage of a user', () => {
  test('agrees with an ODE solver', async () => {
    const errors: number[] = [];
    for (const corner of hertz) {
      const stage = { corner, frequency: 1000 };
      errors.push(...deviations(await stepped(stage), solved(stage)));
    }
    claim({
      what: 'gm-C stage, corner 200 Hz … 2 kHz, 1 kHz of 100 mV peak, from rest, as shares of its peak',
      source,
      tolerance: 1e-5,
      because: 'truncation of a fourth-order rule at 4 × 48 kHz; a second-order rule has 1e-4',
      errors,
    });
  });

  test('gains sixteen times with every doubling of the rate', async () => {
    const orders: number[] = [];
    for (const corner of hertz) {
      const stage = { corner, frequency: 1000 };
      const expected = solved(stage);
      const errors: number[] = [];
      for (const oversample of [1, 2, 4, 8])
        errors.push(worst(deviations(await stepped(stage, oversample), expected)));
      orders.push(...errors.slice(1).map((error, i) => Math.log2(errors[i]! / error)));
    }
    claim({
      what: 'Order of that error in the step, oversampling 1 → 2 → 4 → 8: 4',
      source:
        'Lobatto IIIA: E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed., 1996, IV.5, doi:10.1007/978-3-642-05221-7',
      tolerance: 0.02,
      because: 'terms of the sixth order, (ωh)² of the error, are 2 % at 48 kHz',
      errors: orders.map((order) => order / 4 - 1),
    });
  });

  test('stays accurate where it is stiff', async () => {
    const errors: number[] = [];
    for (const corner of [31e3, 310e3, 10e6]) {
      for (const frequency of [1000, 5000]) {
        const stage = { corner, frequency };
        errors.push(...deviations(await stepped(stage), solved(stage)));
      }
    }
    claim({
      what: 'gm-C stage, corner 31 kHz, 310 kHz, 10 MHz (300 times the step’s own rate), 1 and 5 kHz of 100 mV peak, from rest, as shares of its peak',
      source,
      tolerance: 2e-5,
      because:
        'sub-steps bring the fast stage to the bar of the slow one at 1 kHz; at 5 kHz the cubic through the input counts too',
      errors,
    });
  });
});
