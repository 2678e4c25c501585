import { err, type Result } from '../kernel/result';
import type { WalkCommand } from './commands';
import { guard } from './rules/guards';
import {
  decideCountersigned,
  decideHands,
  decideNote,
  decideOpened,
  decidePaused,
  decideReleased,
  decideResumed,
  decideSentBack,
  decideSigned,
  decideStopped,
  decideTakenOver,
  decideVoided,
} from './rules/lifecycle';
import {
  decidePart,
  decideStepCorrected,
  decideStepDone,
  decideWaitSkipped,
  decideWrenchReported,
  decideWrenchTaken,
} from './rules/preparation';
import { decideReadingTaken, decideReadingVoided, decideReceived, decideStageDone } from './rules/readings';
import { decideDeviationNoted, decideHandwork, decideHold, decideSettled } from './rules/rework';
import type { EventBody } from './events';
import type { Refusal } from './refusal';
import type { WalkState } from './state';

type Rule<T extends WalkCommand['type']> = (
  state: WalkState,
  command: Extract<WalkCommand, { type: T }>,
) => Result<EventBody, Refusal>;

const rules: { [T in WalkCommand['type']]: Rule<T> } = {
  'walk.opened': decideOpened,
  'walk.paused': decidePaused,
  'walk.resumed': decideResumed,
  'walk.signed': decideSigned,
  'walk.released': decideReleased,
  'walk.takenOver': decideTakenOver,
  'walk.countersigned': decideCountersigned,
  'walk.sentBack': decideSentBack,
  'walk.voided': decideVoided,
  'walk.stopped': decideStopped,
  'hands.changed': decideHands,
  'step.done': decideStepDone,
  'step.corrected': decideStepCorrected,
  'part.taken': decidePart,
  'part.corrected': decidePart,
  'wrench.taken': decideWrenchTaken,
  'wrench.reported': decideWrenchReported,
  'turn.begun': decideReceived,
  'stage.done': decideStageDone,
  'reading.received': decideReceived,
  'reading.rejected': decideReceived,
  'reading.taken': decideReadingTaken,
  'reading.voided': decideReadingVoided,
  'reading.elsewhere': decideReceived,
  'deviation.noted': decideDeviationNoted,
  'deviation.settled': decideSettled,
  'hold.set': decideHold,
  'hold.cleared': decideHold,
  'fastener.loosened': decideHandwork,
  'fastener.removed': decideHandwork,
  'fastener.fitted': decideHandwork,
  'thread.repaired': decideHandwork,
  'wait.skipped': decideWaitSkipped,
  'note.added': decideNote,
  'photo.added': decideNote,
};

/**
 * Holds every rule: one command makes exactly one event, or one refusal and nothing at all (decision 1). Pure; the same
 * state and command give the same answer on the tablet, the server and the public page.
 */
export function decide(state: WalkState, command: WalkCommand): Result<EventBody, Refusal> {
  const refused = guard(state, command);
  if (refused) return err(refused);
  return (rules[command.type] as Rule<WalkCommand['type']>)(state, command);
}
