import { err, ok, type Result } from '../kernel/result';

/** What stops a typed text from being a reading; each has its own sentence on the screen. */
export type EntryProblemCode =
  | 'empty'
  | 'tooLong'
  | 'letterForDigit'
  | 'decimalComma'
  | 'mixedSeparators'
  | 'twoPoints'
  | 'endsWithPoint'
  | 'unitTyped'
  | 'spaceInside'
  | 'notANumber'
  | 'negative'
  | 'zero';

/** A refused entry: where it goes wrong (0-based, in the trimmed text), which character, and what may be meant. */
export interface EntryProblem {
  code: EntryProblemCode;
  at?: number;
  character?: string;
  suggestion?: string;
}

/** What an entry may hold. Zero and negative values are refused unless allowed; `maxLength` is 12 unless given. */
export interface EntryOptions {
  allowNegative?: boolean;
  allowZero?: boolean;
  maxLength?: number;
}

const NUMBER = /^-?(\d+(\.\d+)?|\.\d+)$/;
const TAKEN_FOR_DIGIT: Readonly<Record<string, string>> = {
  O: '0',
  o: '0',
  Q: '0',
  I: '1',
  i: '1',
  l: '1',
  '|': '1',
  Z: '2',
  z: '2',
  S: '5',
  s: '5',
  B: '8',
};
const UNIT_BEHIND =
  /^(-?[\d.,]+)\s*(n[.·\s]?m|lbf?[.·\s-]?(ft|in)|ft[.·\s-]?lbf?|in[.·\s-]?lbf?|kgf?[.·\s]?m|°|deg|mm|in)$/i;

const unified = (text: string): string => text.trim().replace(/^\+/, '').replace(/^[−–]/, '-');

function firstAt(text: string, wanted: RegExp): { at: number; character: string } {
  const at = Math.max(0, text.search(wanted));
  return { at, character: text.charAt(at) };
}

function commaProblem(text: string): EntryProblem | null {
  const at = text.indexOf(',');
  if (at < 0) return null;
  const suggestion = text.replace(',', '.');
  if (NUMBER.test(suggestion)) return { code: 'decimalComma', at, character: ',', suggestion };
  return /^-?[\d.,]+$/.test(text) ? { code: 'mixedSeparators', at, character: ',' } : null;
}

function letterProblem(text: string): EntryProblem | null {
  const suggestion = Array.from(text, (character) => TAKEN_FOR_DIGIT[character] ?? character).join('');
  if (suggestion === text || !/\d/.test(text) || !NUMBER.test(suggestion)) return null;
  return { code: 'letterForDigit', ...firstAt(text, /[OoQIil|ZzSsB]/), suggestion };
}

function shapeProblem(text: string): EntryProblem {
  const comma = commaProblem(text);
  if (comma) return comma;
  if (/^-?\d+\.$/.test(text)) return { code: 'endsWithPoint', at: text.length - 1, suggestion: text.slice(0, -1) };
  if (/^-?[\d.]*\d[\d.]*$/.test(text)) return { code: 'twoPoints', at: text.indexOf('.', text.indexOf('.') + 1) };
  const unit = UNIT_BEHIND.exec(text);
  if (unit?.[1] && NUMBER.test(unit[1])) return { code: 'unitTyped', at: unit[1].length, suggestion: unit[1] };
  const letter = letterProblem(text);
  if (letter) return letter;
  const closed = text.replace(/\s/g, '');
  if (closed !== text && NUMBER.test(closed))
    return { code: 'spaceInside', ...firstAt(text, /\s/), suggestion: closed };
  return { code: 'notANumber', ...firstAt(text, /[^\d.-]|(?!^)-/) };
}

function canonical(text: string): string {
  const negative = text.startsWith('-');
  const bare = text.replace(/^-/, '').replace(/^0+(?=\d)/, '');
  const digits = bare.startsWith('.') ? `0${bare}` : bare;
  return negative && /[1-9]/.test(digits) ? `-${digits}` : digits;
}

/**
 * Reads what a person typed for a reading. Gives the decimal with every decimal as typed (`"30.0"` stays `"30.0"`: its
 * last digit is part of the uncertainty, J2), without leading zeros or plus sign; else says exactly what is wrong and,
 * where it can be guessed, what may be meant. A guess is only ever offered, never taken.
 */
export function parseEntry(raw: string, options: EntryOptions = {}): Result<string, EntryProblem> {
  const text = unified(raw);
  if (text === '') return err({ code: 'empty' });
  if (text.length > (options.maxLength ?? 12)) return err({ code: 'tooLong' });
  if (!NUMBER.test(text)) return err(shapeProblem(text));
  const value = canonical(text);
  if (value.startsWith('-') && !options.allowNegative) {
    return err({ code: 'negative', at: 0, suggestion: value.slice(1) });
  }
  if (!options.allowZero && !/[1-9]/.test(value)) return err({ code: 'zero' });
  return ok(value);
}
