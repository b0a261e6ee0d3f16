/**
 * Patches of blocks, run in volts and amperes: build a patch, simulate it, take its traces.
 *
 * @packageDocumentation
 */

export type { ErrorCode, ErrorDetails } from './quantity/error.ts';
export { errorCodes, TailpairError } from './quantity/error.ts';
export { type Dimension, type DimensionName, dimensions } from './quantity/dimension.ts';
export { formatQuantity } from './quantity/format-quantity.ts';
export { type ParseOptions, parseQuantity } from './quantity/parse-quantity.ts';
export type { Block, BlockKind, Inputs, Outputs, Parameters } from './block/kind.ts';
export type { ParameterValue } from './block/parameter.ts';
export type { Surroundings } from './block/surroundings.ts';
export {
  type Blocks,
  type OutputName,
  type Patch,
  type PatchParts,
  type PortHandles,
  patch,
} from './patch/patch.ts';
export type { PlacedBlock, PlacedWire, Warning } from './patch/placed.ts';
export { type InputHandle, type OutputHandle, type Via, type Wire, wire } from './patch/wire.ts';
export { type Schedule, schedule } from './schedule/schedule.ts';
export type { TransconductancePoint } from './engine/operating-block.ts';
export {
  type OperatingPoint,
  type OperatingPointOptions,
  operatingPoint,
  type PortPoint,
} from './engine/operating-point.ts';
export type { RunOptions } from './engine/run-options.ts';
export { type CutOptions, cut } from './trace/cut.ts';
export type { ProbeTraces } from './trace/probe-traces.ts';
export { type Diagnostics, type SimulateOptions, type Simulation, simulate } from './trace/simulate.ts';
export { type StreamOptions, stream } from './trace/stream.ts';
export { durationOf, type Trace } from './trace/trace.ts';
export { type WaveEncoder, type WaveEnd, type WaveOptions, waveEncoder } from './trace/wave-encoder.ts';
export type { WaveEncoding, WaveFormat } from './trace/wave-format.ts';
