import type { HoleId } from '../procedure/procedure';
import type { Choice, ReportedKind, SendBackAction, SlotRef } from './events';

/** Everything that can be off: found by the rules or reported by a person. */
export type DeviationKind =
  | ReportedKind
  | 'over'
  | 'under'
  | 'lookAgain'
  | 'endTorqueOver'
  | 'endTorqueUnder'
  | 'endTorqueLookAgain'
  | 'clickedStill'
  | 'outOfOrder'
  | 'earlierStageMissing'
  | 'torqueAfterTurn'
  | 'stepNo'
  | 'stepOutside'
  | 'otherLubricant'
  | 'finishWithinPassed'
  | 'waitSkipped'
  | 'interrupted'
  | 'stillMoving'
  | 'witnessMoved'
  | 'voidedOutOfWindow'
  | 'rejectedOutOfWindow'
  | 'changedValue'
  | 'wrenchOverride'
  | 'wrenchLapsed'
  | 'takenOver'
  | 'sentBack';

/** One decision about a deviation; later ones stand, all stay (R2). */
export interface Settling {
  choice: Choice;
  reason: string;
  by: string;
  at: string;
  seq: number;
  order?: string;
}

/**
 * Something off and what was decided about it. `open` blocks the walk, `held` lets the pass finish (R9), `settled` has a
 * decision, `noted` needs none, `withdrawn` went away with the voided reading it stood on.
 */
export interface Deviation {
  /** `<seq of the event that caused it>` or `<seq>.<n>`. */
  id: string;
  seq: number;
  at: string;
  kind: DeviationKind;
  hole: HoleId | null;
  slot: SlotRef | null;
  /** Sequence number of the reading it is about. */
  reading: number | null;
  status: 'open' | 'held' | 'settled' | 'noted' | 'withdrawn';
  settlings: Settling[];
  note?: string;
  /** Step it is about. */
  step?: string;
  /** Send-back: what the countersigner asked for (R11). */
  action?: SendBackAction;
}

/** The settling that stands, or null. */
export const standingSettling = (deviation: Deviation): Settling | null => deviation.settlings.at(-1) ?? null;
