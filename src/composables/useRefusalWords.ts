import { useI18n } from 'vue-i18n';

/** A refusal as the rules, the storage or the server give it. */
export interface AnyRefusal {
  code: string;
  params?: Record<string, unknown>;
}

/** Says why something was not done: `errors.<code>`, else a plain sentence with the code. */
export function useRefusalWords(): { refusalWords: (refusal: AnyRefusal) => string } {
  const i18n = useI18n();
  const refusalWords = ({ code, params = {} }: AnyRefusal): string => {
    const key = `errors.${code}`;
    const why =
      typeof params.why === 'string' && i18n.te(`crib.short.${params.why}`) ? i18n.t(`crib.short.${params.why}`) : '';
    return i18n.te(key) ? i18n.t(key, { ...params, why }) : i18n.t('errors.unknown', { code });
  };
  return { refusalWords };
}
