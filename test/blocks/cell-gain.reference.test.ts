import { constant, currentSource, load, oscillator, ota } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { fitTones } from '@tailpair/core/analysis';
import { describe, expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

interface Setting {
  /** Peak of a 1 kHz sine, V. */
  readonly sine?: number;
  /** Voltage it rides on. */
  readonly steady?: number;
  readonly bias?: number;
  readonly celsius?: number;
}

/** Peak of the fundamental, and mean, of the current of a cell with 100 µA at 25 °C unless told otherwise. */
async function current({ sine = 0, steady = 0, bias = 1e-4, celsius = 25 }: Setting) {
  const stage = patch(
    {
      ambient: `${celsius} °C`,
      blocks: {
        bell: oscillator({ frequency: '1 kHz', amplitude: `${sine} V`, offset: `${steady} V` }),
        drive: currentSource({ current: `${bias} A` }),
        cell: ota(),
        load: load({ resistance: '1 Ω' }),
      },
    },
    ({ bell, drive, cell, load }) => [
      wire(bell.out, cell.plus),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  const { traces } = await simulate(stage, { length: '4 ms', probes: ['load.out'], decimate: false });
  const { tones, dc } = fitTones(traces.load.out, ['1 kHz', '2 kHz', '3 kHz', '5 kHz', '7 kHz', '9 kHz']);
  return { peak: tones[0]!.amplitude, mean: dc };
}

const textbook =
  'P. Gray, P. Hurst, S. Lewis, R. Meyer, Analysis and Design of Analog Integrated Circuits, 5th ed., 2009 (from memory)';
const [kelvin, thermalVoltage] = [298.15, (1.380649e-23 * 298.15) / 1.602176634e-19];

describe('transconductance', () => {
  test('is I_B/2V_T for small signals, whatever the current and the temperature', async () => {
    const errors: number[] = [];
    for (const [celsius, , , , gmPerAmpere] of table('thermal-voltage/thermal-voltage.csv')) {
      for (const bias of [1e-6, 1e-4, 1e-3]) {
        const { peak } = await current({ sine: 1e-5, bias, celsius: celsius! });
        errors.push(peak / (1e-5 * bias * gmPerAmpere!) - 1);
      }
    }
    claim({
      what: 'Small-signal transconductance I_B/2V_T, 1 µA … 1 mA, 0 … 50 °C',
      source: `${textbook}; V_T = kT/q from exact SI constants (test/reference/thermal-voltage)`,
      tolerance: 2e-8,
      because: 'what the pair bends of a sine of 10 µV peak, (V/2V_T)²/4',
      errors,
    });
  });

  test('falls by 1/T, and by less where the pair is driven', async () => {
    const x = 0.05 / (2 * thermalVoltage);
    const drift = async (volts: number): Promise<number> => {
      const at = async (celsius: number) => (await current({ steady: volts, celsius })).mean;
      return ((await at(25.1)) - (await at(24.9))) / (0.2 * (await at(25)));
    };
    claim({
      what: 'Temperature coefficient of the gain at 25 °C: −3354.0 ppm/K at 10 µV, −1903.4 ppm/K at 50 mV',
      source: 'derivative of tanh(V/2V_T), −(1/T)·x·sech²x/tanh x',
      tolerance: 1e-6,
      because: 'a central difference over ±0.1 K is off by (0.1 K/T)² = 1.1e-7',
      errors: [
        (await drift(1e-5)) / (-1 / kelvin) - 1,
        (await drift(0.05)) / (-x / (kelvin * Math.sinh(x) * Math.cosh(x))) - 1,
      ],
    });
  });
});

describe('compression', () => {
  test('by 1 dB and 3 dB stands where each definition puts it', async () => {
    const small = await current({ sine: 1e-5 });
    const decibels = (gain: number) => 20 * Math.log10(gain / (small.peak / 1e-5));
    const errors: number[] = [];
    for (const [dB, sine, slope, chord] of table('tanh/compression.csv').map(([dB, ...millivolts]) => [
      dB!,
      ...millivolts.map((value) => value / 1000),
    ])) {
      errors.push(decibels((await current({ sine: sine! })).peak / sine!) + dB!);
      errors.push(decibels((await current({ sine: 1e-5, steady: slope! })).peak / 1e-5) + dB!);
      errors.push(decibels((await current({ steady: chord! })).mean / chord!) + dB!);
    }
    claim({
      what: 'Gain at the 1 dB and 3 dB compression points of the fundamental, the slope and the chord',
      source: 'roots of b₁(x)/x, sech²x and tanh(x)/x, 40 digits (test/reference/tanh)',
      tolerance: 1e-6,
      unit: 'dB',
      because: 'the small sine that stands for the slope bends by 1e-8, 8e-8 dB',
      errors,
    });
  });
});

test('a cell gives no more than its bias current, and uses no more than its largest', async () => {
  expect((await current({ steady: 5 })).mean).toBeCloseTo(1e-4, 12);
  expect((await current({ steady: -5, bias: 2e-3 })).mean).toBeCloseTo(-1e-3, 12);
});

test('inputs are differential', async () => {
  const stage = patch(
    {
      blocks: {
        high: constant({ voltage: '1.03 V' }),
        low: constant({ voltage: '1 V' }),
        drive: currentSource({ current: '100 µA' }),
        cell: ota({ gainError: '2 %' }),
        load: load({ resistance: '1 Ω' }),
      },
    },
    ({ high, low, drive, cell, load }) => [
      wire(high.out, cell.plus),
      wire(low.out, cell.minus),
      wire(drive.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
  const { traces } = await simulate(stage, { length: '1 ms', probes: ['load.out'], decimate: false });
  expect(traces.load.out.samples.at(-1)).toBeCloseTo(1.02e-4 * Math.tanh(0.03 / (2 * thermalVoltage)), 15);
});
