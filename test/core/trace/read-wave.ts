/** What a plain reader of WAV files finds: written apart from the writer, after the descriptions of the format. */
export interface WaveContent {
  readonly chunks: readonly { readonly name: string; readonly at: number; readonly size: number }[];
  /** 1 for integers, 3 for floating point, also where it stands in an extensible sub-format. */
  readonly tag: number;
  readonly isExtensible: boolean;
  readonly channels: number;
  readonly rate: number;
  readonly bits: number;
  readonly frameSize: number;
  readonly dataAt: number;
  readonly dataSize: number;
  /** All samples, interleaved: codes of integers, values of floating point. */
  readonly samples: readonly number[];
}

export function readWave(bytes: Uint8Array): WaveContent {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.length);
  const name = (at: number): string => String.fromCharCode(...bytes.subarray(at, at + 4));
  const form = name(0);
  if ((form !== 'RIFF' && form !== 'RF64') || name(8) !== 'WAVE') throw new Error(`not a wave file: ${form}`);
  const chunks: { name: string; at: number; size: number }[] = [];
  let dataSize = 0;
  for (let at = 12; at + 8 <= bytes.length; ) {
    const chunk = { name: name(at), at: at + 8, size: view.getUint32(at + 4, true) };
    chunks.push(chunk);
    if (chunk.name === 'ds64') dataSize = Number(view.getBigUint64(chunk.at + 8, true));
    if (chunk.name === 'data' && form === 'RIFF') dataSize = chunk.size;
    at = chunk.at + chunk.size + (chunk.size % 2);
  }
  const find = (wanted: string): number => chunks.find((chunk) => chunk.name === wanted)!.at;
  const format = find('fmt ');
  const dataAt = find('data');
  const isExtensible = view.getUint16(format, true) === 0xfffe;
  const tag = view.getUint16(isExtensible ? format + 24 : format, true);
  const bits = view.getUint16(format + 14, true);
  const read = (at: number): number => {
    if (tag === 3) return bits === 32 ? view.getFloat32(at, true) : view.getFloat64(at, true);
    return bits === 16 ? view.getInt16(at, true) : view.getInt16(at + 1, true) * 256 + view.getUint8(at);
  };
  const samples: number[] = [];
  for (let at = dataAt; at + bits / 8 <= Math.min(bytes.length, dataAt + dataSize); at += bits / 8)
    samples.push(read(at));
  return {
    chunks,
    tag,
    isExtensible,
    channels: view.getUint16(format + 2, true),
    rate: view.getUint32(format + 4, true),
    bits,
    frameSize: view.getUint16(format + 12, true),
    dataAt,
    dataSize,
    samples,
  };
}

/** A whole file in memory from an encoder's parts. */
export function joinWave(header: Uint8Array, ...parts: readonly Uint8Array[]): Uint8Array {
  return Uint8Array.from([header, ...parts].flatMap((part) => [...part]));
}
