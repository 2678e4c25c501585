import { useI18n } from 'vue-i18n';
import type { Violation } from './useForm';

/** What is wrong with a field, in words: `office.violation.<code>`. */
export function useViolationWords(): { violationWords: (violation: Violation | null) => string | null } {
  const i18n = useI18n();
  return {
    violationWords: (violation) => {
      if (!violation) return null;
      const key = `office.violation.${violation.code}`;
      return i18n.te(key) ? i18n.t(key, violation.params ?? {}) : i18n.t('office.violation.format');
    },
  };
}
