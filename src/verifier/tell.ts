import { ref } from 'vue';
import type { Locale } from '@shared/quantity/format';
import { proof as en } from '../i18n/en/proof';
import { proof as es } from '../i18n/es/proof';

/** Key of a word of this page. */
export type PageKey = keyof typeof en;

const WORDS: Record<Locale, Record<PageKey, string>> = { en, es };

/** The reader's language; the page follows when it is set. */
export const language = ref<Locale>('en');

/** A word of the page, filled in. Of `one|more` the parameter `n` chooses. */
export function tell(key: PageKey, params: Record<string, string | number> = {}): string {
  const [one = '', more] = WORDS[language.value][key].split('|');
  const text = more !== undefined && params.n !== 1 ? more : one;
  return text.replace(/\{(\w+)\}/g, (_whole, name: string) => String(params[name] ?? ''));
}
