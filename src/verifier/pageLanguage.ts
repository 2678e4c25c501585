import { watchEffect } from 'vue';
import type { Locale } from '@shared/quantity/format';
import { language, tell } from './tell';

/** Spanish where the browser asks for it, else English. */
const wished = (wishes: readonly string[]): Locale => {
  const first = wishes.find((wish) => /^(en|es)\b/i.test(wish));
  return first?.toLowerCase().startsWith('es') ? 'es' : 'en';
};

/** Takes the browser's language and keeps `lang` and title of the page by it. */
export function startLanguage(): void {
  language.value = wished(navigator.languages);
  watchEffect(() => {
    document.documentElement.lang = language.value;
    document.title = `${tell('pageTitle')} · Boltwalk`;
  });
}
