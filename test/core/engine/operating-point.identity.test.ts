import { bias, constant, coupling, currentDrive, load, mixer, oscillator, ota } from '@tailpair/blocks';
import { operatingPoint, type PortPoint, patch, TailpairError, wire } from '@tailpair/core';
import { defineBlock, voltage } from '@tailpair/core/block';
import { describe, expect, test } from 'vitest';

/** kT/q at 25 °C, exact SI constants. */
const thermal = (1.380649e-23 * 298.15) / 1.602176634e-19;

const cell = patch(
  {
    supply: ['-12 V', '12 V'],
    blocks: {
      drive: constant({ voltage: '20 mV' }),
      control: constant({ voltage: '3 V' }),
      pin: bias(),
      cell: ota({ maxBias: '1 mA' }),
      drop: load({ resistance: '10k', headroomPositive: '1 V' }),
    },
  },
  ({ drive, control, pin, cell, drop }) => [
    wire(drive.out, cell.plus),
    wire(control.out, pin.pin, { via: '120k' }),
    wire(pin.out, cell.bias),
    wire(cell.out, drop.in),
  ],
);

function named(ports: readonly PortPoint[], port: string): PortPoint {
  const found = ports.find((it) => it.port === port);
  if (found === undefined) throw new Error(`no port ${port}`);
  return found;
}

describe('a cell fed through 120 kΩ', () => {
  test('obeys Kirchhoff at the pin, the law of the pair at the cell and Ohm at the load', async () => {
    const { time, ports } = await operatingPoint(cell, { at: '10 ms' });
    expect(time).toBe(0.01);
    const pin = named(ports, 'pin.pin');
    const tail = named(ports, 'cell.bias').current!;
    // Rounding: the pin is found from a difference of currents of equal size.
    expect(pin.current! / tail).toBeCloseTo(1, 12);
    expect((3 - pin.voltage!) / 120e3 / tail).toBeCloseTo(1, 12);
    expect(pin.voltage!).toBeGreaterThan(-11.5);
    expect(pin.voltage!).toBeLessThan(-11.3);
    const out = named(ports, 'cell.out').current!;
    expect(out / (tail * Math.tanh(0.01 / thermal))).toBeCloseTo(1, 12);
    expect(named(ports, 'drop.out').voltage! / (out * 10e3)).toBeCloseTo(1, 12);
  });

  test('has transconductances ± (I_B/2V_T)·sech²(v/2V_T)', async () => {
    const { gains, ports } = await operatingPoint(cell, { at: 0 });
    const tail = named(ports, 'cell.bias').current!;
    const law = tail / (2 * thermal) / Math.cosh(0.01 / thermal) ** 2;
    expect(gains.map(({ from, to }) => `${from} -> ${to}`)).toEqual(['cell.plus -> cell.out']);
    expect(gains[0]!.transconductance / law).toBeCloseTo(1, 12);
  });

  test('tells what is left to the limits', async () => {
    const { ports } = await operatingPoint(cell, { at: 0 });
    expect(named(ports, 'cell.plus')).toMatchObject({ voltage: 0.02, current: null });
    expect(named(ports, 'cell.plus').margin! / (2 * thermal - 0.02)).toBeCloseTo(1, 12);
    expect(named(ports, 'cell.minus')).toMatchObject({ wired: false, voltage: 0, min: null, margin: null });
    const tail = named(ports, 'cell.bias');
    expect(tail).toMatchObject({ min: 0, max: 1e-3, voltage: null });
    expect(tail.margin).toBe(tail.current);
    expect(named(ports, 'drop.out')).toMatchObject({ min: -11, max: 11 });
    expect(named(ports, 'drive.out')).toMatchObject({ min: null, max: null, margin: null, side: 'output' });
  });
});

test('a drive beyond its limit has a negative margin, what it clips stands at its limit', async () => {
  const driven = patch(
    { blocks: { control: constant({ voltage: '12 V' }), drive: currentDrive(), mix: mixer() } },
    ({ control, drive, mix }) => [wire(control.out, drive.in), wire(drive.out, mix.sum)],
  );
  const { ports, gains } = await operatingPoint(driven, { at: 0 });
  expect(named(ports, 'drive.in').margin).toBeCloseTo(-2, 12);
  expect(named(ports, 'drive.out').margin).toBe(0);
  expect(named(ports, 'mix.sum')).toMatchObject({ voltage: 0, current: 1e-3 });
  expect(named(ports, 'mix.out')).toMatchObject({ voltage: -10.5, margin: 0 });
  expect(gains).toEqual([{ from: 'drive.in', to: 'drive.out', transconductance: 0 }]);
});

test('the instant is counted in internal samples and the states are those of the run', async () => {
  const coupled = patch(
    { blocks: { tone: oscillator({ frequency: '100 Hz', amplitude: '1 V' }), couple: coupling() } },
    ({ tone, couple }) => [wire(tone.out, couple.in)],
  );
  const { time, ports } = await operatingPoint(coupled, { at: '2.5 ms', rate: 48000, oversample: 4 });
  expect(time).toBe(0.0025);
  expect(named(ports, 'tone.out').voltage).toBeCloseTo(1, 9);
  // Steady or not, a 33 ms high-pass has taken less than 5 % in a quarter of a period.
  expect(named(ports, 'couple.out').voltage).toBeGreaterThan(0.95);
});

test('a run can be stopped, and an instant before the start is refused', async () => {
  await expect(operatingPoint(cell, { at: 1, signal: { aborted: true } })).rejects.toMatchObject({
    code: 'aborted',
  });
  await expect(operatingPoint(cell, { at: -1 })).rejects.toMatchObject({ code: 'value-range' });
});

describe('a kind that misstates its limits is refused', () => {
  const face = {
    kind: 'test-kind',
    summary: 'For tests.',
    inputs: { in: voltage() },
    outputs: { out: voltage() },
    params: {},
  } as const;
  const refusal = (define: () => unknown): TailpairError => {
    try {
      define();
    } catch (error) {
      if (error instanceof TailpairError) return error;
    }
    throw new Error('nothing was refused');
  };

  test('by port', () => {
    const { code, message } = refusal(() =>
      defineBlock({
        ...face,
        equations: (s) => ({ out: s.in }),
        limits: () => ({ on: { min: '0 V' } }) as object,
      }),
    );
    expect(code).toBe('declaration');
    expect(message).toContain('limits names on, which is no port');
  });

  test('by unit', () => {
    expect(
      refusal(() =>
        defineBlock({ ...face, equations: (s) => ({ out: s.in }), limits: () => ({ out: { min: '0 A' } }) }),
      ).code,
    ).toBe('quantity-unit');
    expect(
      refusal(() =>
        defineBlock({
          ...face,
          equations: (s) => ({ out: s.in }),
          limits: ({ time }) => ({ out: { max: time } }),
        }),
      ).message,
    ).toContain('is in s; it must be in V');
  });

  test('by a potential where there is no node', () => {
    expect(
      refusal(() =>
        defineBlock({ ...face, equations: (s) => ({ out: s.in }), potentials: ({ in: v }) => ({ in: v }) }),
      ).message,
    ).toContain('no node input');
  });
});
