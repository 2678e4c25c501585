import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { en as enShown } from './en';
import { officeWords as enOffice } from './en/office';
import { es as esShown } from './es';
import { officeWords as esOffice } from './es/office';
import { allMessages } from './allMessages';
import { createWords, localeOf } from './index';

type Tree = { [key: string]: string | Tree };

const leaves = (tree: Tree, prefix = ''): [string, string][] =>
  Object.entries(tree).flatMap(([key, value]) =>
    typeof value === 'string' ? [[prefix + key, value] as [string, string]] : leaves(value, `${prefix}${key}.`),
  );
const placeholders = (text: string): string[] => (text.match(/\{\w+\}/g) ?? []).sort();

/** The office adds its words when it is opened. */
const english = [...leaves(enShown), ...leaves(enOffice)];
const spanish = new Map([...leaves(esShown), ...leaves(esOffice)]);

const sources = (folder: string): string[] =>
  readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const file = path.join(folder, entry.name);
    if (entry.isDirectory()) return entry.name === 'i18n' ? [] : sources(file);
    return /\.(vue|ts)$/.test(entry.name) && !/\.test\.ts$/.test(entry.name) ? [file] : [];
  });

describe('messages', () => {
  it('have the same keys in both languages', () => {
    expect([...spanish.keys()].sort()).toEqual(english.map(([key]) => key).sort());
  });

  it('have the same placeholders in both languages', () => {
    const uneven = english.filter(
      ([key, text]) => placeholders(text).join() !== placeholders(spanish.get(key) ?? '').join(),
    );
    expect(uneven).toEqual([]);
  });

  it('are never empty', () => {
    expect([...english, ...spanish.entries()].filter(([, text]) => text.trim() === '')).toEqual([]);
  });

  it('can all be put together', () => {
    for (const locale of ['en', 'es'] as const) {
      const words = createWords(locale, allMessages);
      words.global.mergeLocaleMessage('en', enOffice);
      words.global.mergeLocaleMessage('es', esOffice);
      for (const [key, text] of english) {
        const values = Object.fromEntries(placeholders(text).map((name) => [name.slice(1, -1), '7']));
        expect(words.global.t(key, values), `${locale} ${key}`).not.toMatch(/\{\w+\}|^$/);
      }
    }
  });

  it('exist for every key written out in the sources', () => {
    const known = new Set(english.map(([key]) => key));
    const missing = sources(path.resolve('src')).flatMap((file) =>
      [...readFileSync(file, 'utf8').matchAll(/\bt[ce]?\(\s*'([a-z]\w*(?:\.\w+)+)'/g)]
        .map((match) => match[1] ?? '')
        .filter((key) => !known.has(key))
        .map((key) => `${path.relative('.', file)}: ${key}`),
    );
    expect(missing).toEqual([]);
  });
});

describe('localeOf', () => {
  it('takes a regional wish as its language and falls back to English', () => {
    expect([localeOf('es-MX'), localeOf('EN-gb'), localeOf('de'), localeOf(null)]).toEqual(['es', 'en', 'en', 'en']);
  });
});
