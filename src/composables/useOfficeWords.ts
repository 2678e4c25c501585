import { useI18n } from 'vue-i18n';
import { officeWords as en } from '@/i18n/en/office';
import { officeWords as es } from '@/i18n/es/office';

let merged = false;

/** Adds the office's words to those that are loaded with every page: the stand never fetches them. */
export function useOfficeWords(): void {
  const i18n = useI18n({ useScope: 'global' });
  if (merged) return;
  i18n.mergeLocaleMessage('en', en);
  i18n.mergeLocaleMessage('es', es);
  merged = true;
}
