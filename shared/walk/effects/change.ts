import type { HoleId } from '../../procedure/procedure';
import type { Deviation, DeviationKind } from '../deviation';
import type { EventContext, SlotRef } from '../events';
import { slotKey } from '../slots';
import type { HoleState, SlotOutcome, WalkState } from '../state';

/** A copy of the state with one hole changed. */
export function withHole(state: WalkState, hole: HoleId, change: (hole: HoleState) => HoleState): WalkState {
  const before = state.holes[hole];
  return before ? { ...state, holes: { ...state.holes, [hole]: change(before) } } : state;
}

/** A copy of the state with what stands at a slot set; the end of a single hole's catch-up is noticed here. */
export function withOutcome(state: WalkState, slot: SlotRef, outcome: SlotOutcome): WalkState {
  const key = slotKey(slot);
  return withHole(state, slot.hole, (hole) => {
    const caughtUp = hole.catchUpTo === key && outcome.status !== 'open' && outcome.status !== 'partial';
    return { ...hole, slots: { ...hole.slots, [key]: outcome }, catchUpTo: caughtUp ? null : hole.catchUpTo };
  });
}

/** A copy of the state with the hole's fastener counted as used, once an attempt (R3). */
export const withUse = (state: WalkState, hole: HoleId): WalkState =>
  withHole(state, hole, (value) => ({
    ...value,
    used: true,
    counted: true,
    uses: value.uses + (value.counted ? 0 : 1),
  }));

/** What the new deviation is about; everything else has a default. */
export type DeviationFacts = Partial<Deviation> & { kind: DeviationKind };

/** A copy of the state with a deviation added; its id is the event's number, with a counter where one event makes several. */
export function withDeviation(state: WalkState, event: EventContext, facts: DeviationFacts): WalkState {
  const count = state.deviations.filter((deviation) => deviation.seq === event.seq).length;
  const id = count === 0 ? `${event.seq}` : `${event.seq}.${count}`;
  const { seq, at } = event;
  const empty = { hole: null, slot: null, reading: null, status: 'open' as const, settlings: [] };
  return { ...state, deviations: [...state.deviations, { ...empty, ...facts, id, seq, at }] };
}

/** A copy of the state with some deviations changed. */
export function withDeviations(
  state: WalkState,
  which: (deviation: Deviation) => boolean,
  change: (deviation: Deviation) => Deviation,
): WalkState {
  return {
    ...state,
    deviations: state.deviations.map((deviation) => (which(deviation) ? change(deviation) : deviation)),
  };
}

/** Milliseconds from one instant of the walk to another: running time within one boot, else the clock (fault 10). */
export function elapsedMs(
  from: { at: string; mono: number; boot: string },
  to: { at: string; mono: number; boot: string },
): number {
  return from.boot === to.boot ? to.mono - from.mono : Date.parse(to.at) - Date.parse(from.at);
}
