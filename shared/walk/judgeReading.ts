import { judge, judgeSetting, type Verdict } from '../judge/verdict';
import { addQuantities, compareQuantities, type Quantity } from '../quantity/quantity';
import { unitKind } from '../quantity/unit';
import { targetOf, type Window } from '../quantity/window';
import type { Stage } from '../procedure/procedure';
import type { ReadingEntry } from './events';
import type { Placement } from './placement';
import { torqueReadingUncertainty, turnReadingUncertainty } from './readingUncertainty';
import { directionOf, stageOf, windowOf } from './slots';
import type { TakenWrench, WalkState } from './state';

/** What the rules make of an entry: kept in the event so that it can be repeated (J7). */
export interface Judged {
  window: Window | null;
  total: Quantity;
  verdict: Verdict;
  endVerdict?: Verdict;
}

const unsigned = (quantity: Quantity): Quantity =>
  quantity.value.startsWith('-') ? { ...quantity, value: quantity.value.slice(1) } : quantity;

/** Whether a turn comes on top of what stands, or is the whole of it. */
function addsToStanding(entry: ReadingEntry, placement: Placement): boolean {
  // A wrench zeroed for *pull again* knows nothing of what stands; the stripe shows the whole turn.
  const pulledOn = placement.before?.status === 'partial' && entry.source !== 'marked';
  return placement.kind === 'adds' || entry.shows !== 'total' || pulledOn;
}

/** All the pulls that made up what now stands: their errors add straight (J3). */
export function pullsInAll(entry: ReadingEntry, placement: Placement): number {
  return entry.pulls + (addsToStanding(entry, placement) ? (placement.before?.pulls ?? 0) : 0);
}

/** Turns add to what stands; a total since zero replaces it; of two torques the higher stands (R1, R5, W9). */
function totalOf(entry: ReadingEntry, placement: Placement): Quantity {
  const value = unsigned(entry.value);
  const standing = placement.before?.total ?? null;
  if (unitKind(value.unit) !== 'angle') {
    const higher = placement.kind === 'adds' && standing !== null && compareQuantities(standing, value) > 0;
    return higher ? standing : value;
  }
  return addsToStanding(entry, placement) && standing !== null ? addQuantities(standing, value) : value;
}

/** Without a known uncertainty there is no guard to keep: gauged, marked and clicked ones are judged by the limits (J4, J5). */
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
  const u = wrench && torqueReadingUncertainty(entry.endTorque, wrench.wrench, direction);
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
  const u =
    wrench &&
    (isTurn
      ? turnReadingUncertainty(pullsInAll(entry, placement), wrench.wrench, entry.source)
      : torqueReadingUncertainty(total, wrench.wrench, direction));
  const endVerdict = endVerdictOf(state, entry, stage);
  const judged = { window, total, verdict: verdictOf(state, total, window, u) };
  return endVerdict === undefined ? judged : { ...judged, endVerdict };
}
