import { useI18n } from 'vue-i18n';

/** Days and times as this tablet shows them. The record keeps UTC; these are words only. */
export function useDates(): {
  day: (iso: string) => string;
  time: (iso: string) => string;
  moment: (iso: string) => string;
} {
  const { locale } = useI18n();
  const tag = (): string => (locale.value === 'es' ? 'es' : 'en-GB');
  const shown = (iso: string, options: Intl.DateTimeFormatOptions): string =>
    new Intl.DateTimeFormat(tag(), options).format(new Date(iso.length === 10 ? `${iso}T12:00:00` : iso));
  return {
    day: (iso) => shown(iso, { day: 'numeric', month: 'short', year: 'numeric' }),
    time: (iso) => shown(iso, { hour: '2-digit', minute: '2-digit' }),
    moment: (iso) => shown(iso, { day: 'numeric', month: 'short', hour: '2-digit', minute: '2-digit' }),
  };
}
