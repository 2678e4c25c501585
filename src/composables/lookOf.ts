import type { Stage } from '@shared/procedure/procedure';
import type { ResumeWay, SlotRef } from '@shared/walk/events';
import { resumeWays, workInstruction, type Now } from '@shared/walk/instruction';
import type { WalkState } from '@shared/walk/state';

/** What has to be looked at before a walk goes on (W9): the place, its stage, and the ways on where it was begun. */
export interface Look {
  slot: SlotRef | null;
  stage: Stage | null;
  ways: ResumeWay[];
  forced: boolean;
}

/** The look of a walk that stood still: the same for a pause, a kill and a takeover. */
export function lookOf(state: WalkState, now: Now): Look {
  const forcedHole = state.mustLook[0];
  const work = workInstruction(state, now);
  const at = work.kind === 'pull' || work.kind === 'perform' || work.kind === 'takeWrench' ? work : null;
  if (!at) return { slot: null, stage: null, ways: [], forced: forcedHole !== undefined };
  const slot = { ...at.slot, hole: forcedHole ?? at.slot.hole };
  return { slot, stage: at.stage, ways: resumeWays(state, slot, at.stage), forced: forcedHole !== undefined };
}
