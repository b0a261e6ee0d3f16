import { TailpairError } from '../quantity/error.ts';

/** How samples are stored: integers of 16 or 24 bits, or floating point of 32 or 64 bits. */
export type WaveEncoding = 'pcm16' | 'pcm24' | 'float32' | 'float64';

/** What the header of a WAV file states. */
export interface WaveFormat {
  /** Frames per second, a whole number of Hz. */
  readonly rate: number;
  /** Samples per frame, as many as 65535 bytes hold. */
  readonly channels: number;
  readonly encoding: WaveEncoding;
}

const bitsOf: Readonly<Record<WaveEncoding, number>> = { pcm16: 16, pcm24: 24, float32: 32, float64: 64 };

/** Bits of one sample. */
export function waveBits(encoding: WaveEncoding): number {
  return bitsOf[encoding];
}

/** Whether samples are integers. */
export function isPcm(encoding: WaveEncoding): boolean {
  return encoding === 'pcm16' || encoding === 'pcm24';
}

/** Bytes of one frame. */
export function bytesPerFrame(format: WaveFormat): number {
  return (format.channels * waveBits(format.encoding)) / 8;
}

/**
 * Refuses what no WAV header can state.
 *
 * @throws TailpairError `wave-format`.
 */
export function requireWaveFormat(format: WaveFormat): void {
  const { rate, channels, encoding } = format;
  if (!Object.hasOwn(bitsOf, encoding)) {
    throw fault(
      'encoding',
      `${encoding} is no encoding of samples; choose ${Object.keys(bitsOf).join(', ')}`,
    );
  }
  const most = Math.floor(0xffff / (waveBits(encoding) / 8));
  if (!Number.isInteger(channels) || channels < 1 || channels > most) {
    throw fault('channels', `${channels} is no number of channels; give a whole number from 1 to ${most}`);
  }
  if (!Number.isInteger(rate) || rate < 1 || rate * bytesPerFrame(format) > 0xffff_ffff) {
    throw fault('rate', `${rate} Hz cannot be stated in a WAV header; record at a whole number of hertz`);
  }
}

function fault(where: string, message: string): TailpairError {
  return new TailpairError('wave-format', message, { where });
}
