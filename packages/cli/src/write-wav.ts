import type { FileHandle } from 'node:fs/promises';
import { formatQuantity, TailpairError, type Trace, type WaveEncoding, waveEncoder } from '@tailpair/core';
import { replaceFile } from './replace-file.ts';

/** How samples become a file. */
export interface WavOptions {
  /** How samples are stored; `pcm24` unless given. `float64` with a full scale of 1 V keeps volts as they are. */
  readonly encoding?: WaveEncoding;
  /** Whether integers get triangular dither; on unless turned off. */
  readonly dither?: boolean;
  /** Seed of the dither; 1 unless given. */
  readonly seed?: number;
}

/** What was saved. */
export interface SavedWav {
  readonly path: string;
  readonly encoding: WaveEncoding;
  /** The value at digital full scale, in the unit of the traces; give it again to compare files. */
  readonly fullScale: number;
  /** Largest sample re full scale, dBFS, before dither; −∞ for silence. */
  readonly peak: number;
  /** Samples limited to full scale; floating point is never limited. */
  readonly clipped: number;
  /** Length, s. */
  readonly seconds: number;
  /** What a listener should know: hardly a signal, clipping, DC. Empty when all is well. */
  readonly warnings: readonly string[];
}

/** Below this peak a trace is hardly a signal: 1 mV, or as much current as makes 1 mV in 10 kΩ. */
export const faint = { V: 1e-3, A: 1e-7 } as const;

/** Frames encoded at one go. */
const blockLength = 16_384;

/**
 * Writes pieces of traces, each piece one trace per channel, against a full scale that the first piece's
 * unit may decide. Keeps no more than a block in memory.
 */
export function writeWav(
  path: string,
  pieces: Iterable<readonly Trace[]> | AsyncIterable<readonly Trace[]>,
  fullScaleOf: (unit: Trace['unit']) => number,
  options: WavOptions,
): Promise<SavedWav> {
  return replaceFile(path, async (file) => {
    let writer: WavWriter | undefined;
    for await (const piece of pieces) {
      writer ??= await openWriter(file, piece, fullScaleOf, options);
      await writer.append(piece);
    }
    if (writer === undefined) throw fault('there is nothing to save; give at least one trace');
    return { path, ...(await writer.finish()) };
  });
}

interface WavWriter {
  append(piece: readonly Trace[]): Promise<void>;
  finish(): Promise<Omit<SavedWav, 'path'>>;
}

/** Starts a file whose every piece is like the first one, `shape`. */
async function openWriter(
  file: FileHandle,
  shape: readonly Trace[],
  fullScaleOf: (unit: Trace['unit']) => number,
  { encoding = 'pcm24', dither, seed }: WavOptions,
): Promise<WavWriter> {
  const [first] = shape;
  if (first === undefined) throw fault('there is no trace to save; give at least one');
  const { rate, unit } = first;
  const fullScale = fullScaleOf(unit);
  const encoder = waveEncoder({ rate, channels: shape.length, encoding, fullScale, dither, seed });
  const meters = shape.map(({ name }) => ({ name, peak: 0, sum: 0 }));
  await file.appendFile(encoder.header);

  return {
    async append(piece) {
      requireFit(piece, first, shape.length);
      const length = piece[0]!.samples.length;
      for (let from = 0; from < length; from += blockLength) {
        const block = piece.map(({ samples }) => samples.subarray(from, from + blockLength));
        await file.appendFile(encoder.encode(block));
        block.forEach((samples, channel) => {
          const meter = meters[channel]!;
          for (const value of samples) {
            meter.peak = Math.max(meter.peak, Math.abs(value));
            meter.sum += value;
          }
        });
      }
    },
    async finish() {
      const { header, padding, frames, clipped } = encoder.finish();
      if (frames === 0) throw fault(`${first.name} holds no samples; record at least one`);
      await file.appendFile(padding);
      await file.write(header, 0, header.length, 0);

      const largest = Math.max(...meters.map((meter) => meter.peak));
      const show = (value: number): string => formatQuantity(value, unit);
      const warnings: string[] = [];
      if (largest < faint[unit]) {
        warnings.push(`the peak is ${show(largest)}, below ${show(faint[unit])}: hardly a signal`);
      }
      if (clipped > 0) {
        warnings.push(`${clipped} samples are limited to full scale; give a larger full scale`);
      }
      for (const { name, peak, sum } of meters) {
        const offset = sum / frames;
        if (Math.abs(offset) <= peak / 100) continue;
        warnings.push(
          `${name} carries ${show(offset)} of DC, over 1 % of its peak; couple it by a capacitor`,
        );
      }
      const peak = 20 * Math.log10(largest / fullScale);
      return { encoding, fullScale, peak, clipped, seconds: frames / rate, warnings };
    },
  };
}

function requireFit(piece: readonly Trace[], first: Trace, channels: number): void {
  if (piece.length !== channels) throw fault(`a piece of ${piece.length} traces follows one of ${channels}`);
  const length = piece[0]!.samples.length;
  for (const trace of piece) {
    if (trace.rate === first.rate && trace.unit === first.unit && trace.samples.length === length) continue;
    throw fault(`${describe(trace)} does not fit ${describe(first)}; channels share rate, unit and length`);
  }
}

function describe({ name, rate, unit, samples }: Trace): string {
  return `${name} (${samples.length} samples in ${unit} at ${rate} Hz)`;
}

function fault(message: string): TailpairError {
  return new TailpairError('wave-format', message, { where: 'wav' });
}
