import { bytesPerFrame, isPcm, type WaveFormat, waveBits } from './wave-format.ts';

/** Largest size a 32-bit field states; a file beyond it is RF64. */
const most32 = 0xffff_ffff;
const formatTags = { pcm: 1, float: 3, extensible: 0xfffe } as const;

/** What stands behind the format tag in the sixteen bytes of an extensible sub-format. */
const subFormatTail = [
  0x00, 0x00, 0x00, 0x00, 0x10, 0x00, 0x80, 0x00, 0x00, 0xaa, 0x00, 0x38, 0x9b, 0x71,
] as const;

/** Speaker positions by number of channels: front centre, front left and right, else none assigned. */
const speakers: Readonly<Record<number, number>> = { 1: 0x4, 2: 0x3 };

/**
 * Header of a WAV file of so many frames: all that stands before the samples. Its length depends on the
 * format only, so it can be written first and again, with the final sizes, at the end.
 *
 * RIFF/WAVE (IBM and Microsoft, Multimedia Programming Interface and Data Specifications 1.0, 1991);
 * WAVE_FORMAT_EXTENSIBLE for 24 bits or more than two channels; a `fact` chunk for floating point. A
 * first chunk JUNK keeps room for the `ds64` chunk, and the file turns into RF64 once it outgrows 32-bit
 * sizes (EBU Tech 3306, ITU-R BS.2088; all from memory). The samples start at a multiple of 8 bytes, so
 * that a reader may map any encoding in place.
 */
export function waveHeader(format: WaveFormat, frames: number): Uint8Array {
  const dataSize = frames * bytesPerFrame(format);
  const core = [formatChunk(format), ...(isPcm(format.encoding) ? [] : [factChunk(frames)])];
  const beforeData = 12 + 36 + core.reduce((sum, chunk) => sum + chunk.length, 0) + 8;
  const chunks = [...core, ...fillerChunk(beforeData)];
  const headerSize = 12 + 36 + chunks.reduce((sum, chunk) => sum + chunk.length, 0) + 8;
  const riffSize = headerSize + dataSize + (dataSize % 2) - 8;
  const isLarge = riffSize > most32;

  const sizes = new Uint8Array(28);
  if (isLarge) {
    const view = new DataView(sizes.buffer);
    view.setBigUint64(0, BigInt(riffSize), true);
    view.setBigUint64(8, BigInt(dataSize), true);
    view.setBigUint64(16, BigInt(frames), true);
  }
  const all = [
    chunkHead(isLarge ? 'RF64' : 'RIFF', riffSize),
    ascii('WAVE'),
    chunk(isLarge ? 'ds64' : 'JUNK', sizes),
    ...chunks,
    chunkHead('data', isLarge ? most32 : dataSize),
  ];
  const header = new Uint8Array(headerSize);
  let at = 0;
  for (const part of all) {
    header.set(part, at);
    at += part.length;
  }
  return header;
}

function formatChunk(format: WaveFormat): Uint8Array {
  const { rate, channels, encoding } = format;
  const bits = waveBits(encoding);
  const plainTag = isPcm(encoding) ? formatTags.pcm : formatTags.float;
  const isExtensible = bits === 24 || channels > 2;
  const size = isExtensible ? 40 : plainTag === formatTags.pcm ? 16 : 18;
  const content = new Uint8Array(size);
  const view = new DataView(content.buffer);
  view.setUint16(0, isExtensible ? formatTags.extensible : plainTag, true);
  view.setUint16(2, channels, true);
  view.setUint32(4, rate, true);
  view.setUint32(8, rate * bytesPerFrame(format), true);
  view.setUint16(12, bytesPerFrame(format), true);
  view.setUint16(14, bits, true);
  if (isExtensible) {
    view.setUint16(16, 22, true);
    view.setUint16(18, bits, true);
    view.setUint32(20, speakers[channels] ?? 0, true);
    view.setUint16(24, plainTag, true);
    content.set(subFormatTail, 26);
  }
  return chunk('fmt ', content);
}

function factChunk(frames: number): Uint8Array {
  const content = new Uint8Array(4);
  new DataView(content.buffer).setUint32(0, Math.min(frames, most32), true);
  return chunk('fact', content);
}

/** An empty chunk that moves what follows it to a multiple of 8 bytes; none where it already is there. */
function fillerChunk(position: number): readonly Uint8Array[] {
  const missing = (8 - (position % 8)) % 8;
  return missing === 0 ? [] : [chunk('JUNK', new Uint8Array(missing))];
}

function chunk(name: string, content: Uint8Array): Uint8Array {
  const bytes = new Uint8Array(8 + content.length);
  bytes.set(chunkHead(name, content.length));
  bytes.set(content, 8);
  return bytes;
}

function chunkHead(name: string, size: number): Uint8Array {
  const bytes = new Uint8Array(8);
  bytes.set(ascii(name));
  new DataView(bytes.buffer).setUint32(4, Math.min(size, most32), true);
  return bytes;
}

function ascii(text: string): Uint8Array {
  return Uint8Array.from(text, (letter) => letter.charCodeAt(0));
}
