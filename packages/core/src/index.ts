export type { ErrorCode } from './quantity/error.ts';
export { TailpairError } from './quantity/error.ts';
export { type Dimension, dimensions } from './quantity/dimension.ts';
export { formatQuantity } from './quantity/format-quantity.ts';
export { type ParseOptions, parseQuantity } from './quantity/parse-quantity.ts';
export { type CutOptions, cut } from './trace/cut.ts';
export { durationOf, type Trace } from './trace/trace.ts';
export { type WaveEncoder, type WaveEnd, type WaveOptions, waveEncoder } from './trace/wave-encoder.ts';
export type { WaveEncoding, WaveFormat } from './trace/wave-format.ts';
