import type { DefineLocaleMessage } from 'vue-i18n';
import type { Locale } from './index';

/** The words of one language: only those that are read are loaded; the service worker keeps both for offline. */
export async function loadMessages(locale: Locale): Promise<DefineLocaleMessage> {
  const words: object = locale === 'es' ? (await import('./es')).es : (await import('./en')).en;
  return words as DefineLocaleMessage;
}
