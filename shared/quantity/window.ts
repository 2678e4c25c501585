import {
  abs,
  compare,
  decimalToRational,
  divide,
  parseDecimal,
  rationalToDecimal,
  subtract,
  type Rational,
} from './rational';
import { compareQuantities, convertQuantity, decimalsOf, quantityToRational, type Quantity } from './quantity';
import { unitFactor, type Unit } from './unit';

/** A target and its two limits, in the unit the author wrote; a reading equal to a limit is inside (J1). */
export interface Window {
  target: string;
  low: string;
  high: string;
  unit: Unit;
}

/**
 * What is wrong with a window: a figure that is no decimal, a limit of zero or below, limits that cross or coincide,
 * a target outside its own limits.
 */
export type WindowProblem = 'malformed' | 'notPositive' | 'limitsCross' | 'noWidth' | 'targetOutside';

/** Where a value stands against a window. */
export type Place = 'under' | 'in' | 'over';

/** The first thing wrong with a window, or null. A low limit of 0 is refused: it would let an untouched bolt pass. */
export function windowProblem(window: Window): WindowProblem | null {
  const target = parseDecimal(window.target);
  const low = parseDecimal(window.low);
  const high = parseDecimal(window.high);
  if (!target.ok || !low.ok || !high.ok) return 'malformed';
  if ([target, low, high].some((limit) => limit.value.n <= 0n)) return 'notPositive';
  const width = compare(low.value, high.value);
  if (width > 0) return 'limitsCross';
  if (width === 0) return 'noWidth';
  if (compare(target.value, low.value) < 0 || compare(target.value, high.value) > 0) return 'targetOutside';
  return null;
}

/** The window's lower limit as a quantity. */
export function lowLimit(window: Window): Quantity {
  return { value: window.low, unit: window.unit };
}

/** The window's upper limit as a quantity. */
export function highLimit(window: Window): Quantity {
  return { value: window.high, unit: window.unit };
}

/** The window's target as a quantity. */
export function targetOf(window: Window): Quantity {
  return { value: window.target, unit: window.unit };
}

/** Where the value stands, exactly and across units, limits included (J1). Throws when the kinds differ. */
export function place(value: Quantity, window: Window): Place {
  if (compareQuantities(value, lowLimit(window)) < 0) return 'under';
  return compareQuantities(value, highLimit(window)) > 0 ? 'over' : 'in';
}

/**
 * The window in another unit: target to the nearest, limits rounded inward, so that a reading equal to a shown limit is
 * `in` (J1, REF-UNIT-25). Takes more decimals than asked where the limits would meet or cross. In its own unit it stays as written.
 */
export function showWindow(window: Window, unit: Unit, decimals: number): Window {
  if (unit === window.unit) return window;
  for (let digits = decimals; ; digits += 1) {
    const low = convertQuantity(lowLimit(window), unit, digits, 'up').value;
    const high = convertQuantity(highLimit(window), unit, digits, 'down').value;
    if (compare(decimalToRational(low), decimalToRational(high)) < 0 || digits > decimals + 12) {
      return { target: convertQuantity(targetOf(window), unit, digits).value, low, high, unit };
    }
  }
}

/**
 * How far the value is past the limit it broke, in the window's unit and signed: `+` over, `−` under, `0` inside.
 * Where units differ it is rounded away from zero, so that something outside never shows as 0.
 */
export function marginTo(value: Quantity, window: Window): Quantity {
  const where = place(value, window);
  if (where === 'in') return { value: '0', unit: window.unit };
  const limit = where === 'over' ? window.high : window.low;
  const inUnit: Rational = divide(quantityToRational(value), unitFactor(window.unit));
  const past = subtract(inUnit, decimalToRational(limit));
  const decimals = Math.max(decimalsOf(value.value), decimalsOf(limit));
  const amount = rationalToDecimal(abs(past), decimals, 'up');
  return { value: where === 'over' ? amount : `-${amount}`, unit: window.unit };
}
