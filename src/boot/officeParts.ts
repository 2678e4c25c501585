import type { App } from 'vue';
import type { Locale } from '@/i18n';

/** Quasar for the pages of the office: loaded with the first of them, so that a walk never waits for it. */
export interface OfficeParts {
  open: () => Promise<void>;
  setLocale: (locale: Locale) => void;
}

const load = () => import('./quasar');

/** Installs what only the office needs into the program, once, when it is first asked for. */
export function officeParts(app: App): OfficeParts {
  let locale: Locale = 'en';
  let opened: ReturnType<typeof install> | null = null;
  const install = async () => {
    const quasar = await load();
    quasar.installQuasar(app, locale);
    return quasar;
  };
  return {
    open: async () => {
      opened ??= install();
      await opened;
    },
    setLocale: (next) => {
      locale = next;
      void opened?.then(({ setQuasarLocale }) => setQuasarLocale(locale));
    },
  };
}
