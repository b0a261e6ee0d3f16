import * as kinds from '@tailpair/blocks';
import {
  type Block,
  type BlockKind,
  formatQuantity,
  type Patch,
  type ProbeTraces,
  patch,
  simulate,
  type Wire,
  wire,
} from '@tailpair/core';
import {
  amperes,
  current,
  defineBlock,
  hertz,
  type KindDeclaration,
  type NumberParameter,
  sin,
  voltage,
  volts,
} from '@tailpair/core/block';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';

const wave = defineBlock({
  kind: 'test-wave',
  summary: 'Two sines, for tests.',
  inputs: {},
  outputs: { volts: voltage(), amperes: current() },
  params: { frequency: hertz('1 kHz'), level: volts('1 V'), flow: amperes('100 uA') },
  equations: ({ time, frequency, level, flow }) => {
    const angle = time.mul(frequency).mul(2 * Math.PI);
    const shape = sin(angle).add(sin(angle.mul(0.317)).mul(0.5));
    return { volts: level.mul(shape), amperes: flow.mul(shape.add(0.5)) };
  },
});

/** A value as a script would write it, within the parameter's range and near its default. */
function someNumber(parameter: NumberParameter, share: number): string | number {
  const { dimension, min, max, above, initial, whole } = parameter;
  if (whole) return Math.round(share * 5);
  const usual = Number.parseFloat(String(initial));
  const zero = usual === 0;
  const floor = min ?? above ?? Number.NEGATIVE_INFINITY;
  if (zero && initial === '0 F') return share < 0.3 ? '0 F' : formatQuantity(share * 1e-8, dimension, 15);
  if (zero && initial === '0 V') return formatQuantity(Math.max(floor, 4e-3 * (share - 0.5)), dimension, 15);
  if (zero && initial === '0 A') return formatQuantity(1e-3 * share, dimension, 15);
  if (zero) return formatQuantity(Math.min(max ?? 1, Math.max(floor, 0.2 * (share - 0.5))), dimension, 15);
  return initial;
}

/** What stands around a block under test, its ports without their types. */
interface Handles {
  readonly source: { readonly volts: never };
  readonly feed: { readonly amperes: never };
  readonly pulses: { readonly out: never };
  readonly subject: Readonly<Record<string, never>>;
}

/** The block with what it needs around it. */
function bench(kind: BlockKind, given: Record<string, unknown>, frequency: number, level: number): Patch {
  const blocks: Record<string, Block> = {
    source: wave({ frequency: `${frequency} Hz`, level: `${level} V` }) as unknown as Block,
    pulses: kinds.oscillator({ shape: 'pulse', frequency: `${frequency / 7} Hz` }) as unknown as Block,
    feed: wave({ frequency: `${frequency * 1.3} Hz` }) as unknown as Block,
    subject: { kind, given },
  };
  const declaration: KindDeclaration = kind.declaration;
  return patch({ blocks }, (b) => {
    const { source, feed, pulses, subject } = b as unknown as Handles;
    return Object.entries(declaration.inputs).map(([port, { quantity }]): Wire => {
      const into = subject[port]!;
      if (quantity === 'current') return wire(feed.amperes, into);
      if (quantity === 'node') return wire(source.volts, into, { via: '120k' } as never);
      return wire(['gate', 'sync', 'reset'].includes(port) ? pulses.out : source.volts, into);
    });
  }) as Patch;
}

describe('the compiled back-end agrees with the interpreter', () => {
  for (const kind of Object.values(kinds) as unknown as BlockKind[]) {
    test(kind.declaration.kind, async () => {
      const { params } = kind.declaration;
      await fc.assert(
        fc.asyncProperty(
          fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 20, maxLength: 20 }),
          fc.double({ min: 50, max: 8000, noNaN: true }),
          fc.double({ min: 0.01, max: 14, noNaN: true }),
          async (shares, frequency, level) => {
            const given = Object.fromEntries(
              Object.entries(params).map(([name, parameter], i) => [
                name,
                parameter.form === 'choice'
                  ? parameter.choices[Math.floor(shares[i]! * 0.999 * parameter.choices.length)]
                  : someNumber(parameter, shares[i]!),
              ]),
            );
            // Two octaves either way: a megahertz oscillator would count thousands of periods, and digits with them.
            const built = bench(
              kind,
              given,
              frequency,
              'pitch' in kind.declaration.inputs ? level / 7 : level,
            );
            const run = async (backEnd: 'compiled' | 'interpreted'): Promise<Float64Array> => {
              const { traces } = await simulate(built, {
                length: '3 ms',
                probes: ['subject.out'],
                decimate: false,
                backEnd,
              });
              return (traces as ProbeTraces<'subject.out'>).subject.out.samples;
            };
            const [fast, reference] = [await run('compiled'), await run('interpreted')];
            const scale = reference.reduce((most, x) => Math.max(most, Math.abs(x)), 1e-9);
            // Both evaluate the same program in the same order; tanh and powers of two come from other
            // routines, good to a few units in the last place, and 576 steps add up at most that often.
            fast.forEach((x, n) => {
              expect(Math.abs(x - reference[n]!) / scale, `sample ${n}`).toBeLessThanOrEqual(1e-12);
            });
          },
        ),
        { seed: 20261201, numRuns: 30, endOnFailure: true },
      );
    });
  }
});
