import { createI18n, type DefineLocaleMessage } from 'vue-i18n';

/** Languages of the interface. */
export const LOCALES = ['en', 'es'] as const;
export type Locale = (typeof LOCALES)[number];

/** The words of some languages. The office's join when it is opened; its pages are checked against the whole. */
export type Messages = Partial<Record<Locale, DefineLocaleMessage>>;

/** A stored or browser language as one of ours: `es-MX` is Spanish, anything unknown English. */
export function localeOf(wish: string | null | undefined): Locale {
  return LOCALES.find((locale) => wish?.toLowerCase().startsWith(locale)) ?? 'en';
}

/** The words of the interface. The caller keeps the chosen locale (and writes `lang` on the page). */
export function createWords(locale: Locale, messages: Messages) {
  return createI18n({
    legacy: false,
    locale,
    fallbackLocale: 'en',
    messages: messages as Record<Locale, DefineLocaleMessage>,
    missingWarn: false,
    fallbackWarn: false,
  });
}

/** What `createWords` makes: a Vue plugin whose `global.locale` may be set. */
export type Words = ReturnType<typeof createWords>;
