import { useI18n } from 'vue-i18n';

/** Words of the small tags on heads: `new`, `3rd`. */
export function useTagWords(): { fresh: string; ordinal: (n: number) => string } {
  const { t } = useI18n();
  return {
    get fresh() {
      return t('walk.tag.fresh');
    },
    ordinal: (place) => (place <= 10 ? t(`walk.tag.ordinal.n${place}`) : t('walk.tag.nth', { n: place })),
  };
}
