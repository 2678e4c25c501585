import { createRequire } from 'node:module';
import type { Face } from './ink';

const require = createRequire(import.meta.url);

/** Where the full TrueType files of the faces lie (SIL OFL 1.1). Whole names, so that unused packages can be found. */
// prettier-ignore
export const fontFiles = (): Record<Face, string> => ({
  text: require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/400Regular/AtkinsonHyperlegibleNext_400Regular.ttf'),
  textSemi: require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/600SemiBold/AtkinsonHyperlegibleNext_600SemiBold.ttf'),
  textBold: require.resolve('@expo-google-fonts/atkinson-hyperlegible-next/700Bold/AtkinsonHyperlegibleNext_700Bold.ttf'),
  figures: require.resolve('@expo-google-fonts/atkinson-hyperlegible-mono/400Regular/AtkinsonHyperlegibleMono_400Regular.ttf'),
  figuresSemi: require.resolve('@expo-google-fonts/atkinson-hyperlegible-mono/600SemiBold/AtkinsonHyperlegibleMono_600SemiBold.ttf'),
  figuresBold: require.resolve('@expo-google-fonts/atkinson-hyperlegible-mono/700Bold/AtkinsonHyperlegibleMono_700Bold.ttf'),
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
