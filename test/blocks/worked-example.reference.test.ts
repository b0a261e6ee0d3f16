import { bias, constant, divider, load, oscillator, ota } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { peak, thd } from '@tailpair/core/analysis';
import { describe, expect, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

// Common practice: ±12 V, a sine of 1 V peak to peak divided by ten, a load of 10 kΩ, and 120 kΩ from a control
// voltage into the bias pin. On a bench it is silent with the control at −12 V, gives about ±1.5 V at +12 V, and
// follows a straight line by eye in between.
const blocks = (control: number) => ({
  bell: oscillator({ frequency: '1 kHz', amplitude: '0.5 V' }),
  pad: divider({ top: '9k', bottom: '1k' }),
  control: constant({ voltage: `${control} V` }),
  bias: bias(),
  cell: ota(),
  load: load({ resistance: '10k' }),
});

function amplifier(control: number, ambient = '25 °C') {
  return patch(
    { supply: ['-12 V', '12 V'], ambient, blocks: blocks(control) },
    ({ bell, pad, control, bias, cell, load }) => [
      wire(bell.out, pad.in),
      wire(pad.out, cell.plus),
      wire(control.out, bias.pin, { via: '120k' }),
      wire(bias.out, cell.bias),
      wire(cell.out, load.in),
    ],
  );
}

const record = { length: '2 ms', probes: ['load.out'], decimate: false } as const;

async function peakAt(control: number, ambient?: string): Promise<number> {
  return peak((await simulate(amplifier(control, ambient), record)).traces.load.out);
}

describe('a voltage-controlled amplifier with a resistor into its bias pin', () => {
  test('follows its model over the whole range of the control', async () => {
    const errors: number[] = [];
    for (const [control, volts] of table('worked-example/control.csv'))
      if (control! > -12) errors.push((await peakAt(control!)) / volts! - 1);
    claim({
      what: 'Peak output against the control, −11.5 … 12 V through 120 kΩ: 3.09 mV … 1.4620 V',
      source:
        'I·10 kΩ·tanh(50 mV/2V_T), I by the Lambert W function in 40 digits (test/reference/worked-example)',
      tolerance: 1e-12,
      because: 'rounding of the control voltage against V_T, 1e-13; a sample falls on the peak',
      errors,
    });
  });

  test('is silent at −12 V', async () => {
    expect(await peakAt(-12)).toBeLessThan(1e-9);
  });

  test('gives about ±1.5 V at full control', async () => {
    claim({
      what: 'Peak output at full control: about ±1.5 V',
      source: 'common practice, read off a screen',
      tolerance: 0.05,
      because: 'a trace on a screen is read to about 5 %',
      errors: [(await peakAt(12)) / 1.5 - 1],
    });
  });

  test('is a straight line by eye in between', async () => {
    const controls = Array.from({ length: 49 }, (_, i) => -12 + i / 2);
    const volts = await Promise.all(controls.map((control) => peakAt(control)));
    // Least-squares line; the abscissae are centred on 0 V.
    const mean = volts.reduce((a, b) => a + b) / volts.length;
    const slope =
      volts.reduce((sum, v, i) => sum + v * controls[i]!, 0) / controls.reduce((sum, c) => sum + c * c, 0);
    claim({
      what: 'Deviation of the control law from a straight line, as a share of full output',
      source: 'common practice: straight by eye',
      tolerance: 0.03,
      because: 'a bend of a thirtieth of the height of a plot is about what an eye sees',
      errors: volts.map((v, i) => (v - mean - slope * controls[i]!) / volts.at(-1)!),
    });
  });

  test('distorts alike at every setting', async () => {
    const errors: number[] = [];
    const [, expected] = table('tanh/thd.csv').find(([millivolts]) => millivolts === 50)!;
    for (const control of [-11, -6, 0, 12]) {
      const { traces } = await simulate(amplifier(control), { ...record, length: '20 ms' });
      errors.push(thd(traces.load.out, { fundamental: '1 kHz', highest: 21 }) / expected! - 1);
    }
    claim({
      what: 'THD_F of 6.4148 % at 50 mV peak, whatever the control',
      source: 'exact mean square of tanh of a sine, 40 digits (test/reference/tanh)',
      tolerance: 1e-9,
      because: 'harmonics above the 21st add less than 1e-10',
      errors,
    });
  });

  test('drifts with temperature as its model does', async () => {
    const errors: number[] = [];
    for (const [celsius, , volts] of table('bias/temperature.csv'))
      errors.push((await peakAt(12, `${celsius} °C`)) / volts! - 1);
    claim({
      what: 'Peak output at full control, 1.48885, 1.46203, 1.42268 V at 15, 25, 40 °C, and at −20 and 70 °C',
      source: 'law of the junction and of the pair in 40 digits (test/reference/bias)',
      tolerance: 1e-12,
      because: 'rounding',
      errors,
    });
  });

  test('without a load it is refused, with the cure', () => {
    const { load: _, ...unloaded } = blocks(0);
    const wiring = () =>
      patch({ blocks: { ...unloaded, next: divider() } }, ({ bell, pad, control, bias, cell, next }) => [
        wire(bell.out, pad.in),
        wire(pad.out, cell.plus),
        wire(control.out, bias.pin, { via: '120k' }),
        wire(bias.out, cell.bias),
        // @ts-expect-error a current has no defined voltage without a load
        wire(cell.out, next.in),
      ]);
    expect(wiring).toThrowError(
      expect.objectContaining({ code: 'wire-family', message: expect.stringContaining('put a load') }),
    );
  });
});
