import { Dialog, Notify, Quasar } from 'quasar';
import iconSet from 'quasar/icon-set/svg-material-icons';
import english from 'quasar/lang/en-US';
import spanish from 'quasar/lang/es';
import './looks';
import type { App } from 'vue';
import type { Locale } from '@/i18n';

const packs = { en: english, es: spanish };

/** Installs Quasar with drawn icons (no icon font) and the looks of src/css. */
export function installQuasar(app: App, locale: Locale): void {
  app.use(Quasar, { plugins: { Dialog, Notify }, iconSet, lang: packs[locale], config: { dark: false } });
}

/** Quasar's own words (calendar, table, select) in the language of the interface. */
export function setQuasarLocale(locale: Locale): void {
  Quasar.lang.set(packs[locale]);
}
