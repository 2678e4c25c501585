import type { HoleId } from '../procedure/procedure';
import { looseningOrder } from './slots';
import type { Rework, WalkState } from './state';

/** A restart of the whole joint under way (R6). */
export type JointRework = Extract<Rework, { kind: 'joint' }>;

/**
 * Holes that the joint's phase still asks for, in loosening order. A hole that is empty already is neither loosened nor
 * emptied, one that is filled already is not fitted again.
 */
export function jointLeft(state: WalkState, rework: JointRework): HoleId[] {
  const order = looseningOrder(state.procedure);
  const present = (hole: HoleId): boolean => state.holes[hole]?.present === true;
  if (rework.phase === 'fit') return order.filter((hole) => !present(hole));
  const there = order.filter(present);
  return rework.phase === 'remove' ? there : there.filter((hole) => !rework.done.includes(hole));
}

/** A decision to put in another fastener at this hole that has not been carried out (R2). */
export const replacementDue = (state: WalkState, hole: HoleId): boolean =>
  state.reworks.some((rework) => rework.kind === 'hole' && rework.hole === hole && rework.way === 'replace');
