import { turnUncertainty } from '../calibration/turnUncertainty';
import { lastDigitOf, torqueUncertainty } from '../calibration/uncertainty';
import { judge, judgeSetting, type Verdict } from '../judge/verdict';
import { addQuantities, compareQuantities, type Quantity } from '../quantity/quantity';
import { decimalToRational, toNumber } from '../quantity/rational';
import { unitKind } from '../quantity/unit';
import { targetOf, type Window } from '../quantity/window';
import type { Stage } from '../procedure/procedure';
import type { ReadingEntry } from './events';
import type { Placement } from './placement';
import { directionOf, stageOf, windowOf } from './slots';
import type { TakenWrench, WalkState } from './state';

/** What the rules make of an entry: kept in the event so that it can be repeated (J7). */
export interface Judged {
  window: Window | null;
  total: Quantity;
  verdict: Verdict;
  endVerdict?: Verdict;
}

const numberOf = (text: string): number => toNumber(decimalToRational(text));

const unsigned = (quantity: Quantity): Quantity =>
  quantity.value.startsWith('-') ? { ...quantity, value: quantity.value.slice(1) } : quantity;

/** Turns add to what stands; a total since zero replaces it; of two torques the higher stands (R1, R5, W9). */
function totalOf(entry: ReadingEntry, placement: Placement): Quantity {
  const value = unsigned(entry.value);
  const standing = placement.before?.total ?? null;
  if (unitKind(value.unit) !== 'angle') {
    const higher = placement.kind === 'adds' && standing !== null && compareQuantities(standing, value) > 0;
    return higher ? standing : value;
  }
  // A wrench zeroed for *pull again* knows nothing of what stands; the stripe shows the whole turn.
  const pulledOn = placement.before?.status === 'partial' && entry.source !== 'marked';
  const adds = placement.kind === 'adds' || entry.shows !== 'total' || pulledOn;
  return adds && standing !== null ? addQuantities(standing, value) : value;
}

function torqueU(value: Quantity, wrench: TakenWrench, direction: 'cw' | 'ccw'): number | undefined {
  const limit = wrench.wrench.accuracy[direction];
  if (limit === null) return undefined;
  return torqueUncertainty({
    torque: numberOf(value.value),
    classLimitPercent: numberOf(limit),
    resolution: numberOf(wrench.wrench.resolution.torque ?? '0'),
    lastDigit: lastDigitOf(value.value),
  });
}

function turnU(entry: ReadingEntry, wrench: TakenWrench): number | undefined {
  const { turnAccuracy, resolution } = wrench.wrench;
  if (turnAccuracy === null || entry.source === 'gauged' || entry.source === 'marked') return undefined;
  return turnUncertainty({
    pulls: entry.pulls,
    accuracyDeg: numberOf(turnAccuracy),
    resolutionDeg: numberOf(resolution.angle ?? '1'),
  });
}

function verdictOf(state: WalkState, value: Quantity, window: Window | null, u: number | undefined): Verdict {
  if (!window) return 'in';
  const policy = state.opened?.policy.judgement ?? 'simple';
  return u === undefined
    ? judge({ value, window, policy: 'simple' })
    : judge({ value, window, policy, uncertainty: u });
}

/** W7: a click is `in` when the setting equals the target within one scale step; nothing was measured. */
function clickedVerdict(total: Quantity, window: Window | null, wrench: TakenWrench | undefined): Verdict {
  return window ? judgeSetting(total, targetOf(window), wrench?.wrench.scaleStep ?? '0') : 'in';
}

function endVerdictOf(state: WalkState, entry: ReadingEntry, stage: Stage): Verdict | undefined {
  if (stage.kind !== 'turn' || !entry.endTorque) return undefined;
  const group = state.procedure.holes.find((hole) => hole.id === entry.hole)?.group ?? '';
  const window = stage.endTorque.windows?.[group];
  if (!window) return undefined;
  const wrench = entry.wrench === null ? undefined : state.wrenches[entry.wrench];
  const direction = directionOf(state.procedure, stage, entry.hole);
  const u = wrench && torqueU(entry.endTorque, wrench, direction);
  return verdictOf(state, entry.endTorque, window, u);
}

/** Judges an entry where `placement` puts it (J1–J5, J7). Pure: the same inputs give the same verdict for ever. */
export function judgeReading(state: WalkState, entry: ReadingEntry, placement: Placement): Judged {
  const stage = stageOf(state, placement.slot)?.stage;
  if (!stage) throw new Error(`no stage ${placement.slot.pass}/${placement.slot.stage}`);
  const window = windowOf(state.procedure, stage, entry.hole);
  const total = totalOf(entry, placement);
  const wrench = entry.wrench === null ? undefined : state.wrenches[entry.wrench];
  if (entry.source === 'clicked') return { window, total, verdict: clickedVerdict(total, window, wrench) };
  const direction = directionOf(state.procedure, stage, entry.hole);
  const isTurn = unitKind(total.unit) === 'angle';
  const u = wrench && (isTurn ? turnU(entry, wrench) : torqueU(total, wrench, direction));
  const endVerdict = endVerdictOf(state, entry, stage);
  const judged = { window, total, verdict: verdictOf(state, total, window, u) };
  return endVerdict === undefined ? judged : { ...judged, endVerdict };
}
