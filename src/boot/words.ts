import { watch } from 'vue';
import { useStandSettings } from '@/composables/useStandSettings';
import { createWords, type Locale, type Words } from '@/i18n';
import { loadMessages } from '@/i18n/loadMessages';

/**
 * The words in the language of this browser's settings, and every later change of them. A language that cannot be loaded
 * (no network, no worker yet) leaves the one that is there.
 */
export async function startWords(onLocale: (locale: Locale) => void): Promise<Words> {
  const settings = useStandSettings();
  const words = createWords(settings.locale, { [settings.locale]: await loadMessages(settings.locale) });
  const show = (locale: Locale): void => {
    words.global.locale.value = locale;
    document.documentElement.lang = locale;
    onLocale(locale);
  };
  show(settings.locale);
  watch(
    () => settings.locale,
    (locale) =>
      void loadMessages(locale).then(
        (messages) => {
          words.global.mergeLocaleMessage(locale, messages);
          show(locale);
        },
        () => undefined,
      ),
  );
  return words;
}
