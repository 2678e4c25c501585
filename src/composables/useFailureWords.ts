import { useI18n } from 'vue-i18n';
import type { OfficeFailure } from '@/queries/officeApi';
import { durationWords } from './durationWords';

/** Why the server did not do something, in words. */
export interface FailureWords {
  /** One sentence: what happened. */
  happened: (failure: OfficeFailure) => string;
  /** What can be done about it. */
  todo: (failure: OfficeFailure) => string;
  /** Both, for a line under a form. */
  whole: (failure: OfficeFailure) => string;
}

/** Sentences by the code of a failure; what a sentence needs comes from the failure's details. */
export function useFailureWords(): FailureWords {
  const i18n = useI18n();
  const { t } = i18n;
  const te = (key: string): boolean => i18n.te(key);

  function params({ details }: OfficeFailure): Record<string, unknown> {
    const seconds = Number(details.seconds);
    const wait = Number.isFinite(seconds)
      ? durationWords(seconds, (unit, n) => t(`office.duration.${unit}`, { n }, n))
      : '';
    return { ...details, wait };
  }
  /** The office's own sentence, else the one the rules of the walk have everywhere. */
  const happened = (failure: OfficeFailure): string => {
    const key = [`office.errors.${failure.code}`, `errors.${failure.code}`].find(te);
    return key === undefined ? t('office.failure.unknown', { code: failure.code }) : t(key, params(failure));
  };
  const todo = (failure: OfficeFailure): string => {
    const key = `office.todo.${failure.code.replace('.', '_')}`;
    if (te(key)) return t(key, params(failure));
    return t(failure.status === 0 || failure.status >= 500 ? 'office.todo.later' : 'office.todo.look');
  };
  return {
    happened,
    todo,
    whole: (failure) => {
      const key = `office.todo.${failure.code.replace('.', '_')}`;
      const more = te(key) || failure.status === 0 || failure.status >= 500;
      return more ? `${happened(failure)} ${todo(failure)}` : happened(failure);
    },
  };
}
