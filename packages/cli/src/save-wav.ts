import {
  dimensions,
  formatQuantity,
  parseQuantity,
  TailpairError,
  type Trace,
  type WaveEncoding,
  waveEncoder,
} from '@tailpair/core';
import { dc, peak } from '@tailpair/core/analysis';
import { replaceFile } from './replace-file.ts';

/** How to save traces as a WAV file. */
export interface SaveWavOptions {
  /** How samples are stored; `pcm24` unless given. `float64` with a full scale of 1 V keeps volts as they are. */
  readonly encoding?: WaveEncoding;
  /**
   * Value that becomes digital full scale: a text (`'10 V'`), or a bare number in the unit of the traces.
   * Unless given, the largest peak is brought to −6 dBFS; files to be compared need one of their own.
   */
  readonly fullScale?: string | number;
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
  /** What a listener should know: silence, DC, clipping. Empty when all is well. */
  readonly warnings: readonly string[];
}

/** Share of full scale the peak gets where no full scale is given: −6 dBFS, which leaves room to work. */
const restingPeak = 10 ** (-6 / 20);

/** Below this peak nothing is scaled up, for it is hardly a signal: 1 mV, or as much current as makes 1 mV in 10 kΩ. */
const faint = { V: 1e-3, A: 1e-7 } as const;

/** Frames encoded at one go. */
const blockLength = 16_384;

/**
 * Saves a trace, or several as the channels of one file, as WAV. The file appears under its name only once
 * it is whole; its folder is created if need be.
 *
 * Caution: loud or unexpected sound can damage hearing. Turn the level down before you listen.
 *
 * @throws TailpairError `wave-format` for traces that do not fit together or options that no WAV file can
 * hold, `value-range` for a full scale not above 0, `record-short` and `record-invalid` for an empty trace
 * or samples that are not finite, `file-system` where the file cannot be written.
 * @example await saveWav('out/foghorn.wav', traces.load.out, { fullScale: '10 V' })
 */
export async function saveWav(
  path: string,
  traces: Trace | readonly Trace[],
  options: SaveWavOptions = {},
): Promise<SavedWav> {
  const { encoding = 'pcm24' } = options;
  const channels = 'samples' in traces ? [traces] : traces;
  const first = requireOneClock(channels);
  const largest = Math.max(...channels.map(peak));
  const fullScale =
    options.fullScale === undefined
      ? restingFullScale(largest, first.unit)
      : parseFullScale(options.fullScale, first.unit);

  const encoder = waveEncoder({
    rate: first.rate,
    channels: channels.length,
    encoding,
    fullScale,
    dither: options.dither,
    seed: options.seed,
  });
  const end = await replaceFile(path, async (file) => {
    await file.appendFile(encoder.header);
    for (let from = 0; from < first.samples.length; from += blockLength) {
      const block = channels.map(({ samples }) => samples.subarray(from, from + blockLength));
      await file.appendFile(encoder.encode(block));
    }
    const last = encoder.finish();
    await file.appendFile(last.padding);
    await file.write(last.header, 0, last.header.length, 0);
    return last;
  });
  return {
    path,
    encoding,
    fullScale,
    peak: 20 * Math.log10(largest / fullScale),
    clipped: end.clipped,
    seconds: end.frames / first.rate,
    warnings: warningsOn(channels, largest, end.clipped),
  };
}

function requireOneClock(traces: readonly Trace[]): Trace {
  const [first, ...rest] = traces;
  if (first === undefined) throw fault('there is no trace to save; give at least one');
  for (const trace of rest) {
    const fits =
      trace.rate === first.rate && trace.unit === first.unit && trace.samples.length === first.samples.length;
    if (fits) continue;
    throw fault(`${describe(trace)} does not fit ${describe(first)}; channels share rate, unit and length`);
  }
  return first;
}

function describe({ name, rate, unit, samples }: Trace): string {
  return `${name} (${samples.length} samples in ${unit} at ${rate} Hz)`;
}

function parseFullScale(input: string | number, unit: Trace['unit']): number {
  const want = unit === 'V' ? dimensions.voltage : dimensions.current;
  return parseQuantity(input, want, { where: 'saveWav.fullScale', bare: true });
}

function restingFullScale(largest: number, unit: Trace['unit']): number {
  return largest < faint[unit] ? 1 : largest / restingPeak;
}

function warningsOn(traces: readonly Trace[], largest: number, clipped: number): readonly string[] {
  const { unit } = traces[0]!;
  const show = (value: number): string => formatQuantity(value, unit);
  const warnings: string[] = [];
  if (largest < faint[unit]) {
    warnings.push(`the peak is ${show(largest)}, below ${show(faint[unit])}: hardly a signal`);
  }
  if (clipped > 0) warnings.push(`${clipped} samples are limited to full scale; give a larger full scale`);
  for (const trace of traces) {
    const offset = dc(trace);
    if (Math.abs(offset) <= peak(trace) / 100) continue;
    warnings.push(
      `${trace.name} carries ${show(offset)} of DC, more than 1 % of its peak; couple it through a capacitor`,
    );
  }
  return warnings;
}

function fault(message: string): TailpairError {
  return new TailpairError('wave-format', message, { where: 'saveWav' });
}
