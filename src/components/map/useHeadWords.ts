import { useI18n } from 'vue-i18n';
import type { HeadState } from '@shared/geometry/heads';

/** Everything a head shows, as one spoken line: "Bolt 7, to do, now, group B". */
export function useHeadWords(): {
  headWords: (noun: string, label: string, state: HeadState, more?: { groups?: boolean; next?: boolean }) => string;
} {
  const { t } = useI18n();
  const headWords = (
    noun: string,
    label: string,
    state: HeadState,
    more: { groups?: boolean; next?: boolean } = {},
  ): string => {
    const parts = [t('base.map.hole', { noun, label, state: t(`base.head.${state.fill}`) })];
    if (state.flag?.text) parts.push(state.flag.text);
    if (state.now) parts.push(t('base.map.now'));
    else if (more.next) parts.push(t('base.map.next'));
    if (state.pendingDeg !== undefined) parts.push(t('base.map.unsaved', { deg: state.pendingDeg }));
    else if (state.stripeDeg) parts.push(t('base.map.turned', { deg: state.stripeDeg }));
    if (state.tag) parts.push(state.tag);
    if (state.behind) parts.push(t('base.map.behind', state.behind));
    if (more.groups) parts.push(t('base.map.group', { group: state.group }));
    return parts.join(', ');
  };
  return { headWords };
}
