import { bias, constant, currentSource, lfo } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { lambertW0Log } from 'lambert-w-function';
import { describe, expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

interface Setting {
  /** Control voltage above the negative rail, V. */
  readonly volts: number;
  readonly ohms: number;
  readonly pin?: Parameters<typeof bias>[0];
  readonly celsius?: number;
}

/** Bias current, A, that a steady control sends through a resistor. */
async function biasCurrent({ volts, ohms, pin = {}, celsius = 25 }: Setting): Promise<number> {
  const network = patch(
    {
      supply: ['-12 V', '12 V'],
      ambient: `${celsius} °C`,
      blocks: { control: constant({ voltage: `${volts - 12} V` }), bias: bias(pin) },
    },
    ({ control, bias }) => [wire(control.out, bias.pin, { via: ohms })],
  );
  const { traces } = await simulate(network, { length: '1 ms', probes: ['bias.out'], decimate: false });
  return traces.bias.out.samples.at(-1)!;
}

const banwell =
  'T. Banwell, A. Jayakumar, Exact analytical solution for current flow through diode with series resistance, Electronics Letters 36(4), 2000 (from memory)';
const thermalVoltage = (1.380649e-23 * 298.15) / 1.602176634e-19;

describe('a resistor into the bias pin', () => {
  test('gives the current of the Lambert W function, to 24 V and deep in cut-off', async () => {
    const errors: number[] = [];
    for (const [drops, saturation, volts, ohms, amperes] of table('bias/lambert-w.csv')) {
      const pin = { diodeCurrent: `${saturation} A`, diodeDrops: drops! };
      errors.push((await biasCurrent({ volts: volts!, ohms: ohms!, pin })) / amperes! - 1);
    }
    claim({
      what: 'Bias current through 27 kΩ and 120 kΩ, 40 mV … 24 V above the rail, one and two junctions, 100 aA … 2.5 nA',
      source: `${banwell}; W by mpmath (test/reference/bias)`,
      tolerance: 1e-12,
      because:
        'a control volt is rounded to 1e-15 V against the rail, 1e-13 of V_T; the logarithms round as much',
      errors,
    });
  });

  test('and of a general Lambert W function all along a swing, two controls superposed', async () => {
    const [control, trim] = [120e3, 1e6];
    const network = patch(
      {
        blocks: {
          swing: lfo({ shape: 'triangle', frequency: '100 Hz', amplitude: '12 V' }),
          trim: constant({ voltage: '3.7 V' }),
          bias: bias(),
        },
      },
      ({ swing, trim: trimmer, bias }) => [
        wire(swing.out, bias.pin, { via: control }),
        wire(trimmer.out, bias.pin, { via: trim }),
      ],
    );
    const probes = ['swing.out', 'bias.out'] as const;
    const { traces } = await simulate(network, { length: '10 ms', probes, decimate: false });
    const conductance = 1 / control + 1 / trim;
    const errors: number[] = [];
    traces.swing.out.samples.forEach((volts, n) => {
      const open = (volts / control + 3.7 / trim) / conductance + 12;
      const perDecay = thermalVoltage * conductance;
      const y = Math.log(1e-14 / perDecay) + (open + 1e-14 / conductance) / thermalVoltage;
      const expected = perDecay * lambertW0Log(y) - 1e-14;
      // Below that the package returns 0.
      if (y > -10) errors.push(traces.bias.out.samples[n]! / expected - 1);
    });
    expect(errors.length).toBeGreaterThan(1900);
    claim({
      what: 'Bias current under a swing of ±12 V through 120 kΩ with 3.7 V through 1 MΩ',
      source: `${banwell}; W by the package lambert-w-function`,
      tolerance: 1e-11,
      because:
        'the sums of currents round to 1e-15 V at the pin, 1e-13 of V_T; near cut-off, at y = −10, subtracting I_S loses two digits',
      errors,
    });
  });

  test('adds currents that flow in directly', async () => {
    const network = (amperes: number) =>
      patch(
        {
          blocks: {
            source: currentSource({ current: `${amperes} A` }),
            control: constant({ voltage: '0 V' }),
            bias: bias(),
            alone: bias(),
            copy: currentSource({ current: `${amperes} A` }),
          },
        },
        ({ source, copy, control, bias, alone }) => [
          wire(source.out, bias.pin),
          wire(control.out, bias.pin, { via: '120k' }),
          wire(copy.out, alone.pin),
        ],
      );
    const errors: number[] = [];
    for (const amperes of [-3e-5, 2e-5, 1e-4]) {
      const probes = ['bias.out', 'alone.out'] as const;
      const { traces } = await simulate(network(amperes), { length: '1 ms', probes, decimate: false });
      // A current into the pin is a voltage before the resistor.
      const expected = await biasCurrent({ volts: 12 + amperes * 120e3, ohms: 120e3 });
      errors.push(traces.bias.out.samples.at(-1)! / expected - 1);
      expect(traces.alone.out.samples.at(-1)).toBe(Math.max(amperes, 0));
    }
    claim({
      what: 'A current into the pin beside a resistor acts as that current times the resistor in its voltage',
      source: 'superposition at a node: Thévenin and Norton (any text on circuits)',
      tolerance: 1e-12,
      because: 'rounding',
      errors,
    });
  });
});

describe('temperature', () => {
  test('moves the junction by the slope of its law', async () => {
    const errors: number[] = [];
    for (const [amperes, expected] of table('bias/drift.csv')) {
      // From a kilovolt the current hardly moves, so what the resistor leaves is the junction's own drift.
      const volts = 1200;
      const ohms = (volts - 0.6) / amperes!;
      const drop = async (celsius: number) => volts - ohms * (await biasCurrent({ volts, ohms, celsius }));
      errors.push(((await drop(25.1)) - (await drop(24.9))) / 0.2 / expected! - 1);
    }
    claim({
      what: 'Drift of the junction at 25 °C: −2.43, −2.03, −1.83 mV/K at 1 µA, 100 µA, 1 mA',
      source:
        '(V_D − E_g − 3V_T)/T: P. Gray, P. Hurst, S. Lewis, R. Meyer, Analysis and Design of Analog Integrated Circuits, 5th ed., 2009 (from memory; test/reference/bias)',
      tolerance: 3e-4,
      because:
        'the junction stands within 0.1 V of the 0.6 V assumed, 1e-4 of the current, and that moves by 2e-6 a kelvin',
      errors,
    });
    expect(errors).toHaveLength(3);
  });

  test('moves the current at full control as the law says', async () => {
    const errors: number[] = [];
    for (const [celsius, amperes] of table('bias/temperature.csv'))
      errors.push((await biasCurrent({ volts: 24, ohms: 120e3, celsius: celsius! })) / amperes! - 1);
    claim({
      what: 'Bias current of 24 V through 120 kΩ, −20 … 70 °C',
      source: `${banwell}; I_S ∝ T³·exp(−1.12 eV/kT), 10 fA at 25 °C (test/reference/bias)`,
      tolerance: 1e-12,
      because: 'rounding; the saturation current comes in through its logarithm',
      errors,
    });
  });
});
