import { execFileSync } from 'node:child_process';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** What a run of the voice says about itself. */
export interface VoiceRun {
  /** Nanoseconds per internal sample, decimation and float32 output included. */
  readonly nsPerSample: number;
  /** Level of the output, V. */
  readonly rms: number;
  readonly peak: number;
}

/** Builds the C program; undefined where there is no gcc. */
export function buildReferenceC(): ((seconds: number) => VoiceRun) | undefined {
  const folder = mkdtempSync(join(tmpdir(), 'reference-voice-'));
  const program = join(folder, 'reference-voice');
  const source = fileURLToPath(new URL('c/reference-voice.c', import.meta.url));
  try {
    execFileSync('gcc', ['-O3', '-march=native', '-o', program, source, '-lm'], { stdio: 'inherit' });
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
    throw error;
  }
  return (seconds) =>
    JSON.parse(
      execFileSync(program, [String(seconds), join(folder, 'voice.f32')], { encoding: 'utf8' }),
    ) as VoiceRun;
}
