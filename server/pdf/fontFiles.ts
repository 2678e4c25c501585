import { createRequire } from 'node:module';
import type { Face } from './ink';

const find = createRequire(import.meta.url);
const NEXT = '@expo-google-fonts/atkinson-hyperlegible-next';
const MONO = '@expo-google-fonts/atkinson-hyperlegible-mono';

/** Where the full TrueType files of the faces lie (SIL OFL 1.1). */
export const fontFiles = (): Record<Face, string> => ({
  text: find.resolve(`${NEXT}/400Regular/AtkinsonHyperlegibleNext_400Regular.ttf`),
  textSemi: find.resolve(`${NEXT}/600SemiBold/AtkinsonHyperlegibleNext_600SemiBold.ttf`),
  textBold: find.resolve(`${NEXT}/700Bold/AtkinsonHyperlegibleNext_700Bold.ttf`),
  figures: find.resolve(`${MONO}/400Regular/AtkinsonHyperlegibleMono_400Regular.ttf`),
  figuresSemi: find.resolve(`${MONO}/600SemiBold/AtkinsonHyperlegibleMono_600SemiBold.ttf`),
  figuresBold: find.resolve(`${MONO}/700Bold/AtkinsonHyperlegibleMono_700Bold.ttf`),
});

/** What the faces lack and how it is written instead; fractions as a wrench's drive is spoken of. */
const INSTEAD: Readonly<Record<string, string>> = {
  '\u202f': '\u00a0',
  '\u2009': '\u00a0',
  '\u2011': '-',
  '⅛': '1/8',
  '⅜': '3/8',
  '⅝': '5/8',
  '⅞': '7/8',
  µ: 'μ',
  '№': 'No.',
  '→': '>',
  '←': '<',
  '\t': ' ',
  '\n': ' ',
  '\r': ' ',
};

/**
 * The text with every character the face has; another is written as its Unicode number, so that nothing goes missing
 * and nobody takes an empty box for a letter.
 */
export function drawable(text: string, hasGlyph: (codePoint: number) => boolean): string {
  return Array.from(text.normalize('NFC'), (character) => {
    const known = INSTEAD[character] ?? character;
    const all = Array.from(known).every((part) => hasGlyph(part.codePointAt(0) ?? 0));
    if (all) return known;
    return `[U+${(character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0')}]`;
  }).join('');
}
