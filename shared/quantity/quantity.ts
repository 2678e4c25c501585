import {
  add,
  compare,
  decimalToRational,
  divide,
  multiply,
  rationalToDecimal,
  subtract,
  type Rational,
  type Rounding,
} from './rational';
import { unitFactor, unitKind, type Unit } from './unit';

/** A value as it was typed or sent, `"30.0"`, with its unit: the decimals say how finely it was known (J1). */
export interface Quantity {
  value: string;
  unit: Unit;
}

/** How many digits stand after the point: `"30.0"` has 1. */
export function decimalsOf(value: string): number {
  const point = value.indexOf('.');
  return point < 0 ? 0 : value.length - point - 1;
}

/** The exact value in N·m, degrees or mm. Throws on a malformed decimal: what reaches here was checked on entry. */
export function quantityToRational(quantity: Quantity): Rational {
  return multiply(decimalToRational(quantity.value), unitFactor(quantity.unit));
}

function demandOneKind(a: Quantity, b: Quantity): void {
  if (unitKind(a.unit) !== unitKind(b.unit)) throw new Error(`Cannot compare ${a.unit} with ${b.unit}`);
}

/** −1, 0 or 1, exactly and across units of one kind (J1). Throws when the kinds differ. */
export function compareQuantities(a: Quantity, b: Quantity): -1 | 0 | 1 {
  demandOneKind(a, b);
  return compare(quantityToRational(a), quantityToRational(b));
}

function combine(a: Quantity, b: Quantity, operation: (x: Rational, y: Rational) => Rational): Quantity {
  if (a.unit !== b.unit) throw new Error(`Cannot add ${a.unit} and ${b.unit}: convert first`);
  const decimals = Math.max(decimalsOf(a.value), decimalsOf(b.value));
  const sum = operation(decimalToRational(a.value), decimalToRational(b.value));
  return { value: rationalToDecimal(sum, decimals), unit: a.unit };
}

/** a + b in their common unit, with the decimals of the finer: 89.5 + 1 = 90.5. Throws when the units differ. */
export function addQuantities(a: Quantity, b: Quantity): Quantity {
  return combine(a, b, add);
}

/** a − b in their common unit, with the decimals of the finer. Throws when the units differ. */
export function subtractQuantities(a: Quantity, b: Quantity): Quantity {
  return combine(a, b, subtract);
}

/** The quantity times an exact decimal factor (`"10"`, `"0.1"`, `"0.95"`), no digit lost: 44 × 0.1 = 4.4. */
export function scaleQuantity(quantity: Quantity, factor: string): Quantity {
  const decimals = decimalsOf(quantity.value) + decimalsOf(factor);
  const product = multiply(decimalToRational(quantity.value), decimalToRational(factor));
  return { value: rationalToDecimal(product, decimals), unit: quantity.unit };
}

/** The same value in another unit of its kind with `decimals` decimals, rounded once. Throws when the kinds differ. */
export function convertQuantity(
  quantity: Quantity,
  unit: Unit,
  decimals: number,
  rounding: Rounding = 'nearest',
): Quantity {
  demandOneKind(quantity, { value: '0', unit });
  const exact = divide(quantityToRational(quantity), unitFactor(unit));
  return { value: rationalToDecimal(exact, decimals, rounding), unit };
}
