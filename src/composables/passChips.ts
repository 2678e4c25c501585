import type { PassView } from '@shared/walk/view';
import { slotDone } from '@shared/walk/route';
import { slotKey } from '@shared/walk/slots';
import type { WalkState } from '@shared/walk/state';

/** How one hole of the pass under way stands. */
export type ChipCell = 'done' | 'off' | 'now' | 'todo';

/** Holes of a pass in its order, each with how it stands. */
export function passCells(state: WalkState, pass: PassView, now: string | null): ChipCell[] {
  return pass.pass.order.map((hole) => {
    if (hole === now) return 'now';
    const slots = pass.pass.stages.map((stage) => ({ pass: pass.id, hole, stage: stage.id, round: pass.round }));
    if (slots.some((slot) => isOff(state, hole, slotKey(slot)))) return 'off';
    return slots.every((slot) => slotDone(state, slot)) ? 'done' : 'todo';
  });
}

const isOff = (state: WalkState, hole: string, key: string): boolean => {
  const outcome = state.holes[hole]?.slots[key];
  return outcome?.status === 'open' || outcome?.status === 'held' || outcome?.status === 'accepted';
};

/** Whether any reading of this pass is out of its window, held or accepted. */
export const passHasOff = (state: WalkState, pass: PassView): boolean =>
  pass.pass.order.some((hole) =>
    pass.pass.stages.some((stage) =>
      isOff(state, hole, slotKey({ pass: pass.id, stage: stage.id, round: pass.round })),
    ),
  );
