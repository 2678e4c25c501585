import type { Quantity } from './quantity';
import { unitSymbol, type Unit } from './unit';
import type { Window } from './window';

/** The languages of the interface. */
export type Locale = 'en' | 'es';

// A point in both languages: wrench displays and the keypad show one, and a typed comma is refused.
const DECIMAL_SIGN: Readonly<Record<Locale, string>> = { en: '.', es: '.' };

const MINUS = '\u2212';

/** The figure alone, with a real minus sign and every decimal kept. */
export function formatDecimal(value: string, locale: Locale): string {
  return value.replace('-', MINUS).replace('.', DECIMAL_SIGN[locale]);
}

function withUnit(figures: string, unit: Unit): string {
  return unit === 'deg' ? `${figures}${unitSymbol(unit)}` : `${figures} ${unitSymbol(unit)}`;
}

/** `30 N·m`, `22.0 lbf·ft`, `90°`. */
export function formatQuantity(quantity: Quantity, locale: Locale): string {
  return withUnit(formatDecimal(quantity.value, locale), quantity.unit);
}

/** The two limits: `85 – 95°`, `28 – 32 N·m`. */
export function formatWindow(window: Pick<Window, 'low' | 'high' | 'unit'>, locale: Locale): string {
  return withUnit(`${formatDecimal(window.low, locale)} – ${formatDecimal(window.high, locale)}`, window.unit);
}
