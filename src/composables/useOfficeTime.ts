import { computed } from 'vue';
import { useI18n } from 'vue-i18n';
import { formatClock, formatDay, formatTime } from '@shared/proof/proofTime';
import { useSignedIn } from '@/queries/useSession';

/** Times as the shop's clock shows them, whatever the zone of this computer. */
export function useOfficeTime(): {
  time: (iso: string) => string;
  day: (text: string) => string;
  /** The clock alone for today, else the day. */
  short: (iso: string) => string;
} {
  const { locale } = useI18n();
  const { me } = useSignedIn();
  const reader = computed(() => ({
    language: locale.value === 'es' ? ('es' as const) : ('en' as const),
    timeZone: me.value?.shop.timeZone ?? 'UTC',
  }));
  const day = (text: string): string => formatDay(text, reader.value);
  return {
    time: (iso) => formatTime(iso, reader.value),
    day,
    short: (iso) => {
      const today = day(new Date().toISOString()) === day(iso);
      return today ? formatClock(iso, reader.value) : day(iso);
    },
  };
}
