import type { IsoTime } from '../kernel/time';
import { compareQuantities, scaleQuantity, type Quantity } from '../quantity/quantity';
import { highLimit, lowLimit, type Window } from '../quantity/window';
import type { JudgePolicy } from '../judge/verdict';
import { fitOfAccuracy, shareGuardsLeave } from './accuracyFit';
import { lapsedBy } from './due';
import type { Direction, WrenchKind, WrenchSnapshot } from './wrench';

/** What a stage asks of a wrench; `endTorqueHigh` is the predicted high side of a turn's end torque. */
export interface WrenchNeed {
  kind: 'torque' | 'turn' | 'check' | 'loosen';
  window: Window | null;
  direction: Direction;
  endTorqueHigh?: Quantity;
  drive?: string;
  policy?: JudgePolicy;
}

/** Why a wrench does not suit (K2); `params` fill the sentence. */
export interface SuitabilityReason {
  code:
    | 'notInService'
    | 'lapsed'
    | 'wrongKind'
    | 'turnNotMeasured'
    | 'noRange'
    | 'outOfRange'
    | 'endTorqueTooHigh'
    | 'directionNotCalibrated'
    | 'driveMismatch'
    | 'tooCoarse'
    | 'guardsLeaveTooLittle';
  params: Readonly<Record<string, string>>;
}

/** What does not stop a wrench but is said beforehand. */
export interface SuitabilityWarning {
  code: 'coarse' | 'driveAdapted' | 'noDue' | 'noCertificate';
  params: Readonly<Record<string, string>>;
}

/** The answer, with every "no" and every warning, not only the first. */
export interface Suitability {
  suits: boolean;
  reasons: SuitabilityReason[];
  warnings: SuitabilityWarning[];
}

const KINDS: Readonly<Record<WrenchNeed['kind'], readonly WrenchKind[]>> = {
  torque: ['setting', 'dial', 'torque', 'torqueAngle'],
  turn: ['torqueAngle', 'angleGauge'],
  check: ['setting', 'dial', 'torque', 'torqueAngle'],
  loosen: ['dial', 'torque', 'torqueAngle'],
};
const MOST_OF_MAXIMUM = '0.95';
const COARSE_BELOW = 3;
const TOO_COARSE_BELOW = 1;

type Answer = SuitabilityReason | null;

/** Cut, not rounded: 0.96 must not read as 1.0 where the limit is 1. */
const cutToTenth = (ratio: number): string => (Math.floor(ratio * 10) / 10).toFixed(1);

function lifeReasons(wrench: WrenchSnapshot, at: IsoTime): Answer[] {
  const by = lapsedBy(wrench, at);
  const due = by === 'cycles' ? String(wrench.due.cycles) : (wrench.due.date ?? '');
  return [
    wrench.state === 'inService' ? null : { code: 'notInService', params: { state: wrench.state } },
    by === null ? null : { code: 'lapsed', params: { by, due } },
  ];
}

function kindReason(wrench: WrenchSnapshot, need: WrenchNeed): Answer {
  if (!KINDS[need.kind].includes(wrench.kind)) {
    if (need.kind === 'turn') return { code: 'turnNotMeasured', params: { kind: wrench.kind } };
    return { code: 'wrongKind', params: { kind: wrench.kind, need: need.kind } };
  }
  return need.kind === 'turn' && wrench.turnAccuracy === null
    ? { code: 'turnNotMeasured', params: { kind: wrench.kind } }
    : null;
}

/** Torque stages must lie wholly in the calibrated range; a turn asks only that its end torque stays below the maximum. */
function rangeReason(wrench: WrenchSnapshot, need: WrenchNeed): Answer {
  const asksTorque = need.window !== null && need.window.unit !== 'deg';
  if (!asksTorque && !need.endTorqueHigh) return null;
  // A gauge on a plain bar measures no torque and has no maximum.
  if (wrench.kind === 'angleGauge') return null;
  if (!wrench.range) return { code: 'noRange', params: {} };
  const { low, high, unit } = wrench.range;
  const limits = { rangeLow: low, rangeHigh: high, rangeUnit: unit };
  if (asksTorque && need.window) {
    const tooLow = compareQuantities(lowLimit(need.window), { value: low, unit }) < 0;
    const tooHigh = compareQuantities(highLimit(need.window), { value: high, unit }) > 0;
    const { low: windowLow, high: windowHigh, unit: windowUnit } = need.window;
    if (tooLow || tooHigh) return { code: 'outOfRange', params: { ...limits, windowLow, windowHigh, windowUnit } };
  }
  const most = scaleQuantity({ value: high, unit }, MOST_OF_MAXIMUM);
  if (!need.endTorqueHigh || compareQuantities(need.endTorqueHigh, most) <= 0) return null;
  const { value: endTorque, unit: endTorqueUnit } = need.endTorqueHigh;
  return { code: 'endTorqueTooHigh', params: { ...limits, endTorque, endTorqueUnit, most: most.value } };
}

function directionReason(wrench: WrenchSnapshot, need: WrenchNeed): Answer {
  const calibrated = wrench.kind === 'angleGauge' || wrench.accuracy[need.direction] !== null;
  return calibrated ? null : { code: 'directionNotCalibrated', params: { direction: need.direction } };
}

function driveReason(wrench: WrenchSnapshot, need: WrenchNeed): Answer {
  if (need.drive === undefined || need.drive === wrench.drive || wrench.adapterOk) return null;
  return { code: 'driveMismatch', params: { has: wrench.drive, needs: need.drive } };
}

function accuracyReasons(wrench: WrenchSnapshot, need: WrenchNeed): Answer[] {
  const fit = need.window && fitOfAccuracy(wrench, need.window, need.direction);
  const left = need.window && need.policy === 'guarded' ? shareGuardsLeave(wrench, need.window, need.direction) : null;
  return [
    fit !== null && fit < TOO_COARSE_BELOW ? { code: 'tooCoarse', params: { ratio: cutToTenth(fit) } } : null,
    left !== null && left < 0.5
      ? { code: 'guardsLeaveTooLittle', params: { percent: String(Math.floor(left * 100)) } }
      : null,
  ];
}

function warningsOf(wrench: WrenchSnapshot, need: WrenchNeed): SuitabilityWarning[] {
  const warnings: SuitabilityWarning[] = [];
  const fit = need.window && fitOfAccuracy(wrench, need.window, need.direction);
  if (fit !== null && fit >= TOO_COARSE_BELOW && fit < COARSE_BELOW) {
    warnings.push({ code: 'coarse', params: { ratio: cutToTenth(fit) } });
  }
  if (need.drive !== undefined && need.drive !== wrench.drive && wrench.adapterOk) {
    warnings.push({ code: 'driveAdapted', params: { has: wrench.drive, needs: need.drive } });
  }
  if (wrench.due.date === null && wrench.due.cycles === null) warnings.push({ code: 'noDue', params: {} });
  if (wrench.certificate === null) warnings.push({ code: 'noCertificate', params: {} });
  return warnings;
}

/** Whether a wrench suits a stage at an instant (K2), with a sentence's worth of data for each "no" and each warning. */
export function suits(wrench: WrenchSnapshot, need: WrenchNeed, at: IsoTime): Suitability {
  const answers = [
    ...lifeReasons(wrench, at),
    kindReason(wrench, need),
    rangeReason(wrench, need),
    directionReason(wrench, need),
    driveReason(wrench, need),
    ...accuracyReasons(wrench, need),
  ];
  const reasons = answers.filter((answer) => answer !== null);
  return { suits: reasons.length === 0, reasons, warnings: warningsOf(wrench, need) };
}
