import { lastDigitOf, torqueUncertainty } from '../calibration/uncertainty';
import { turnUncertainty } from '../calibration/turnUncertainty';
import { guardBand, shareLeft } from '../judge/verdict';
import { quantityToRational } from '../quantity/quantity';
import { divide, toNumber } from '../quantity/rational';
import { unitFactor } from '../quantity/unit';
import { targetOf, type Window } from '../quantity/window';
import type { Direction, WrenchSnapshot } from './wrench';

/**
 * Half the window over the wrench's accuracy at the target (K2): under 1 the wrench cannot tell in from out, under 3 it
 * tells poorly. Null where the wrench claims no accuracy for this kind and direction.
 */
export function fitOfAccuracy(wrench: WrenchSnapshot, window: Window, direction: Direction): number | null {
  const half = (Number(window.high) - Number(window.low)) / 2;
  if (window.unit === 'deg') return wrench.turnAccuracy === null ? null : half / Number(wrench.turnAccuracy);
  const percent = wrench.accuracy[direction];
  return percent === null ? null : half / ((Number(percent) * Number(window.target)) / 100);
}

/** The share of the window that guards leave at the target for one pull with this wrench (J5); null as above. */
export function shareGuardsLeave(wrench: WrenchSnapshot, window: Window, direction: Direction): number | null {
  if (window.unit === 'deg') {
    if (wrench.turnAccuracy === null) return null;
    const resolutionDeg = Number(wrench.resolution.angle ?? '0');
    const u = turnUncertainty({ pulls: 1, accuracyDeg: Number(wrench.turnAccuracy), resolutionDeg });
    return shareLeft(window, guardBand(u), 'deg');
  }
  const percent = wrench.accuracy[direction];
  if (percent === null) return null;
  const torque = toNumber(divide(quantityToRational(targetOf(window)), unitFactor(wrench.unit)));
  const resolution = Number(wrench.resolution.torque ?? '0');
  const lastDigit = wrench.resolution.torque === null ? 0 : lastDigitOf(wrench.resolution.torque);
  const u = torqueUncertainty({ torque, classLimitPercent: Number(percent), resolution, lastDigit });
  return shareLeft(window, guardBand(u), wrench.unit);
}
