import {
  bias,
  buffer,
  constant,
  currentDrive,
  currentSource,
  divider,
  load,
  mixer,
  oscillator,
  ota,
} from '@tailpair/blocks';
import { patch, simulate, TailpairError, type Wire, wire } from '@tailpair/core';
import { describe, expect, test } from 'vitest';

const blocks = {
  tone: oscillator(),
  level: constant(),
  flow: currentSource(),
  drive: currentDrive(),
  pad: divider(),
  pin: bias(),
  cell: ota(),
  load: load(),
  sum: mixer(),
};
type Handles = Parameters<Parameters<typeof patch<typeof blocks>>[1]>[0];

/** The fault of one more wire in a patch whose inputs are all wired. */
function refusal(connect: (b: Handles) => Wire[]): TailpairError {
  try {
    patch({ blocks }, connect);
  } catch (error) {
    if (error instanceof TailpairError) return error;
    throw error;
  }
  throw new Error('nothing was refused');
}

const wired = (b: Handles): Wire[] => [
  wire(b.level.out, b.drive.in),
  wire(b.tone.out, b.pad.in),
  wire(b.pad.out, b.cell.plus),
  wire(b.level.out, b.pin.pin, { via: '120k 1%' }),
  wire(b.pin.out, b.cell.bias),
  wire(b.cell.out, b.load.in),
  wire(b.load.out, b.sum.sum, { via: 10_000 }),
];
const without = (b: Handles, to: string): Wire[] =>
  wired(b).filter((w) => `${w.to.block}.${w.to.port}` !== to);

test('a patch with every legal family of wire is built', () => {
  const { wires } = patch({ blocks }, (b) => [...wired(b), wire(b.flow.out, b.pin.pin)]);
  expect(wires).toHaveLength(8);
  expect(wires[3]!.via).toEqual({ value: 120_000, tolerance: 0.01 });
});

describe('wires that physics forbids are refused by the compiler and at run time', () => {
  test('a current into a voltage input', () => {
    // @ts-expect-error a current output cannot drive a voltage input
    const { code, message } = refusal((b) => [...without(b, 'pad.in'), wire(b.cell.out, b.pad.in)]);
    expect(code).toBe('wire-family');
    expect(message).toContain('cell.out -> pad.in');
    expect(message).toContain('no defined voltage; put a load or a current-to-voltage stage between');
  });

  test('a voltage into a current input', () => {
    // @ts-expect-error a voltage output cannot drive a current input
    const { code, message } = refusal((b) => [...wired(b), wire(b.tone.out, b.load.in)]);
    expect(code).toBe('wire-family');
    expect(message).toContain('current-drive');
  });

  test('a voltage into a node without its resistor', () => {
    // @ts-expect-error a voltage comes into a node through a resistor
    const { code, message } = refusal((b) => [...wired(b), wire(b.tone.out, b.pin.pin)]);
    expect(code).toBe('wire-resistor');
    expect(message).toContain('via 120k');
  });

  test('a resistor where none can be', () => {
    // @ts-expect-error only a voltage into a node takes a resistor
    expect(refusal((b) => [...without(b, 'pad.in'), wire(b.tone.out, b.pad.in, { via: '1k' })]).code).toBe(
      'wire-resistor',
    );
    // @ts-expect-error a current into a node comes in directly
    expect(refusal((b) => [...wired(b), wire(b.flow.out, b.pin.pin, { via: '1k' })]).code).toBe(
      'wire-resistor',
    );
  });

  test('output to output, input to input, and ports that are not there', () => {
    // @ts-expect-error a wire runs from an output to an input
    expect(refusal((b) => [...wired(b), wire(b.tone.out, b.level.out)]).code).toBe('unknown-port');
    // @ts-expect-error a wire runs from an output to an input
    expect(refusal((b) => [...wired(b), wire(b.pad.in, b.cell.minus)]).code).toBe('unknown-port');
    // @ts-expect-error the oscillator has no such port
    expect(refusal((b) => [...wired(b), wire(b.tone.wave, b.cell.minus)]).code).toBe('unknown-port');
  });
});

describe('wires that are legal one by one may not be together', () => {
  test('two drivers of a voltage', () => {
    const { code, message } = refusal((b) => [...wired(b), wire(b.level.out, b.pad.in)]);
    expect(code).toBe('wire-fan-in');
    expect(message).toBe(
      'pad.in: has 2 drivers, tone.out and level.out; a voltage input takes one, so sum them in a mixer',
    );
  });

  test('a current into two inputs', () => {
    const { code, message } = refusal((b) => [
      ...wired(b),
      wire(b.flow.out, b.load.in),
      wire(b.flow.out, b.pin.pin),
    ]);
    expect(code).toBe('wire-fan-out');
    expect(message).toContain('flow.out: feeds 2 inputs, load.in and pin.pin');
    expect(message).toContain('mirror or a second bias block');
  });

  test('an input left open, and all faults at once', () => {
    const one = refusal((b) => without(b, 'load.in'));
    expect(one.code).toBe('input-missing');
    expect(one.message).toContain('load.in');
    const both = refusal((b) => without(b, 'load.in').filter(({ to }) => to.port !== 'pin'));
    expect(both.code).toBe('patch-faults');
    expect(both.faults.map(({ where }) => where)).toEqual(['pin.pin', 'load.in']);
  });

  test('a resistor that is none', () => {
    expect(refusal((b) => [...wired(b), wire(b.tone.out, b.pin.pin, { via: '0' })]).code).toBe('value-range');
    expect(refusal((b) => [...wired(b), wire(b.tone.out, b.pin.pin, { via: '-1k' })]).code).toBe(
      'value-range',
    );
    expect(refusal((b) => [...wired(b), wire(b.tone.out, b.pin.pin, { via: '120 kOm' })]).code).toBe(
      'quantity-unit',
    );
  });
});

test('a ring of blocks is refused with its path', async () => {
  const ring = patch({ blocks: { a: buffer(), b: buffer(), c: buffer() } }, ({ a, b, c }) => [
    wire(a.out, b.in),
    wire(b.out, c.in),
    wire(c.out, a.in),
  ]);
  const fault = await simulate(ring, { length: '1 ms', probes: ['a.out'] }).catch((error: unknown) => error);
  expect(fault).toMatchObject({ code: 'loop' });
  for (const hop of ['a.out -> b.in', 'b.out -> c.in', 'c.out -> a.in']) expect(String(fault)).toContain(hop);
});

describe('parameters and probes', () => {
  test('names, units and ranges are checked by the compiler where it can, and at run time', async () => {
    const bad = patch.bind(null, {
      // @ts-expect-error there is no such parameter
      blocks: { tone: oscillator({ frequenzy: '1 kHz', amplitude: '-1 V' }), pad: load({ resistance: '0' }) },
    } as never);
    expect(() => bad(() => [])).toThrow(/did you mean frequency\?/);
    expect(() => bad(() => [])).toThrow(/tone\.amplitude: must be at least 0 V, got -1 V/);
    expect(() => bad(() => [])).toThrow(/pad\.resistance: must be above 0 Ω, got 0 Ω/);
    const tone = patch({ blocks: { tone: oscillator() } }, () => []);
    // @ts-expect-error there is no such output
    await expect(simulate(tone, { length: '1 ms', probes: ['tone.uot'] })).rejects.toThrow(
      /did you mean tone\.out\?/,
    );
  });

  test('rails that are swapped', () => {
    expect(() => patch({ supply: ['12 V', '-12 V'], blocks: { tone: oscillator() } }, () => [])).toThrow(
      /swap them/,
    );
  });
});

test('a loaded source is warned of with its loss', () => {
  const { warnings } = patch(
    {
      blocks: {
        flow: currentSource(),
        load: load({ resistance: '10k' }),
        pad: divider({ top: '90k', bottom: '10k' }),
      },
    },
    (b) => [wire(b.flow.out, b.load.in), wire(b.load.out, b.pad.in)],
  );
  // Divider algebra: 100 kΩ on 10 kΩ leaves 100/110, −0.83 dB.
  expect(warnings).toHaveLength(1);
  expect(warnings[0]!.message).toContain(
    '10 kΩ is loaded by 100 kΩ at pad.in; the true level is 0.83 dB lower',
  );
});
