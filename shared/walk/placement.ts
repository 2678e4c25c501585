import { compareQuantities } from '../quantity/quantity';
import type { Window } from '../quantity/window';
import type { Stage } from '../procedure/procedure';
import type { ReadingEntry, SlotRef } from './events';
import { slotKey, slotsOfHole, stageOf, windowOf } from './slots';
import { nextSlotOfHole } from './route';
import type { SlotOutcome, WalkState } from './state';

/**
 * What a reading counts for. `instructed`: the hole that was asked for. The others are R5, *I tightened a different one*:
 * `outOfOrder` takes this hole's own next stage early; `adds` falls on a stage that had a reading (turns add, of two
 * torques the higher stands); `earlierMissing` and `afterTurn` count for nothing and have to be settled.
 */
export type Placement =
  | { kind: 'instructed' | 'outOfOrder'; slot: SlotRef; before: SlotOutcome | null }
  | { kind: 'adds'; slot: SlotRef; before: SlotOutcome }
  | { kind: 'earlierMissing' | 'afterTurn'; slot: SlotRef; before: null };

const outcomeAt = (state: WalkState, slot: SlotRef): SlotOutcome | null =>
  state.holes[slot.hole]?.slots[slotKey(slot)] ?? null;

const same = (a: Window, b: Window, limit: 'target' | 'low' | 'high'): boolean =>
  compareQuantities({ value: a[limit], unit: a.unit }, { value: b[limit], unit: b.unit }) === 0;

const sameWindow = (a: Window, b: Window): boolean => same(a, b, 'target') && same(a, b, 'low') && same(a, b, 'high');

/** Same kind of stage and the same window at this hole: a reading for one is a reading for the other (R5). */
function alike(state: WalkState, one: Stage, other: Stage, hole: string): boolean {
  if (one.kind !== other.kind) return false;
  const a = windowOf(state.procedure, one, hole);
  const b = windowOf(state.procedure, other, hole);
  return a !== null && b !== null && sameWindow(a, b);
}

const turnedAlready = (state: WalkState, slots: SlotRef[]): boolean =>
  slots.some((slot) => stageOf(state, slot)?.stage.kind === 'turn' && outcomeAt(state, slot) !== null);

/** The last slot of this kind that the hole has taken. */
function lastTakenAlike(state: WalkState, slots: SlotRef[], stage: Stage): SlotRef | null {
  const taken = slots.filter(
    (slot) => outcomeAt(state, slot) !== null && stageOf(state, slot)?.stage.kind === stage.kind,
  );
  return taken.at(-1) ?? null;
}

function placeElsewhere(state: WalkState, slot: SlotRef, instructed: SlotRef): Placement {
  const stage = stageOf(state, slot)?.stage;
  const slots = slotsOfHole(state, slot.hole);
  if (!stage) return { kind: 'earlierMissing', slot, before: null };
  const here = outcomeAt(state, slot);
  const catchingUp = state.holes[instructed.hole]?.catchUpTo !== null;
  const next = nextSlotOfHole(state, slot.hole, slots);
  const nextStage = next ? stageOf(state, next)?.stage : undefined;
  const isNext = next !== null && (slotKey(next) === slotKey(slot) || catchingUp);
  if (next && isNext && nextStage && alike(state, stage, nextStage, slot.hole)) {
    return { kind: 'outOfOrder', slot: next, before: null };
  }
  if (stage.kind === 'torque' && turnedAlready(state, slots)) return { kind: 'afterTurn', slot, before: null };
  if (here === null) return { kind: 'earlierMissing', slot, before: null };
  const target = (catchingUp && lastTakenAlike(state, slots, stage)) || slot;
  return { kind: 'adds', slot: target, before: outcomeAt(state, target) ?? here };
}

/** Says what an entry counts for, before it is judged. `instructed` is the slot on the screen. */
export function placeReading(state: WalkState, entry: ReadingEntry, instructed: SlotRef): Placement {
  const slot = { pass: entry.pass, hole: entry.hole, stage: entry.stage, round: entry.round };
  if (entry.insteadOf !== undefined) return placeElsewhere(state, slot, instructed);
  const before = state.retype ? state.retype.before : outcomeAt(state, slot);
  return { kind: 'instructed', slot, before };
}
