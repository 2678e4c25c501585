import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { Result } from '@shared/kernel/result';
import type { WalkCommand } from '@shared/walk/commands';
import type { EventBody, WalkEvent } from '@shared/walk/events';
import type { Refusal } from '@shared/walk/refusal';

/** A moment on both clocks of the tablet: waits are counted on the one that does not jump (W8, fault 10). */
export interface Moment {
  at: string;
  mono: number;
  boot: string;
}

/** The rules of a walk as the log needs them: those of shared/walk, or a small stand-in in a test. */
export interface WalkRules<S, V> {
  initial(procedure: ProcedureDocument, hash: string): S;
  decide(state: S, command: WalkCommand): Result<EventBody, Refusal>;
  evolve(state: S, event: WalkEvent): S;
  view(state: S, now: Moment): V;
}
