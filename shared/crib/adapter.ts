import { quantityToRational, type Quantity } from '../quantity/quantity';
import { decimalToRational, divide, multiply, rationalToDecimal, toNumber } from '../quantity/rational';

/**
 * A crow-foot or offset on a wrench (K1): `length` from the square to the middle of the hand grip, `extension` from the
 * square to the fastener, `angleDeg` between them: 0 straight on, 90 across, 180 back towards the hand.
 */
export interface Adapter {
  length: Quantity;
  extension: Quantity;
  angleDeg: number;
}

/** Cosines that a wrench is really set up with are exact; the rest are the engine's, and are rounded at once. */
function cosine(angleDeg: number): number {
  const turn = ((angleDeg % 360) + 360) % 360;
  const exact: Readonly<Record<number, number>> = {
    0: 1,
    60: 0.5,
    90: 0,
    120: -0.5,
    180: -1,
    240: -0.5,
    270: 0,
    300: 0.5,
  };
  return exact[turn] ?? Math.cos((turn * Math.PI) / 180);
}

/**
 * (L + E·cos θ)/L, the torque at the fastener for one at the square, as a decimal with nine places. It is stored with the
 * reading and reckoned with from there on, so that no engine's cosine decides a verdict (J5, J7). Throws where the adapter
 * reaches back to the hand or beyond, where no lever is left.
 */
export function adapterRatio({ length, extension, angleDeg }: Adapter): string {
  const reach = toNumber(quantityToRational(extension)) * cosine(angleDeg);
  const hand = toNumber(quantityToRational(length));
  if (hand <= 0 || hand + reach <= 0) throw new Error('This adapter leaves no lever between hand and fastener');
  return ((hand + reach) / hand).toFixed(9);
}

/** What to set or read at the wrench for a torque at the fastener: T·L/(L + E·cos θ) (K1; REF-ADP-01 to 09). */
export function torqueAtWrench(atFastener: Quantity, ratio: string, decimals: number): Quantity {
  const exact = divide(decimalToRational(atFastener.value), decimalToRational(ratio));
  return { value: rationalToDecimal(exact, decimals), unit: atFastener.unit };
}

/** The torque at the fastener for one set or read at the wrench: T·(L + E·cos θ)/L (K1). */
export function torqueAtFastener(atWrench: Quantity, ratio: string, decimals: number): Quantity {
  const exact = multiply(decimalToRational(atWrench.value), decimalToRational(ratio));
  return { value: rationalToDecimal(exact, decimals), unit: atWrench.unit };
}
