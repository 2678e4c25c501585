import { computed, type ComputedRef } from 'vue';
import { useI18n } from 'vue-i18n';
import { formatQuantity, formatWindow, type Locale } from '@shared/quantity/format';
import { convertQuantity, type Quantity } from '@shared/quantity/quantity';
import { unitKind, unitSymbol, type TorqueUnit, type Unit } from '@shared/quantity/unit';
import { showWindow, type Window } from '@shared/quantity/window';
import { useStandSettings } from './useStandSettings';

/** Decimals that a converted figure is shown with: about as fine as wrenches of that unit read. */
const DECIMALS: Readonly<Record<Unit, number>> = {
  'N.m': 1,
  'lbf.ft': 1,
  'lbf.in': 0,
  'kgf.m': 2,
  deg: 0,
  mm: 2,
  in: 4,
};

/** Figures as the tablet shows them: in the unit chosen for it, or in that of the wrench in hand. */
export interface ShownUnits {
  locale: ComputedRef<Locale>;
  quantity: (quantity: Quantity, unit?: Unit) => string;
  /** Both limits with the unit once, rounded inward in another unit (J1). */
  limits: (window: Window, unit?: Unit) => string;
  /** The window in this unit, each figure as it is shown. */
  window: (window: Window, unit?: Unit) => Window;
  symbol: (unit: Unit) => string;
}

/** Words for quantities. `unit` wins over the tablet's choice: what the wrench shows is what is asked for. */
export function useShownUnits(): ShownUnits {
  const { locale: language } = useI18n();
  const settings = useStandSettings();
  const locale = computed<Locale>(() => (language.value === 'es' ? 'es' : 'en'));
  const unitFor = (own: Unit, wanted: Unit | undefined): Unit => {
    const unit = wanted ?? chosen(own);
    return unitKind(unit) === unitKind(own) ? unit : own;
  };
  const chosen = (own: Unit): Unit => {
    const torque: TorqueUnit | 'asWritten' = settings.torqueUnit;
    return unitKind(own) === 'torque' && torque !== 'asWritten' ? torque : own;
  };
  const shown = (window: Window, unit?: Unit): Window => {
    const into = unitFor(window.unit, unit);
    return showWindow(window, into, DECIMALS[into]);
  };
  return {
    locale,
    quantity: (value, unit) => {
      const into = unitFor(value.unit, unit);
      const same = into === value.unit;
      return formatQuantity(same ? value : convertQuantity(value, into, DECIMALS[into]), locale.value);
    },
    limits: (window, unit) => formatWindow(shown(window, unit), locale.value),
    window: shown,
    symbol: unitSymbol,
  };
}
