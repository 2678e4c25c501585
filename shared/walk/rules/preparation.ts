import { err, ok, type Result } from '../../kernel/result';
import { place } from '../../quantity/window';
import { unitKind } from '../../quantity/unit';
import type { Step } from '../../procedure/procedure';
import type { EventBody, StepDone } from '../events';
import { needOf } from '../instruction';
import { suits } from '../../crib/suitability';
import { refusal, type Refusal } from '../refusal';
import { stepDone, stepsOfHole } from '../route';
import { holeById } from '../slots';
import type { WalkState } from '../state';
import {
  firstOf,
  instructionFor,
  needsHands,
  needsOtherHands,
  needsRight,
  needsSupervisor,
  type CommandOf,
} from './guards';

type Answer = Omit<StepDone, 'inLimits'>;

function answerRefusal(step: Step, data: Pick<Answer, 'answer' | 'value' | 'photo'>): Refusal | null {
  if (data.answer === 'no') return null;
  if (step.kind === 'measure' && !data.value) return refusal('valueMissing');
  if (step.kind === 'photograph' && data.photo === undefined) return refusal('photoMissing');
  const kinds = data.value && step.window ? [unitKind(data.value.unit), unitKind(step.window.unit)] : [];
  return kinds[0] === kinds[1] ? null : refusal('wrongUnit');
}

function withLimits<T extends Pick<Answer, 'value'>>(step: Step, data: T): T & { inLimits?: boolean } {
  if (!data.value || !step.window) return data;
  return { ...data, inLimits: place(data.value, step.window) === 'in' };
}

/** The step is on the screen, or one of the preparation that may be done in any order (W2). */
function stepDue(state: WalkState, command: CommandOf<'step.done'>, step: Step): boolean {
  const { hole } = command.data;
  const instruction = instructionFor(state, command);
  if (instruction.kind === 'step' && instruction.step.id === step.id && instruction.hole === hole) return true;
  const preparing = instruction.kind === 'parts' || (instruction.kind === 'step' && !instruction.again);
  if (!preparing || stepDone(state, step, hole)) return false;
  if (hole !== null) return stepsOfHole(state, hole).includes(step);
  return step.place.at === 'beforeJoint';
}

/** `step.done` (W2). */
export function decideStepDone(state: WalkState, command: CommandOf<'step.done'>): Result<EventBody, Refusal> {
  const { data } = command;
  const step = state.procedure.steps.find((candidate) => candidate.id === data.step);
  if (!step) return err(refusal('unknownStep', { step: data.step }));
  if (data.hole !== null && !holeById(state.procedure, data.hole))
    return err(refusal('unknownHole', { hole: data.hole }));
  const refused = firstOf(
    needsHands(state, command),
    stepDue(state, command, step) ? null : refusal('notAStep', { step: step.text }),
    answerRefusal(step, data),
  );
  return refused ? err(refused) : ok({ type: 'step.done', data: withLimits(step, data) });
}

/** `step.corrected` (R10). */
export function decideStepCorrected(
  state: WalkState,
  command: CommandOf<'step.corrected'>,
): Result<EventBody, Refusal> {
  const { data } = command;
  const record = Object.values(state.steps).find((candidate) => candidate.seq === data.corrects);
  const step = state.procedure.steps.find((candidate) => candidate.id === record?.step);
  if (!record || !step) return err(refusal('unknownEvent', { seq: data.corrects }));
  if (data.reason.trim() === '') return err(refusal('reasonMissing'));
  const answer = {
    answer: data.answer,
    ...(data.value ? { value: data.value } : {}),
    ...(record.photo ? { photo: record.photo } : {}),
  };
  const refused = firstOf(needsHands(state, command), answerRefusal(step, answer));
  return refused ? err(refused) : ok({ type: 'step.corrected', data: withLimits(step, data) });
}

const known = (state: WalkState, part: string): boolean =>
  state.procedure.parts.some((need) => need.id === part) || state.procedure.fasteners.some((type) => type.id === part);

/** `part.taken`, `part.corrected` (W2, R10): part number, batch, count. */
export function decidePart(
  state: WalkState,
  command: CommandOf<'part.taken' | 'part.corrected'>,
): Result<EventBody, Refusal> {
  const hands = needsHands(state, command);
  if (hands) return err(hands);
  const { count, partNumber, batch } = command.data;
  if (!Number.isInteger(count) || count < 1) return err(refusal('countNotPositive'));
  if (partNumber.trim() === '' || batch.trim() === '') return err(refusal('valueMissing'));
  if (command.type === 'part.taken') {
    return known(state, command.data.part)
      ? ok({ type: command.type, data: command.data })
      : err(refusal('unknownPart', { part: command.data.part }));
  }
  if (!state.parts.some((part) => part.seq === command.data.corrects))
    return err(refusal('unknownEvent', { seq: command.data.corrects }));
  return command.data.reason.trim() === ''
    ? err(refusal('reasonMissing'))
    : ok({ type: command.type, data: command.data });
}

function confirmedRefusal({ data }: CommandOf<'wrench.taken'>): Refusal | null {
  const { unit, peakHold, direction, zero, dueDate } = data.confirmed;
  const setting = data.wrench.kind === 'setting';
  const all = unit && direction && dueDate && (setting || (peakHold && zero));
  if (!all) return refusal('wrenchNotConfirmed');
  if (setting && !data.setting) return refusal('settingMissing');
  return data.wrench.kind === 'torqueAngle' && data.turnShows === null ? refusal('showsMissing') : null;
}

/** `wrench.taken` (W3, K2). Only one that suits some stage; a supervisor's override is recorded. */
export function decideWrenchTaken(state: WalkState, command: CommandOf<'wrench.taken'>): Result<EventBody, Refusal> {
  const { data } = command;
  const confirmed = firstOf(needsHandsOrSupervisor(state, command), confirmedRefusal(command));
  if (confirmed) return err(confirmed);
  if (data.override) {
    if (data.override.reason.trim() === '') return err(refusal('reasonMissing'));
    return ok({ type: 'wrench.taken', data });
  }
  const instruction = instructionFor(state, command);
  if (instruction.kind === 'takeWrench') {
    const { reasons } = suits(data.wrench, needOf(state, instruction.slot, instruction.stage), command.at);
    const [reason] = reasons;
    if (reason) return err(refusal('wrenchDoesNotSuit', { wrench: data.wrench.tag, why: reason.code }));
  }
  return ok({ type: 'wrench.taken', data });
}

/** An override is the supervisor's own act at the technician's tablet (P1). */
function needsHandsOrSupervisor(state: WalkState, command: CommandOf<'wrench.taken'>): Refusal | null {
  if (!command.data.override) return needsHands(state, command);
  return firstOf(
    needsRight(command, 'override'),
    needsOtherHands(state, command),
    command.data.override.by === command.by ? null : refusal('noRight', { right: 'override' }),
  );
}

/** `wrench.reported` (K4, W9). */
export function decideWrenchReported(
  state: WalkState,
  command: CommandOf<'wrench.reported'>,
): Result<EventBody, Refusal> {
  const hands = needsHands(state, command);
  if (hands) return err(hands);
  return state.wrenches[command.data.wrench]
    ? ok({ type: command.type, data: command.data })
    : err(refusal('unknownWrench'));
}

/** `wait.skipped` (W8). */
export function decideWaitSkipped(state: WalkState, command: CommandOf<'wait.skipped'>): Result<EventBody, Refusal> {
  const { data } = command;
  const refused = needsSupervisor(state, command, 'skipWait', data);
  if (refused) return err(refused);
  if (data.reason.trim() === '') return err(refusal('reasonMissing'));
  if (data.renews !== undefined) return ok({ type: command.type, data });
  const instruction = instructionFor(state, command);
  const waits = instruction.kind === 'wait' && instruction.pass.id === data.pass;
  return waits ? ok({ type: command.type, data }) : err(refusal('noWait'));
}
