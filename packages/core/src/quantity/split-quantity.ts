import { TailpairError } from './error.ts';
import { prefixes } from './unit.ts';

/** A value's text taken apart: its number is `mantissa`·10^`exponent`, its unit not yet looked up. */
export interface SplitQuantity {
  readonly mantissa: string;
  readonly exponent: number;
  readonly unit: string;
}

/** Longer than any value; keeps the patterns below cheap on whatever is handed in. */
const longest = 64;

const plain = /^([-+]?(?:\d+\.?\d*|\.\d+))(?:[eE]([-+]?\d+))?\s*(.*)$/s;

/** IEC 60062: a letter stands where the decimal point would, `4k7`, `p33`. */
const letterCode = /^([-+]?)(\d*)(\p{L})(\d+)\s*(.*)$/su;

/** A text as an error shows it: in quotes, control characters spelt out, cut where it is long. */
export function quoted(text: string): string {
  return JSON.stringify(text.length > longest ? `${text.slice(0, longest)}…` : text);
}

function splitLetterCode(text: string): SplitQuantity | undefined {
  const code = letterCode.exec(text);
  if (!code) return undefined;
  const [, sign = '', whole, letter = '', fraction, unit = ''] = code;
  const mantissa = `${sign}${whole || '0'}.${fraction}`;
  if (letter === 'R' || letter === 'F') return { mantissa, exponent: 0, unit: letter + unit };
  if (letter === 'K') return { mantissa, exponent: 0, unit: `k${unit}` };
  return prefixes.has(letter) ? { mantissa, exponent: 0, unit: letter + unit } : undefined;
}

/**
 * Takes a value's text apart into number and unit. The letter codes of IEC 60062:2016 come out as
 * what they mean, `4k7` as 4.7 with the unit `k`. The typographic minus (U+2212) is read.
 *
 * @throws TailpairError `quantity-text` where there is no number or more than one, a decimal comma
 *   or a separator of thousands
 */
export function splitQuantity(input: string, where?: string): SplitQuantity {
  const text = input.replaceAll('\u2212', '-').trim();
  const refuse = (message: string): TailpairError => new TailpairError('quantity-text', message, { where });
  if (text === '') throw refuse('the value is empty; write a number with its unit, such as 10 mV');
  if (text.length > longest) {
    throw refuse(`${quoted(text)} is too long for a value; write a number with its unit, such as 10 mV`);
  }
  if (/\d\s*[,'_]\s*\d/.test(text)) {
    throw refuse(
      `${quoted(text)} is not clear; write decimals with a point and thousands without a separator, such as 1.5 kHz`,
    );
  }
  const code = splitLetterCode(text);
  if (code) return code;
  const match = plain.exec(text);
  if (!match)
    throw refuse(`${quoted(text)} does not start with a number; write one with its unit, such as 10 mV`);
  const [, mantissa = '', exponent = '0', unit = ''] = match;
  if (/\d/.test(unit)) {
    throw refuse(
      `${quoted(text)} holds more than one number; write one with its unit, thousands closed up, such as 3.3 V or 10000 Hz`,
    );
  }
  return { mantissa, exponent: Math.max(-9999, Math.min(Number(exponent), 9999)), unit };
}
