/** Runs the reference voice once warm and prints what it took; started by `main.ts`. */

import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { streamWav } from '@tailpair/cli/node';
import { stream, type Trace } from '@tailpair/core';
import { referenceVoice } from './reference-voice.ts';

const seconds = Number(process.argv[2]);
const folder = mkdtempSync(join(tmpdir(), 'voice-'));
const voice = referenceVoice();

let square = 0;
let peak = 0;
let count = 0;
async function* output(length: number): AsyncGenerator<Trace> {
  square = 0;
  peak = 0;
  count = 0;
  for await (const { couple } of stream(voice, { length, probes: ['couple.out'] })) {
    for (const x of couple.out.samples) {
      square += x * x;
      peak = Math.max(peak, Math.abs(x));
    }
    count += couple.out.samples.length;
    yield couple.out;
  }
}

const render = (length: number): Promise<unknown> =>
  streamWav(join(folder, 'voice.wav'), output(length), { encoding: 'float32', fullScale: '1 V' });

await render(2);
const start = process.cpuUsage();
await render(seconds);
const { user, system } = process.cpuUsage(start);
rmSync(folder, { recursive: true });
console.log(
  JSON.stringify({
    nsPerSample: (1000 * (user + system)) / (count * 4),
    rms: Math.sqrt(square / count),
    peak,
  }),
);
