/**
 * `npm run bench`: the reference voice against the C program in `c/`, as a ratio. Rounds of both
 * are interleaved, each in a fresh process, because compiled JavaScript may settle differently from
 * start to start and other work on the machine comes and goes; the medians are compared.
 */
import { execFileSync } from 'node:child_process';
import { mkdirSync, writeFileSync } from 'node:fs';
import { cpus } from 'node:os';
import { fileURLToPath } from 'node:url';
import { buildReferenceC, type VoiceRun } from './reference-c.ts';

const rounds = process.argv.includes('--quick') ? 3 : 7;
const seconds = 10;
const voice = fileURLToPath(new URL('run-voice.ts', import.meta.url));

const runVoice = (): VoiceRun =>
  JSON.parse(execFileSync('npx', ['tsx', voice, String(seconds)], { encoding: 'utf8' })) as VoiceRun;

/** Minimum, median and maximum. */
function spread(values: readonly number[]): { least: number; median: number; most: number } {
  const sorted = [...values].sort((a, b) => a - b);
  return { least: sorted[0]!, median: sorted[Math.floor(sorted.length / 2)]!, most: sorted.at(-1)! };
}

const runC = buildReferenceC();
const ours: VoiceRun[] = [];
const theirs: VoiceRun[] = [];
for (let round = 0; round < rounds; round++) {
  ours.push(runVoice());
  if (runC !== undefined) theirs.push(runC(seconds));
}
const tailpair = spread(ours.map(({ nsPerSample }) => nsPerSample));
const table: Record<string, unknown>[] = [
  { row: 'reference voice, Tailpair', 'ns per internal sample': tailpair },
];
if (theirs.length > 0) {
  const c = spread(theirs.map(({ nsPerSample }) => nsPerSample));
  table.push({ row: 'reference voice, C', 'ns per internal sample': c });
  table.push({ row: 'ratio of the medians', ratio: tailpair.median / c.median });
  // The C voice's pin law is the simpler one; a level nearer than 10 % shows that both do the job.
  const level = ours[0]!.rms / theirs[0]!.rms;
  if (Math.abs(level - 1) > 0.1) throw new Error(`levels differ by a factor of ${level}: not the same job`);
  table.push({ row: 'level, Tailpair over C', ratio: level });
} else console.log('gcc is not here: no comparison with C');

const report = {
  node: process.version,
  processor: cpus()[0]?.model,
  cores: cpus().length,
  rounds,
  seconds,
  table,
};
mkdirSync('out', { recursive: true });
writeFileSync('out/bench.json', `${JSON.stringify(report, null, 2)}\n`);
for (const { row, ...numbers } of table) console.log(String(row).padEnd(30), JSON.stringify(numbers));
