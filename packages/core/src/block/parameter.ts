import { nearestName } from '../quantity/did-you-mean.ts';
import { type Dimension, dimensions, formatDimension } from '../quantity/dimension.ts';
import { TailpairError } from '../quantity/error.ts';
import { requireRange, requireWhole } from '../quantity/guard.ts';
import { parsePart } from '../quantity/parse-part.ts';
import { parseQuantity } from '../quantity/parse-quantity.ts';

/** A parameter with a value and a unit. `Given` is what a script may write for it. */
export interface NumberParameter<Given extends string | number = string | number> {
  readonly form: 'number';
  readonly dimension: Dimension;
  /** Value where none is given, as text with its unit. */
  readonly initial: Given;
  /** Least and largest value allowed, and a bound that is not itself allowed; SI base units. */
  readonly min: number | undefined;
  readonly max: number | undefined;
  readonly above: number | undefined;
  /** Whether the value must be a whole number. */
  readonly whole: boolean;
  /** Whether it is the value of a part, which then may carry a tolerance. */
  readonly part: boolean;
  readonly doc: string;
}

/** A parameter that is one of a few words; a plain value while equations are traced. */
export interface ChoiceParameter<Choice extends string = string> {
  readonly form: 'choice';
  readonly choices: readonly Choice[];
  readonly initial: Choice;
  readonly doc: string;
}

/** Any parameter of a kind. */
export type Parameter = NumberParameter | ChoiceParameter;

/** What a number parameter's declaration may say; limits are texts with units, or bare ratios. */
export interface NumberOptions {
  /** Least value allowed. */
  readonly min?: string | number;
  /** Largest value allowed. */
  readonly max?: string | number;
  /** Bound the value must exceed. */
  readonly above?: string | number;
  /** The value belongs to a part, which then may carry a tolerance. */
  readonly part?: boolean;
  /** Meaning in one line. */
  readonly doc?: string;
}

function numberParameter<Given extends string | number>(
  dimension: Dimension,
  initial: Given,
  { min, max, above, part = false, doc = '' }: NumberOptions,
  whole = false,
): NumberParameter<Given> {
  const limit = (bound: string | number | undefined): number | undefined =>
    bound === undefined ? undefined : parseQuantity(bound, dimension);
  return {
    form: 'number',
    dimension,
    initial,
    min: limit(min),
    max: limit(max),
    above: limit(above),
    whole,
    part,
    doc,
  };
}

/** A voltage. */
export const volts = (initial: string, options: NumberOptions = {}): NumberParameter<string> =>
  numberParameter(dimensions.voltage, initial, options);

/** A current. */
export const amperes = (initial: string, options: NumberOptions = {}): NumberParameter<string> =>
  numberParameter(dimensions.current, initial, options);

/** A resistance; bare numbers are ohms. Above 0 Ω unless `min` or `above` says otherwise. */
export const ohms = (initial: string | number, options: NumberOptions = {}): NumberParameter =>
  numberParameter<string | number>(dimensions.resistance, initial, {
    ...(options.min === undefined && options.above === undefined ? { above: 0 } : {}),
    part: true,
    ...options,
  });

/** A capacitance, at least 0 F. */
export const farads = (initial: string, options: NumberOptions = {}): NumberParameter<string> =>
  numberParameter(dimensions.capacitance, initial, {
    ...(options.above === undefined ? { min: '0 F' } : {}),
    part: true,
    ...options,
  });

/** A frequency. */
export const hertz = (initial: string, options: NumberOptions = {}): NumberParameter<string> =>
  numberParameter(dimensions.frequency, initial, options);

/** A frequency per control voltage. */
export const hertzPerVolt = (initial: string, options: NumberOptions = {}): NumberParameter<string> =>
  numberParameter(dimensions.frequencyPerVolt, initial, options);

/** A time. */
export const seconds = (initial: string, options: NumberOptions = {}): NumberParameter<string> =>
  numberParameter(dimensions.time, initial, options);

/** A bare ratio: a number, or a text in per cent. */
export const ratio = (initial: string | number, options: NumberOptions = {}): NumberParameter =>
  numberParameter<string | number>(dimensions.ratio, initial, options);

/** A whole number, at least 0. */
export const count = (initial: number, options: NumberOptions = {}): NumberParameter<number> =>
  numberParameter<number>(dimensions.ratio, initial, { min: 0, ...options }, true);

/** One of a few words. */
export function choice<const Choice extends string>(
  choices: readonly Choice[],
  initial: NoInfer<Choice>,
  options: { readonly doc?: string } = {},
): ChoiceParameter<Choice> {
  return { form: 'choice', choices, initial, doc: options.doc ?? '' };
}

/** A parameter's value as the engine uses it, with its part's tolerance where it has one. */
export interface ParameterValue {
  /** SI base units, or the word chosen. */
  readonly value: number | string;
  /** Half-width as a ratio of the value, where the part's text gave one. */
  readonly tolerance?: number;
}

/**
 * Reads what a script or a file gives for a parameter.
 *
 * @param where `block.parameter`, for messages
 * @throws TailpairError `quantity-text`, `quantity-unit`, `value-range` or `value-kind`
 */
export function readParameter(parameter: Parameter, given: unknown, where: string): ParameterValue {
  if (parameter.form === 'choice') return { value: readChoice(parameter, given, where) };
  if (typeof given !== 'string' && typeof given !== 'number') {
    throw new TailpairError(
      'value-kind',
      `got ${given === null ? 'null' : typeof given}; write a value in ${formatDimension(parameter.dimension)}`,
      { where },
    );
  }
  const { dimension, min, max, above, whole, part } = parameter;
  const read = part
    ? parsePart(given, dimension, where)
    : { value: parseQuantity(given, dimension, { where }) };
  const range = {
    where,
    unit: dimension,
    ...(min === undefined ? {} : { min }),
    ...(max === undefined ? {} : { max }),
    ...(above === undefined ? {} : { above }),
  };
  if (whole) requireWhole(read.value, range);
  else requireRange(read.value, range);
  return read;
}

function readChoice({ choices }: ChoiceParameter, given: unknown, where: string): string {
  const known = choices.find((word) => word === given);
  if (known !== undefined) return known;
  const near = typeof given === 'string' ? nearestName(given, choices) : undefined;
  const hint = near === undefined ? '' : `; did you mean ${near}?`;
  throw new TailpairError('value-kind', `must be one of ${choices.join(', ')}, got ${String(given)}${hint}`, {
    where,
  });
}
