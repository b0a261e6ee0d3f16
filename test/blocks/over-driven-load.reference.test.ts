import { currentSource, load, oscillator, ota } from '@tailpair/blocks';
import { patch, simulate, type Trace, wire } from '@tailpair/core';
import { amperes, defineBlock, farads, ohms, state, tanh, voltage, volts } from '@tailpair/core/block';
import { describe, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { solveOde } from '../reference/solve-ode.ts';

/** A user's own kind: a cell into R ∥ C that reaches no further than its compliance. */
const output = defineBlock({
  kind: 'cell-output',
  summary: 'Cell and load in one, held at its limits.',
  inputs: { in: voltage() },
  outputs: { out: voltage() },
  params: {
    bias: amperes('1 mA'),
    resistance: ohms('20k'),
    capacitance: farads('1 nF'),
    limit: volts('11 V', { above: '0 V' }),
  },
  equations: ({ in: u, bias, resistance, capacitance, limit, thermalVoltage }) => {
    const arriving = bias.mul(tanh(u.div(thermalVoltage.mul(2))));
    const limits = { min: limit.neg(), max: limit };
    return { out: state('0 V', (v) => arriving.sub(v.div(resistance)).div(capacitance), limits) };
  },
});

const [bias, resistance, limit, peak, frequency] = [1e-3, 20e3, 11, 0.1, 1000];
const twice = (2 * 1.380649e-23 * 298.15) / 1.602176634e-19;
const bell = oscillator({ frequency: `${frequency} Hz`, amplitude: `${peak} V` });
const run = { length: '4 ms', decimate: false } as const;

/** The user's kind, and the same from the kinds of the library. */
async function stepped(capacitance: number, oversample: number): Promise<readonly Trace[]> {
  const voice = patch(
    {
      blocks: {
        bell,
        own: output({ capacitance: `${capacitance} F` }),
        drive: currentSource({ current: '1 mA' }),
        cell: ota(),
        load: load({ resistance, capacitance: `${capacitance} F` }),
      },
    },
    ({ bell, own, drive, cell, load }) => [
      wire(bell.out, own.in),
      wire(bell.out, cell.plus),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  const { traces } = await simulate(voice, { ...run, oversample, probes: ['own.out', 'load.out'] });
  return [traces.own.out, traces.load.out];
}

/** Solution at every sample of 192 kHz, integrated piecewise between the instants at which it meets and leaves a limit. */
function solved(capacitance: number): number[] {
  const slopeAt = (t: number, v: number): number =>
    (bias * Math.tanh((peak * Math.sin(2 * Math.PI * frequency * t)) / twice) - v / resistance) / capacitance;
  const free = (from: number, v: number, to: number): number =>
    solveOde((t, [x]) => [slopeAt(t, x!)], from, [v], to)[0]!;
  const values = [0];
  for (let n = 1; n < 768; n++) {
    let [t, v] = [(n - 1) / 192000, values[n - 1]!];
    const end = n / 192000;
    while (t < end) {
      if (Math.abs(v) === limit && slopeAt(t, v) * v >= 0) {
        const held = v;
        t = firstInstant(t, end, (at) => slopeAt(at, held) * held < 0);
        continue;
      }
      const [from, start] = [t, v];
      t = firstInstant(from, end, (at) => Math.abs(free(from, start, at)) >= limit);
      v = free(from, start, t);
      if (t < end || Math.abs(v) > limit) v = Math.sign(v) * limit;
    }
    values.push(v);
  }
  return values;
}

/** Where a condition begins to hold between two instants, by halving; the end where it does not hold there. */
function firstInstant(from: number, to: number, holds: (at: number) => boolean): number {
  if (!holds(to)) return to;
  let [low, high] = [from, to];
  for (let middle = (low + high) / 2; middle > low && middle < high; middle = (low + high) / 2) {
    if (holds(middle)) high = middle;
    else low = middle;
  }
  return high;
}

/** Deviations at the samples of 48 kHz, as shares of the limit. */
function deviations({ samples, rate }: Trace, expected: readonly number[]): number[] {
  return expected.flatMap((volts, n) =>
    n % 4 === 0 ? [(samples[(n * rate) / 192000]! - volts) / limit] : [],
  );
}

const worst = (errors: readonly number[]): number => Math.max(...errors.map(Math.abs));

describe('a load driven into its limits', () => {
  test('agrees with an ODE solver, as a kind of a user and from the kinds of the library', async () => {
    const errors: number[] = [];
    for (const capacitance of [10e-12, 100e-12, 1e-9, 10e-9]) {
      const expected = solved(capacitance);
      for (const trace of await stepped(capacitance, 4)) errors.push(...deviations(trace, expected));
    }
    claim({
      what: '1 mA cell into 20 kΩ and 10 pF … 10 nF, 1 kHz of 100 mV peak, held at ±11 V, from rest, as shares of 11 V',
      source:
        'E. Hairer, S. Nørsett, G. Wanner, Solving Ordinary Differential Equations I, 2nd ed., 1993, doi:10.1007/978-3-540-78862-1: extrapolation to 1e-12, by the package odex, piecewise between the limits',
      tolerance: 1e-6,
      because:
        'the cubic through the current: (ωh)⁴/720 summed over its harmonics is some 1e-7 at 4 × 48 kHz',
      errors,
    });
  });

  test('gains sixteen times with every doubling of the rate, limits and all', async () => {
    const orders: number[] = [];
    for (const capacitance of [1e-9, 10e-9]) {
      const expected = solved(capacitance);
      const errors: number[] = [];
      for (const oversample of [1, 2, 4, 8])
        errors.push(worst(deviations((await stepped(capacitance, oversample))[0]!, expected)));
      orders.push(...errors.slice(1).map((error, i) => Math.log2(errors[i]! / error)));
    }
    claim({
      what: 'Order of that error in the step, 1 nF and 10 nF, oversampling 1 → 2 → 4 → 8: 4',
      source:
        'error of cubic Hermite interpolation, h⁴ (any numerical text); instants located to the last digit keep it',
      tolerance: 0.02,
      because: 'terms of the sixth order, 1 % at 48 kHz',
      errors: orders.map((order) => order / 4 - 1),
    });
  });
});
