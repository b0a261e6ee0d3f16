/**
 * The foghorn of Skerry Light, a harbour sound installation: a saw through two gain cells. The
 * envelope closes the first, an LFO swells the second. Renders one blast to out/foghorn.wav, then
 * measures the same voice with a sine, where the textbook says what must come out.
 */
import { fileURLToPath } from 'node:url';
import {
  buffer,
  coupling,
  currentDrive,
  divider,
  envelope,
  gate,
  lfo,
  load,
  oscillator,
  ota,
} from '@tailpair/blocks';
import { saveWav } from '@tailpair/cli/node';
import { cut, formatQuantity, type Patch, patch, simulate, wire } from '@tailpair/core';
import { modulationDepth, peak, sidebands, thd } from '@tailpair/core/analysis';

type Probe = 'first.out' | 'second.out' | 'output.out';

/** The voice; its source is a saw to be heard, or a sine to be measured. */
export function foghorn(source: { shape: 'saw' | 'sine'; frequency: string }, held = '2 s'): Patch<Probe> {
  return patch(
    {
      title: 'Foghorn, Skerry Light',
      supply: ['-12 V', '12 V'],
      blocks: {
        horn: oscillator({ ...source, amplitude: '5 V' }),
        pad: divider({ top: '99k', bottom: '1k' }),
        watch: gate({ delay: '0.1 s', held, period: '60 s' }),
        blast: envelope({ attack: '300 ms', decay: '400 ms', sustain: '80 %', release: '500 ms' }),
        blastDrive: currentDrive({ resistance: '16k' }),
        firstCell: ota(),
        first: load({ resistance: '100' }),
        between: buffer(),
        swell: lfo({ frequency: '5 Hz', amplitude: '2 V', offset: '4 V' }),
        swellDrive: currentDrive({ resistance: '10k' }),
        secondCell: ota(),
        second: load({ resistance: '10k', capacitance: '100 pF' }),
        line: buffer(),
        output: coupling(),
      },
    },
    (b) => [
      wire(b.horn.out, b.pad.in),
      wire(b.pad.out, b.firstCell.plus),
      wire(b.watch.out, b.blast.gate),
      wire(b.blast.out, b.blastDrive.in),
      wire(b.blastDrive.out, b.firstCell.bias),
      wire(b.firstCell.out, b.first.in),
      wire(b.first.out, b.between.in),
      wire(b.between.out, b.secondCell.plus),
      wire(b.swell.out, b.swellDrive.in),
      wire(b.swellDrive.out, b.secondCell.bias),
      wire(b.secondCell.out, b.second.in),
      wire(b.second.out, b.line.in),
      wire(b.line.out, b.output.in),
    ],
  );
}

/** One figure of the voice, beside what it must be. */
export interface Row {
  readonly figure: string;
  readonly measured: number;
  readonly expected: number;
  readonly unit: '%' | 'dBc';
  readonly because: string;
}

/** Measures the voice with a sine of 1 kHz while its gate is open. */
export async function measure(): Promise<Row[]> {
  const voice = foghorn({ shape: 'sine', frequency: '1 kHz' }, '6 s');
  const { traces } = await simulate(voice, { length: '4 s', probes: ['first.out', 'second.out'] });
  const open = { from: '3 s', length: '1 s' };
  const first = cut(traces.first.out, open);
  const second = cut(traces.second.out, open);
  const scheme = { carrier: '1 kHz', modulator: '5 Hz' };
  const [lower, upper] = sidebands(second, { ...scheme, orders: 1 }).filter(({ order }) => order !== 0);
  const half = 'AM of depth m = 2 V/4 V: each sideband is m/2 of its carrier';
  return [
    {
      figure: 'THD after the first cell',
      measured: 100 * thd(first, { fundamental: '1 kHz' }),
      expected: 6.414809524,
      unit: '%',
      because: 'Fourier series of tanh at 50 mV peak, 25 °C, harmonics 2 … 9',
    },
    {
      figure: 'modulation depth of the swell',
      measured: 100 * modulationDepth(second, scheme),
      expected: 50,
      unit: '%',
      because: 'the current drive is linear: 2 V on 4 V',
    },
    {
      figure: 'sideband at 995 Hz',
      measured: lower!.dBc,
      expected: 20 * Math.log10(0.25),
      unit: 'dBc',
      because: half,
    },
    {
      figure: 'sideband at 1005 Hz',
      measured: upper!.dBc,
      expected: 20 * Math.log10(0.25),
      unit: 'dBc',
      because: half,
    },
  ];
}

/** Renders one blast, measures the voice, and prints both. */
export async function main(print: (line: string) => void): Promise<void> {
  print('Caution: loud or unexpected sound can damage hearing; turn the level down before you listen.');
  const { traces, diagnostics } = await simulate(foghorn({ shape: 'saw', frequency: '110 Hz' }), {
    length: '4 s',
    probes: ['output.out'],
  });
  const horn = traces.output.out;
  const file = await saveWav('out/foghorn.wav', horn, { encoding: 'pcm24' });
  for (const { message } of diagnostics.warnings) print(`warning: ${message}`);
  const loud = peak(horn);
  const shut = peak(cut(horn, { from: '3.8 s' }));
  print(
    `${file.path}: ${file.seconds} s, peak ${formatQuantity(loud, 'V')}, full scale ${formatQuantity(file.fullScale, 'V')}`,
  );
  print(`closed again: ${(20 * Math.log10(shut / loud)).toFixed(1)} dB after 1.7 s of release`);
  print('');
  print(`${'figure'.padEnd(32)}${'measured'.padStart(14)}${'should be'.padStart(14)}   because`);
  for (const { figure, measured, expected, unit, because } of await measure()) {
    const [is, shall] = [measured, expected].map((value) => `${value.toFixed(4)} ${unit}`.padStart(14));
    print(`${figure.padEnd(32)}${is}${shall}   ${because}`);
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await main(console.log);
