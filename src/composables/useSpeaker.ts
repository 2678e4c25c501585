import { computed, type ComputedRef } from 'vue';
import { useI18n } from 'vue-i18n';
import { phrase, say, type Phrase, type Speaker } from '@shared/proof/phrase';
import type { ProofPlace } from '@shared/proof/sheet';
import { useSignedIn } from '@/queries/useSession';

/** Says the phrases of a record in the language of the page, as its proof would. */
export function useSpeaker(names: () => Readonly<Record<string, string>>): {
  speaker: ComputedRef<Speaker>;
  said: (what: Phrase) => string;
  /** `bolt 5 · pass 3` */
  place: (where: ProofPlace) => string;
  person: (id: string) => string;
} {
  const { locale, t } = useI18n();
  const { me } = useSignedIn();
  const person = (id: string): string => names()[id] ?? t('office.walk.unknownPerson');
  const speaker = computed<Speaker>(() => ({
    language: locale.value === 'es' ? 'es' : 'en',
    timeZone: me.value?.shop.timeZone ?? 'UTC',
    nameOf: person,
  }));
  const said = (what: Phrase): string => say(what, speaker.value);
  const place = ({ label, noun, pass, round }: ProofPlace): string => {
    const at = label === null ? phrase('at.joint') : phrase(`at.${noun}`, { label });
    if (pass === null) return said(at);
    const where = { phrase: at };
    return said(round === null ? phrase('at.pass', { where, pass }) : phrase('at.round', { where, pass, round }));
  };
  return { speaker, said, place, person };
}
