import { constant } from '@tailpair/blocks';
import { patch, simulate, wire } from '@tailpair/core';
import { amperes, defineBlock, farads, ratio, states, tanh, voltage, volts } from '@tailpair/core/block';
import { test } from 'vitest';
import { claim } from '../accuracy/claim.ts';

/** A user's own kind: two gm-C integrators in a ring, the first damped. */
const resonator = defineBlock({
  kind: 'resonator',
  summary: 'State-variable stage of three cells and two capacitors.',
  inputs: { in: voltage() },
  outputs: { band: voltage(), low: voltage() },
  params: {
    bias: amperes('10 µA'),
    capacitance: farads('1 nF'),
    damping: ratio(1, { doc: '1/Q' }),
    start: volts('1 µV'),
  },
  equations: ({ in: u, bias, capacitance, damping, start, thermalVoltage }) => {
    const cell = (volts: typeof u) => bias.mul(tanh(volts.div(thermalVoltage.mul(2)))).div(capacitance);
    const { band, low } = states({ band: start, low: '0 V' }, ({ band, low }) => ({
      band: cell(u.sub(low).sub(band.mul(damping))),
      low: cell(band),
    }));
    return { band, low };
  },
});

/** Pole frequency, Hz, and Q of a stage designed for them, from its free decay over ten periods. */
async function measured(frequency: number, q: number): Promise<{ frequency: number; q: number }> {
  const twice = (2 * 1.380649e-23 * 298.15) / 1.602176634e-19;
  const bias = 2 * Math.PI * frequency * 1e-9 * twice;
  const stage = patch(
    { blocks: { rest: constant(), stage: resonator({ bias: `${bias} A`, damping: 1 / q }) } },
    ({ rest, stage }) => [wire(rest.out, stage.in)],
  );
  const run = { length: `${10 / frequency} s`, probes: ['stage.band'], decimate: false } as const;
  const { samples, rate } = (await simulate(stage, run)).traces.stage.band;
  // Samples an eighth of a period apart, so that the fit is well conditioned.
  const stride = Math.max(1, Math.floor(rate / (8 * frequency)));
  const pole = polePair(samples.filter((_, n) => n % stride === 0));
  const natural = Math.hypot(pole.decay, pole.angle);
  return { frequency: (natural * rate) / stride / (2 * Math.PI), q: natural / (2 * pole.decay) };
}

/** Decay and angle per sample of x[n + 2] = a·x[n + 1] − b·x[n], in least squares (the method of Prony, 1795). */
function polePair(x: Float64Array): { decay: number; angle: number } {
  let [aa, ab, bb, ya, yb] = [0, 0, 0, 0, 0];
  for (let n = 0; n + 2 < x.length; n++) {
    const [before, now, next] = [x[n]!, x[n + 1]!, x[n + 2]!];
    aa += now * now;
    ab -= now * before;
    bb += before * before;
    ya += next * now;
    yb -= next * before;
  }
  const determinant = aa * bb - ab * ab;
  const a = (ya * bb - yb * ab) / determinant;
  const b = (aa * yb - ab * ya) / determinant;
  return { decay: -Math.log(b) / 2, angle: Math.acos(a / (2 * Math.sqrt(b))) };
}

test('a resonant stage has the poles of its linearised equations', async () => {
  const cents: number[] = [];
  const ratios: number[] = [];
  for (const frequency of [100, 1000, 3000, 5000, 10_000]) {
    for (const q of [0.7, 2, 10, 100]) {
      const found = await measured(frequency, q);
      cents.push(1200 * Math.log2(found.frequency / frequency));
      ratios.push(found.q / q - 1);
    }
  }
  const source = 'poles of s² + (ω/Q)·s + ω², ω = gm/C (any text on active filters)';
  claim({
    what: 'Pole frequency of a state-variable stage, 100 Hz … 10 kHz, Q = 0.7 … 100',
    source,
    tolerance: 0.03,
    unit: 'cents',
    because: 'the fourth-order rule turns a pole by (ωh)⁵/720 a step: 0.027 cents at 10 kHz and 4 × 48 kHz',
    errors: cents,
  });
  claim({
    what: 'Q of that stage',
    source,
    tolerance: 1e-3,
    because: 'a tenth of what one notices; the rule keeps a lossless pole lossless',
    errors: ratios,
  });
});
