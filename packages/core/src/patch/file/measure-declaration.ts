import type { Parameters } from '../../block/kind.ts';
import type { Patch } from '../patch.ts';

/** What a patch file may ask to be measured: a kind of figure, declared as a block kind is. */
export interface MeasureDeclaration {
  /** Name of the measure, as a patch file writes it. */
  readonly measure: string;
  /** What it measures, in one line. */
  readonly summary: string;
  /** Unit of its value; `V` stands for the unit of the probe, which may be `A`. */
  readonly unit: 'ratio' | 'dBc' | 'V' | 'A';
  readonly params: Parameters;
  /** Parameters that must be given. */
  readonly required: readonly string[];
}

/** One figure asked for, all its values read. */
export interface FigureRequest {
  readonly id: string;
  /** Name of the measure. */
  readonly measure: string;
  /** The probe: `block.port`. */
  readonly of: string;
  /** Values by parameter name: SI base units, or words. */
  readonly parameters: Readonly<Record<string, number | string>>;
  /** What the value must keep to, in the figure's unit. */
  readonly limit?: { readonly min?: number; readonly max?: number };
  /** How far the value may move from a baseline, in the figure's unit. */
  readonly tolerance?: number;
  /** Time before the record, s. Found where it is not given. */
  readonly settle?: number;
  /** Length of the record, s. Found where it is not given. */
  readonly length?: number;
}

/** What a patch file says. */
export interface PatchDocument {
  readonly patch: Patch;
  readonly title: string;
  /** The probe to be heard. */
  readonly listen: string | undefined;
  /** How long it is heard, s. */
  readonly length: number | undefined;
  readonly figures: readonly FigureRequest[];
}
