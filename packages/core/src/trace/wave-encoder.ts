import { randomStream } from '../numeric/random.ts';
import { TailpairError } from '../quantity/error.ts';
import { requireRange } from '../quantity/guard.ts';
import { quantiser } from './quantiser.ts';
import { bytesPerFrame, isPcm, requireWaveFormat, type WaveFormat, waveBits } from './wave-format.ts';
import { waveHeader } from './wave-header.ts';

/** What to write. */
export interface WaveOptions extends WaveFormat {
  /** Value that becomes digital full scale, ±1, in the unit of the samples; above 0. */
  readonly fullScale: number;
  /** Whether integers get triangular dither; on unless turned off. Floating point never does. */
  readonly dither?: boolean | undefined;
  /** Seed of the dither; 1 unless given. */
  readonly seed?: number | undefined;
}

/** What the end of a file needs, and what happened on the way. */
export interface WaveEnd {
  /** The header with the final sizes, to be written over the first one; of the same length. */
  readonly header: Uint8Array;
  /** Bytes to append after the last sample: one where the data would end on an odd byte, else none. */
  readonly padding: Uint8Array;
  readonly frames: number;
  /** Samples that had to be limited to full scale; floating point is never limited. */
  readonly clipped: number;
}

/** Turns blocks of samples into the bytes of a WAV file. Keeps nothing of what went through it. */
export interface WaveEncoder {
  /** The header to start the file with. */
  readonly header: Uint8Array;
  /** Bytes of some frames. `block` has one array per channel, all of one length, in the unit of `fullScale`. */
  encode(block: readonly Float64Array[]): Uint8Array;
  /** Ends the file. */
  finish(): WaveEnd;
}

/**
 * A streaming encoder of WAV files; knows bytes, not files. Any division into blocks gives the same bytes.
 * See `waveHeader` for the form of the file and `quantiser` for the dither.
 *
 * @throws TailpairError `wave-format` for what no WAV file can hold, `value-range` for a full scale not above 0, and from `encode` for a block that does
 * not fit the channels; `not-finite` from `encode` for a sample that no file should hold.
 */
export function waveEncoder(options: WaveOptions): WaveEncoder {
  const { channels, encoding, fullScale, dither = true, seed = 1 } = options;
  requireWaveFormat(options);
  requireRange(fullScale, { where: 'fullScale', above: 0 });
  const frameSize = bytesPerFrame(options);
  const sampleSize = frameSize / channels;
  const bits = waveBits(encoding);
  const quantisers = isPcm(encoding)
    ? Array.from({ length: channels }, (_, channel) =>
        quantiser(bits, dither ? randomStream(seed, 'wave', 'dither', channel) : undefined),
      )
    : [];
  let frames = 0;

  return {
    header: waveHeader(options, 0),
    encode(block) {
      const length = block[0]?.length ?? 0;
      if (block.length !== channels || block.some((samples) => samples.length !== length)) {
        const lengths = block.map((samples) => samples.length).join(', ');
        throw new TailpairError(
          'wave-format',
          `a block of ${channels} equally long channels is due, got lengths [${lengths}]`,
          {
            where: 'encode',
          },
        );
      }
      const bytes = new Uint8Array(length * frameSize);
      const view = new DataView(bytes.buffer);
      block.forEach((samples, channel) => {
        const quantise = quantisers[channel]?.quantise;
        for (let i = 0, at = channel * sampleSize; i < length; i++, at += frameSize) {
          const value = samples[i]! / fullScale;
          if (!Number.isFinite(value)) throw notFinite(samples[i]!, channel, frames + i);
          if (quantise === undefined) {
            if (bits === 32) view.setFloat32(at, value, true);
            else view.setFloat64(at, value, true);
          } else {
            const code = quantise(value);
            view.setInt16(at, bits === 16 ? code : code & 0xffff, true);
            if (bits === 24) view.setInt8(at + 2, code >> 16);
          }
        }
      });
      frames += length;
      return bytes;
    },
    finish() {
      return {
        header: waveHeader(options, frames),
        padding: new Uint8Array((frames * frameSize) % 2),
        frames,
        clipped: quantisers.reduce((sum, { clipped }) => sum + clipped(), 0),
      };
    },
  };
}

function notFinite(value: number, channel: number, frame: number): TailpairError {
  return new TailpairError(
    'not-finite',
    `frame ${frame} of channel ${channel} is ${value}; only finite samples are written`,
    {
      where: 'encode',
    },
  );
}
