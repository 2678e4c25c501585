import type { Quantity } from '../quantity/quantity';
import { formatQuantity, formatWindow, type Locale } from '../quantity/format';
import type { Window } from '../quantity/window';
import { formatDay, formatTime } from './proofTime';
import { en, type PhraseKey } from './words/en';
import { es } from './words/es';

/** Something a sentence names; written in the reader's language only when it is said. */
export type PhraseValue =
  | { quantity: Quantity }
  | { window: Pick<Window, 'low' | 'high' | 'unit'> }
  | { person: string }
  | { time: string }
  | { day: string }
  | { phrase: Phrase }
  | { list: PhraseParam[]; join: 'and' | 'or' | 'comma' };

/** Plain text (as somebody typed it), a count, or a value. */
export type PhraseParam = string | number | PhraseValue;

/** A sentence without a language: its key and what it is about. Only ids of people stand in it (decision 7). */
export interface Phrase {
  key: PhraseKey;
  params?: Record<string, PhraseParam>;
}

/** Who reads: language, the shop's time zone, and the name of a person as far as it may be shown. */
export interface Speaker {
  language: Locale;
  timeZone: string;
  nameOf(person: string): string;
}

/** A piece of a said sentence; strong ones are the figures that count. */
export interface Saying {
  text: string;
  strong: boolean;
}

const WORDS: Readonly<Record<Locale, Readonly<Record<PhraseKey, string>>>> = { en, es };

/** A word or sentence with nothing to fill in. */
export const word = (key: PhraseKey, language: Locale): string => WORDS[language][key];

/** Makes a phrase; leaves `params` out where there are none, so that equal phrases are equal as JSON. */
export const phrase = (key: PhraseKey, params?: Phrase['params']): Phrase => (params ? { key, params } : { key });

/** A figure stays with its unit at the end of a line. */
const together = (text: string): string => text.replaceAll(' ', '\u00a0');

function valueText(value: PhraseParam, speaker: Speaker): string {
  if (typeof value === 'string') return value;
  if (typeof value === 'number') return String(value);
  if ('quantity' in value) return together(formatQuantity(value.quantity, speaker.language));
  if ('window' in value) return together(formatWindow(value.window, speaker.language));
  if ('person' in value) return speaker.nameOf(value.person);
  if ('time' in value) return formatTime(value.time, speaker);
  if ('day' in value) return formatDay(value.day, speaker);
  if ('phrase' in value) return say(value.phrase, speaker);
  return joined(
    value.list.map((item) => valueText(item, speaker)),
    value.join,
    speaker.language,
  );
}

/** `a`, `a and b`, `a, b and c`. */
function joined(texts: string[], join: 'and' | 'or' | 'comma', language: Locale): string {
  if (join === 'comma' || texts.length < 2) return texts.join(', ');
  return texts.slice(0, -1).join(', ') + word(`join.${join}`, language) + (texts.at(-1) ?? '');
}

function templateOf({ key, params }: Phrase, language: Locale): string {
  const [one = '', more] = word(key, language).split('|');
  return more !== undefined && params?.n !== 1 ? more : one;
}

const filled = (template: string, params: Record<string, PhraseParam>, speaker: Speaker): string =>
  template.replace(/\{(\w+)\}/g, (_whole, name: string) => valueText(params[name] ?? '', speaker));

/** Says a phrase in pieces. What people typed is never taken for markup: pieces are cut before it is put in. */
export function sayRich(said: Phrase, speaker: Speaker): Saying[] {
  return templateOf(said, speaker.language)
    .split('**')
    .map((part, index) => ({ text: filled(part, said.params ?? {}, speaker), strong: index % 2 === 1 }))
    .filter(({ text }) => text !== '');
}

/** Says a phrase as plain text. */
export function say(said: Phrase, speaker: Speaker): string {
  return sayRich(said, speaker)
    .map(({ text }) => text)
    .join('');
}
