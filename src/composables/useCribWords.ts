import { useI18n } from 'vue-i18n';
import { isUnit } from '@shared/quantity/unit';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { SuitabilityWarning } from '@shared/crib/suitability';
import type { WrenchObjection } from '@shared/walk/instruction';
import { daysLeft } from '@shared/crib/due';
import { useShownUnits } from './useShownUnits';

/** Wrenches in words. */
export interface CribWords {
  /** "W-03, digital torque-angle, 1/2 in". */
  name: (wrench: WrenchSnapshot) => string;
  /** "10 – 135 N·m · serial 81734 · due in 41 days". */
  facts: (wrench: WrenchSnapshot, at: string) => string;
  /** Each "no" in a sentence (W3). */
  no: (objection: WrenchObjection) => string;
  warning: (warning: SuitabilityWarning) => string;
}

/** Sentences for wrenches: what they are, and why they may not be used here. */
export function useCribWords(): CribWords {
  const { t } = useI18n();
  const units = useShownUnits();
  const readable = (params: Readonly<Record<string, string>>): Record<string, string> =>
    Object.fromEntries(
      Object.entries(params).map(([name, value]) => {
        if (isUnit(value)) return [name, units.symbol(value)];
        if (name === 'kind' || name === 'state' || name === 'direction') return [name, t(`crib.${name}.${value}`)];
        return [name, value];
      }),
    );
  return {
    name: (wrench) => [wrench.tag, t(`crib.type.${wrench.kind}`), wrench.drive].filter(Boolean).join(', '),
    facts: (wrench, at) => {
      const { range, serial } = wrench;
      const days = daysLeft(wrench, at);
      return [
        range ? t('crib.range', { low: range.low, high: range.high, unit: units.symbol(range.unit) }) : '',
        t('crib.serial', { serial }),
        days === null ? '' : days < 0 ? t('crib.lapsed') : t('crib.due', { n: days }),
      ]
        .filter(Boolean)
        .join(' · ');
    },
    no: ({ code, params }) => t(`crib.no.${code}`, readable(params)),
    warning: ({ code, params }) => t(`crib.warning.${code}`, readable(params)),
  };
}
