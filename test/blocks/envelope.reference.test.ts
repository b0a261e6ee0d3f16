import { envelope, gate, lfo } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { describe, test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';
import { stopwatch } from './stopwatch.ts';

// The gate is a triangle of ±5 V, 10 Hz: it passes 1 V upward at 5 ms and 0.9 V downward at 45.5 ms, between samples
// and straight, so the envelope knows both instants exactly.
const trigger = lfo({ shape: 'triangle', frequency: '10 Hz', amplitude: '5 V' });
const [opens, closes] = [5e-3, 45.5e-3];

const [attack, decay, sustain, release, aim] = [5e-3, 10e-3, 0.6, 20e-3, 1.3];
const shape = envelope({
  attack: '5 ms',
  decay: '10 ms',
  sustain: '60 %',
  release: '20 ms',
  rest: '0 V',
  peak: '1 V',
  aim,
});
const rise = attack / Math.log(aim / (aim - 1));
const fall = { decay: decay / Math.log(100), release: release / Math.log(100) };

/** Instant at which an envelope last passes a level within `length` seconds. */
async function passes(
  level: number,
  direction: 'rising' | 'falling',
  length: number,
  kind = shape,
): Promise<number> {
  const voice = patch(
    { blocks: { trigger, shape: kind, watch: stopwatch({ level: `${level} V`, direction }) } },
    ({ trigger, shape, watch }) => [wire(trigger.out, shape.gate), wire(shape.out, watch.in)],
  );
  const run = { length: `${length} s`, probes: ['watch.at'], decimate: false } as const;
  return (await simulate(voice, run)).traces.watch.at.samples.at(-1)!;
}

const source = 'charge of a capacitor through a resistor (any text on circuits)';
const because =
  'a nanosecond and a millionth: between samples the envelope is read off a cubic, (h/τ)⁴/384 of its step';
/** Error of an instant, as a share of what is allowed: 1 ns and 1e-6 of the time since the stage began. */
const share = (found: number, since: number, elapsed: number): number =>
  (found - since - elapsed) / (1e-9 + 1e-6 * elapsed);

describe('time to any level', () => {
  test('of the attack, aimed at 1.3', async () => {
    const errors: number[] = [];
    for (const level of [0.01, 0.1, 0.5, 0.9, 0.99]) {
      errors.push(share(await passes(level, 'rising', 0.04), opens, rise * Math.log(aim / (aim - level))));
    }
    claim({
      what: 'Attack: t = τ·ln(A/(A − v)), gate edge between samples, in 1 ns + 1e-6',
      source,
      tolerance: 1,
      because,
      errors,
    });
  });

  test('of the decay', async () => {
    const errors: number[] = [];
    for (const level of [0.99, 0.9, 0.7, 0.61]) {
      const elapsed = fall.decay * Math.log((1 - sustain) / (level - sustain));
      errors.push(share(await passes(level, 'falling', 0.045), opens + attack, elapsed));
    }
    claim({
      what: 'Decay: within 1 % of the step in its time, in 1 ns + 1e-6',
      source,
      tolerance: 1,
      because,
      errors,
    });
  });

  test('of the release', async () => {
    const errors: number[] = [];
    // The decay has not quite ended where the release begins.
    const left = sustain + (1 - sustain) * Math.exp(-(closes - opens - attack) / fall.decay);
    for (const level of [0.55, 0.3, 0.1, 0.01]) {
      const elapsed = fall.release * Math.log(left / level);
      errors.push(share(await passes(level, 'falling', 0.1), closes, elapsed));
    }
    claim({ what: 'Release from the sustain level, in 1 ns + 1e-6', source, tolerance: 1, because, errors });
  });
});

test('attacks of other aims', async () => {
  const errors: number[] = [];
  for (const [beyond, overTau, atHalf] of table('envelope/attack.csv') as [number, number, number][]) {
    const aimed = envelope({ attack: '5 ms', decay: '1 s', sustain: 1, peak: '1 V', aim: beyond });
    errors.push(share(await passes(atHalf, 'rising', 0.02, aimed), opens, attack / 2));
    // The attack ends at the peak after its time, so its time constant is that over the table's figure.
    const tau = attack / overTau;
    errors.push(
      share(await passes(0.5, 'rising', 0.02, aimed), opens, tau * Math.log(beyond / (beyond - 0.5))),
    );
  }
  claim({
    what: 'Attack aimed at 1.01 … 2: level at half its time A·(1 − √((A − 1)/A)), in 1 ns + 1e-6',
    source: 'closed form, computed in 40 digits (test/reference/envelope)',
    tolerance: 1,
    because,
    errors,
  });
});

test('a gate that comes back during the release starts the attack from where the level is', async () => {
  const short = envelope({ attack: '5 ms', decay: '1 s', sustain: 1, release: '100 ms', peak: '1 V', aim });
  const voice = patch(
    { blocks: { key: gate({ held: '20 ms', period: '40 ms' }), shape: short } },
    ({ key, shape: it }) => [wire(key.out, it.gate)],
  );
  const { samples } = (
    await simulate(voice, { length: '60 ms', probes: ['shape.out'], decimate: false, edges: 'carried' })
  ).traces.shape.out;
  const at = (milliseconds: number): number => samples[milliseconds * 192]!;
  const fell = (milliseconds: number): number => Math.exp((-milliseconds * Math.log(100)) / 100);
  claim({
    what: 'Release of 20 ms, and attack from the level that is left, A − (A − v₀)·exp(−t/τ), gate carried as an edge',
    source,
    tolerance: 1e-9,
    because: 'the gate edge lies a picosecond early, 1e-9 of a millisecond',
    errors: [at(39) / fell(19) - 1, at(42) / (aim - (aim - fell(20)) * Math.exp(-2e-3 / rise)) - 1],
  });
});
