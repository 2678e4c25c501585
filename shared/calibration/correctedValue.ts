import { add, decimalToRational, divide, rational, rationalToDecimal } from '../quantity/rational';
import { decimalsOf, type Quantity } from '../quantity/quantity';

/**
 * The value freed of a known bias of b %: x/(1 + b/100) (J2). Reckoned exactly and written with two decimals more than
 * were read, so that correcting loses nothing a judgement could turn on. Throws on a bias of −100 % or below.
 */
export function correctedValue(value: Quantity, biasPercent: string): Quantity {
  const divisor = add(rational(1n), divide(decimalToRational(biasPercent), rational(100n)));
  if (divisor.n <= 0n) throw new Error(`A bias of ${biasPercent} % cannot be corrected`);
  const exact = divide(decimalToRational(value.value), divisor);
  return { value: rationalToDecimal(exact, decimalsOf(value.value) + 2), unit: value.unit };
}
