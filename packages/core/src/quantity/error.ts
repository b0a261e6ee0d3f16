/**
 * Every fault the library can report, by its stable code. A code never changes its meaning; the
 * text is the one-line summary the documentation prints beside it.
 */
export const errorCodes = {
  'quantity-text': 'a value could not be read as a number with a unit',
  'quantity-unit': 'a value carries another unit than the place asks for',
  'value-range': 'a value lies outside what the place allows',
  'value-kind': 'a value has the wrong form: text, number or choice',
  dimension: 'an equation adds, compares or bends quantities that do not fit',
  declaration: 'the declaration of a block kind contradicts itself',
  'unknown-block': 'a name stands for no block of the patch',
  'unknown-port': 'a name stands for no port of its block',
  'unknown-parameter': 'a key is no parameter of its kind',
  'wire-family': 'a wire joins ports that cannot be joined',
  'wire-fan-in': 'a voltage input has more than one driver',
  'wire-fan-out': 'a current output feeds more than one input',
  'wire-resistor': 'a wire lacks the resistor it needs, or has one where none can be',
  'input-missing': 'an input that must be wired is not',
  loop: 'blocks feed each other in a ring',
  'no-solution': 'an equation could not be solved',
  'event-storm': 'too many events fell on one instant',
  'not-finite': 'a sample became infinite or undefined',
  aborted: 'the run was stopped from outside',
  'patch-faults': 'a patch has several faults at once',
  'record-short': 'a record is too short for the measurement',
  'record-invalid': 'a record cannot be measured as asked',
  'wave-format': 'a sound file cannot be written or read as asked',
  'file-system': 'a file cannot be read or written',
} as const;

/** Stable code of a fault, one of {@link errorCodes}. */
export type ErrorCode = keyof typeof errorCodes;

/** What a fault may carry beside its message. */
export interface ErrorDetails {
  /** The place: `block.port`, `block.parameter`, an option's name. */
  readonly where?: string | undefined;
  /** The faults gathered, where one error stands for several. */
  readonly faults?: readonly TailpairError[];
}

/**
 * The one error class. The message names the place, the value with its unit, what is allowed and
 * the cure, without a full stop; `code` is stable and documented.
 */
export class TailpairError extends Error {
  override readonly name = 'TailpairError';
  readonly code: ErrorCode;
  /** The place of the fault, where there is one. */
  readonly where: string | undefined;
  /** The single faults, where the error gathers several; otherwise empty. */
  readonly faults: readonly TailpairError[];

  constructor(code: ErrorCode, message: string, details: ErrorDetails = {}) {
    super(details.where === undefined ? message : `${details.where}: ${message}`);
    this.code = code;
    this.where = details.where;
    this.faults = details.faults ?? [];
  }
}
