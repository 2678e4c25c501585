import { computed, ref, watch, type ComputedRef, type Ref } from 'vue';
import type { HoleId } from '@shared/procedure/procedure';
import type { PullInstruction } from '@shared/walk/instruction';
import { sameSlot, slotKey } from '@shared/walk/slots';
import type { PullFrame } from './pullEntry';
import type { WalkAccess } from './walkAccess';

/** The pull on the screen, and what a person may change about it without an event. */
export interface PullFrameUse {
  frame: ComputedRef<PullFrame>;
  /** *I tightened a different one* (R5). */
  other: Ref<HoleId | null>;
  /** Another wrench of those taken: one tap (W3). */
  chosen: Ref<string | null>;
  /** Changes whenever the entry has to begin again. */
  begins: ComputedRef<string>;
}

/** Puts instruction, wrench in hand and hole together. The instruction is kept while the walk has moved on to the next. */
export function usePullFrame(walk: WalkAccess, instruction: () => PullInstruction): PullFrameUse {
  const other = ref<HoleId | null>(null);
  const chosen = ref<string | null>(null);
  const frame = computed<PullFrame>(() => {
    const { state } = walk;
    const asked = instruction();
    // While a figure is typed again for a different hole, that hole stays the one it is for (R5, R10).
    const retyped = state.retype && sameSlot(state.retype.slot, asked.slot) ? state.retype.insteadOf : null;
    const id = asked.mode === 'finishByStripe' ? null : (chosen.value ?? asked.wrench);
    const base = { state, instruction: asked, taken: id === null ? null : (state.wrenches[id] ?? null) };
    return { ...base, other: retyped === null ? other.value : null };
  });
  // What was said of one pull does not go on to the next: the reading named its hole and its wrench.
  watch(
    () => [walk.state.readings.length, walk.state.deviations.length],
    () => {
      other.value = null;
      chosen.value = null;
    },
  );
  const begins = computed(() => {
    const { slot, mode } = instruction();
    const { readings, retype } = walk.state;
    return [slotKey(slot), slot.hole, mode, readings.length, retype?.voided ?? '', other.value ?? ''].join('|');
  });
  return { frame, other, chosen, begins };
}
