import { constant, oscillator } from '@tailpair/blocks';
import { cut, patch, simulate, wire } from '@tailpair/core';
import { fitTones } from '@tailpair/core/analysis';
import { test } from 'vitest';
import { claim } from '../accuracy/claim.ts';
import { table } from '../reference/table.ts';

/** Frequency of the oscillator at a pitch voltage, from how its phase moves between two stretches of its trace. */
async function frequencyAt(volts: number, expected: number): Promise<number> {
  const voice = patch(
    { blocks: { key: constant({ voltage: `${volts} V` }), tone: oscillator({ frequency: '440 Hz' }) } },
    ({ key, tone }) => [wire(key.out, tone.pitch)],
  );
  const { out } = (await simulate(voice, { length: '1.2 s', probes: ['tone.out'], decimate: false })).traces
    .tone;
  const phaseFrom = (from: number): number =>
    fitTones(cut(out, { from, length: 0.2 }), [expected]).tones[0]!.phase;
  const turned = (phaseFrom(1) - phaseFrom(0)) / (2 * Math.PI);
  return expected + turned - Math.round(turned);
}

test('a volt is an octave: equal temperament', async () => {
  const errors: number[] = [];
  for (const [semitones, hertz] of table('pitch/equal-temperament.csv') as [number, number][]) {
    errors.push(1200 * Math.log2((await frequencyAt(semitones / 12, hertz)) / hertz));
  }
  claim({
    what: 'Pitch of 1 V per octave from 440 Hz, a twelfth of a volt a semitone',
    source:
      'equal temperament, A4 = 440 Hz: ISO 16:1975 (from memory); frequencies in 40 digits (test/reference/pitch)',
    tolerance: 1e-6,
    because: 'a phase fitted to 1e-10 over a second; a cent is 0.06 % of the frequency',
    errors,
    unit: 'cents',
  });
});
