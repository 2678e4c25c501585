import type { en } from './en';
import type { officeWords } from './en/office';

type English = typeof en & typeof officeWords;

declare module 'vue-i18n' {
  // The English messages are the schema: t('…') completes their keys.
  // eslint-plugin wants an interface here because the package merges it.
  export interface DefineLocaleMessage extends English {}
}
