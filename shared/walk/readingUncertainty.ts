import { turnUncertainty } from '../calibration/turnUncertainty';
import { lastDigitOf, torqueUncertainty } from '../calibration/uncertainty';
import type { Direction, WrenchSnapshot } from '../crib/wrench';
import type { Quantity } from '../quantity/quantity';
import { decimalToRational, divide, multiply, toNumber } from '../quantity/rational';
import { unitFactor } from '../quantity/unit';
import type { Source } from './eventData';

const numberOf = (text: string): number => toNumber(decimalToRational(text));

/** A decimal in the wrench's own unit as a number in another torque unit. */
function inUnit(text: string, from: Quantity['unit'], to: Quantity['unit']): number {
  return toNumber(divide(multiply(decimalToRational(text), unitFactor(from)), unitFactor(to)));
}

/**
 * Standard uncertainty of a torque as this wrench says it, in the torque's unit, from its class alone (J2); undefined where
 * no accuracy is known for that direction.
 */
export function torqueReadingUncertainty(
  value: Quantity,
  wrench: WrenchSnapshot,
  direction: Direction,
): number | undefined {
  const limit = wrench.accuracy[direction];
  if (limit === null) return undefined;
  return torqueUncertainty({
    torque: numberOf(value.value),
    classLimitPercent: numberOf(limit),
    resolution: inUnit(wrench.resolution.torque ?? '0', wrench.unit, value.unit),
    lastDigit: lastDigitOf(value.value),
  });
}

/** Standard uncertainty in degrees of a turn of so many pulls in all (J3); undefined for gauged and marked ones (J4). */
export function turnReadingUncertainty(pulls: number, wrench: WrenchSnapshot, source: Source): number | undefined {
  const { turnAccuracy, resolution } = wrench;
  if (turnAccuracy === null || source === 'gauged' || source === 'marked') return undefined;
  return turnUncertainty({
    pulls,
    accuracyDeg: numberOf(turnAccuracy),
    resolutionDeg: numberOf(resolution.angle ?? '1'),
  });
}
