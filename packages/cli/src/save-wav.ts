import { dimensions, parseQuantity, type Trace } from '@tailpair/core';
import { peak } from '@tailpair/core/analysis';
import { faint, type SavedWav, type WavOptions, writeWav } from './write-wav.ts';

/** How to save traces as a WAV file. */
export interface SaveWavOptions extends WavOptions {
  /**
   * Value that becomes digital full scale: a text (`'10 V'`), or a bare number in the unit of the traces.
   * Unless given, the largest peak is brought to −6 dBFS (a peak below 1 mV is left as it is, against
   * 1 V); files to be compared need a full scale of their own.
   */
  readonly fullScale?: string | number;
}

/** How to save pieces of traces: as traces, but the full scale must be known beforehand. */
export interface StreamWavOptions extends WavOptions {
  /** Value that becomes digital full scale: a text (`'10 V'`), or a bare number in the unit of the traces. */
  readonly fullScale: string | number;
}

/** Share of full scale the peak gets where no full scale is given: −6 dBFS, which leaves room to work. */
const restingPeak = 10 ** (-6 / 20);

/**
 * Saves a trace, or several as the channels of one file, as WAV. The file appears under its name only once
 * it is whole; its folder is created if need be.
 *
 * Caution: loud or unexpected sound can damage hearing. Turn the level down before you listen.
 *
 * @throws TailpairError `wave-format` for traces that do not fit together or options that no WAV file can
 * hold, `value-range` for a full scale not above 0, `record-short` for an empty trace, `record-invalid` or
 * `not-finite` for samples that are not finite, `file-system` where the file cannot be written.
 * @example await saveWav('out/foghorn.wav', traces.load.out, { fullScale: '10 V' })
 */
export async function saveWav(
  path: string,
  traces: Trace | readonly Trace[],
  options: SaveWavOptions = {},
): Promise<SavedWav> {
  const channels = asChannels(traces);
  const { fullScale } = options;
  if (fullScale !== undefined) return streamWav(path, [channels], { ...options, fullScale });
  const largest = Math.max(...channels.map(peak));
  return writeWav(path, [channels], (unit) => (largest < faint[unit] ? 1 : largest / restingPeak), options);
}

/**
 * Saves traces as WAV that come in pieces, such as those of a stream: the memory it takes does not depend
 * on the length, and a file past 4 GiB is RF64. Otherwise as {@link saveWav}, with the same cautions.
 *
 * @param pieces a trace, or one per channel, at a time; the samples of one follow those of the one before
 * @throws TailpairError as {@link saveWav}, and whatever the pieces throw.
 */
export function streamWav(
  path: string,
  pieces: Iterable<Trace | readonly Trace[]> | AsyncIterable<Trace | readonly Trace[]>,
  options: StreamWavOptions,
): Promise<SavedWav> {
  const fullScale = (unit: Trace['unit']): number =>
    parseQuantity(options.fullScale, unit === 'V' ? dimensions.voltage : dimensions.current, {
      where: 'fullScale',
      bare: true,
    });
  return writeWav(path, channelsOf(pieces), fullScale, options);
}

async function* channelsOf(
  pieces: Iterable<Trace | readonly Trace[]> | AsyncIterable<Trace | readonly Trace[]>,
): AsyncGenerator<readonly Trace[], void, undefined> {
  for await (const piece of pieces) yield asChannels(piece);
}

function asChannels(traces: Trace | readonly Trace[]): readonly Trace[] {
  return 'samples' in traces ? [traces] : traces;
}
