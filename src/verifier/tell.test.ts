import { beforeEach, describe, expect, it } from 'vitest';
import { proof as en } from '../i18n/en/proof';
import { proof as es } from '../i18n/es/proof';
import { language, tell, type PageKey } from './tell';

const places = (text: string): string[] => [...new Set(text.match(/\{\w+\}/g))].sort();

beforeEach(() => (language.value = 'en'));

describe('the words of the page', () => {
  it('are there in both languages with the same places to fill', () => {
    expect(Object.keys(es)).toEqual(Object.keys(en));
    for (const key of Object.keys(en) as PageKey[]) {
      expect(places(es[key]), key).toEqual(places(en[key]));
      expect(es[key].split('|').length, key).toBe(en[key].split('|').length);
      expect(es[key].trim()).not.toBe('');
    }
  });

  it('are filled, and choose their form by the number', () => {
    expect(tell('judged.all', { n: 1, inside: 1 })).toBe('All 1 reading judged again: 1 in window.');
    expect(tell('judged.all', { n: 56, inside: 56 })).toBe('All 56 readings judged again: 56 in window.');
    language.value = 'es';
    expect(tell('problem.event', { event: 57 })).toBe('Evento 57');
  });
});
