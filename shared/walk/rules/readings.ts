import { err, ok, type Result } from '../../kernel/result';
import { compareQuantities, quantityToRational } from '../../quantity/quantity';
import { isZero } from '../../quantity/rational';
import { unitKind } from '../../quantity/unit';
import type { EventBody, ReadingEntry, SlotRef } from '../events';
import { wrenchObjections, type PullInstruction } from '../instruction';
import { judgeReading } from '../judgeReading';
import { mayVoid } from '../offers';
import { placeReading } from '../placement';
import { refusal, type Refusal } from '../refusal';
import { directionOf, holeById, isStriped, labelOf, sameSlot, stageOf } from '../slots';
import type { WalkState } from '../state';
import { instructionFor, needsHands, needsSupervisor, type CommandOf } from './guards';

const slotOf = (data: SlotRef): SlotRef => ({ pass: data.pass, hole: data.hole, stage: data.stage, round: data.round });

function instructedPull(state: WalkState, command: CommandOf<'reading.taken'>): Result<PullInstruction, Refusal> {
  const instruction = instructionFor(state, command);
  if (instruction.kind === 'pull') return ok(instruction);
  const codes = {
    settle: 'settleFirst',
    step: 'stepFirst',
    parts: 'partsFirst',
    wait: 'waitNotOver',
    held: 'heldForSupervisor',
  } as const;
  const rework = ['loosen', 'remove', 'repair', 'fit'].includes(instruction.kind);
  if (rework) return err(refusal('reworkFirst'));
  if (instruction.kind === 'takeWrench') return err(refusal('wrenchNotTaken'));
  const code = codes[instruction.kind as keyof typeof codes] as (typeof codes)[keyof typeof codes] | undefined;
  return err(refusal(code ?? 'notTheInstruction'));
}

/** W4: a reading for another hole than the one on the screen is refused; R5 says so openly instead. */
function slotRefusal(state: WalkState, data: ReadingEntry, instruction: PullInstruction): Refusal | null {
  if (!holeById(state.procedure, data.hole)) return refusal('unknownHole', { hole: data.hole });
  if (!stageOf(state, data)) return refusal('unknownStage', { stage: `${data.pass}/${data.stage}` });
  const asked = slotOf({ ...data, hole: data.insteadOf ?? data.hole });
  const askedFor = retypeHole(state, instruction);
  if (data.insteadOf !== undefined && data.insteadOf === data.hole) return refusal('sameHole');
  if (!sameSlot(asked, askedFor)) {
    return refusal('notTheInstruction', { hole: labelOf(state.procedure, askedFor.hole) });
  }
  return null;
}

/** While a figure is typed again for a different hole, the hole asked for is still the skipped one (R5, R10). */
const retypeHole = (state: WalkState, instruction: PullInstruction): SlotRef =>
  state.retype?.insteadOf ? { ...instruction.slot, hole: state.retype.insteadOf } : instruction.slot;

function retypeRefusal(state: WalkState, data: ReadingEntry): Refusal | null {
  if (data.retype && !state.retype) return refusal('notRetyping');
  if (!state.retype) return null;
  if (!data.retype) return refusal('retypingOnly');
  const { slot, insteadOf } = state.retype;
  return sameSlot(slotOf(data), slot) && (data.insteadOf ?? null) === insteadOf ? null : refusal('notTheInstruction');
}

/** Turns go with the thread; a wrench's minus sign in a counter-clockwise stage is that direction (W6). */
function valueRefusal(state: WalkState, data: ReadingEntry, instruction: PullInstruction): Refusal | null {
  const turn = instruction.stage.kind === 'turn';
  if ((unitKind(data.value.unit) === 'angle') !== turn || unitKind(data.value.unit) === 'length')
    return refusal('wrongUnit');
  const negative = data.value.value.startsWith('-');
  const ccw = directionOf(state.procedure, instruction.stage, data.hole) === 'ccw';
  if (negative && !ccw) return refusal('turnAgainstDirection');
  if (isZero(quantityToRational(data.value))) return refusal('notAPositiveValue');
  if (!Number.isInteger(data.pulls) || data.pulls < 1) return refusal('pullsMissing');
  return turn ? turnRefusal(data, instruction) : null;
}

function turnRefusal(data: ReadingEntry, { mode, endTorque, standing }: PullInstruction): Refusal | null {
  if (data.shows === undefined) return refusal('showsMissing');
  if (endTorque.use === 'required' && !data.endTorque && mode !== 'finishByStripe') return refusal('endTorqueMissing');
  if (endTorque.use === 'unused' && data.endTorque) return refusal('endTorqueNotAsked');
  if (data.endTorque && unitKind(data.endTorque.unit) !== 'torque') return refusal('wrongUnit');
  if (mode === 'pullAgain' && data.shows !== 'thisPull') return refusal('thisPullOnly');
  if (mode === 'finishByTotal' && data.shows !== 'total') return refusal('totalOnly');
  if (data.source === 'marked' && data.shows !== 'total') return refusal('totalOnly');
  if (mode === 'finishByStripe' && data.source !== 'marked') return refusal('markedOnly');
  const behind = data.source === 'marked' && standing !== null && compareQuantities(data.value, standing) < 0;
  return behind && mode !== 'retype' ? refusal('totalBelowStanding') : null;
}

/** W3, W7, K2: the wrench was taken, suits, and is of the kind that gives such a reading. */
function wrenchRefusal(
  state: WalkState,
  data: ReadingEntry,
  { slot, stage }: PullInstruction,
  at: string,
): Refusal | null {
  if (data.source === 'marked') return isStriped(state, data.hole) ? null : refusal('noStripes');
  const taken = data.wrench === null ? undefined : state.wrenches[data.wrench];
  if (!taken) return refusal('wrenchNotTaken');
  const clicked = data.source === 'clicked';
  if (clicked !== (taken.wrench.kind === 'setting')) return refusal('sourceNotOfWrench', { source: data.source });
  if (data.source === 'gauged' && taken.wrench.kind !== 'angleGauge')
    return refusal('sourceNotOfWrench', { source: data.source });
  const [objection] = wrenchObjections(state, taken, { ...slot, hole: data.hole }, stage, at);
  if (objection && !data.retype) return refusal('wrenchDoesNotSuit', { wrench: taken.wrench.tag, why: objection.code });
  if (!clicked) return null;
  if (data.click === undefined) return refusal('clickMissing');
  const asSet = taken.setting !== undefined && compareQuantities(taken.setting, data.value) === 0;
  return asSet ? null : refusal('settingMissing');
}

function receivedRefusal(state: WalkState, data: ReadingEntry): Refusal | null {
  if (data.received === undefined) return null;
  return state.received?.seq === data.received ? null : refusal('unknownReading', { seq: data.received });
}

/** `reading.taken` (W4–W7, R1, R5, R10). */
export function decideReadingTaken(state: WalkState, command: CommandOf<'reading.taken'>): Result<EventBody, Refusal> {
  const { data } = command;
  const found = instructedPull(state, command);
  if (!found.ok) return found;
  const instruction = found.value;
  const refused =
    needsHands(state, command) ??
    slotRefusal(state, data, instruction) ??
    retypeRefusal(state, data) ??
    valueRefusal(state, data, instruction) ??
    wrenchRefusal(state, data, instruction, command.at) ??
    receivedRefusal(state, data) ??
    (instruction.pass.repeat && data.moved === undefined ? refusal('movedMissing') : null);
  if (refused) return err(refused);
  const placement = placeReading(state, data, { ...slotOf(data), hole: data.insteadOf ?? data.hole });
  return ok({ type: 'reading.taken', data: { ...data, ...judgeReading(state, data, placement) } });
}

/** `reading.voided` (R10): typed ones before the next reading; keyed or streamed ones only by a supervisor. */
export function decideReadingVoided(
  state: WalkState,
  command: CommandOf<'reading.voided'>,
): Result<EventBody, Refusal> {
  const { reading, reason } = command.data;
  const record = state.readings.find((candidate) => candidate.seq === reading);
  if (!record) return err(refusal('unknownReading', { seq: reading }));
  if (reason.trim() === '') return err(refusal('reasonMissing'));
  const typed = record.data.source === 'typed' || record.data.source === 'paper';
  const supervisor = needsSupervisor(state, command, 'accept', command.data);
  const refused = typed
    ? needsHands(state, command)
    : supervisor?.code === 'noRight'
      ? refusal('receivedByWrench')
      : supervisor;
  if (refused) return err(refused);
  const renewed = command.data.renews !== undefined && record.status === 'voided' && !typed;
  return renewed || mayVoid(state, record)
    ? ok({ type: command.type, data: command.data })
    : err(refusal('notVoidable'));
}

/** `reading.received`, `reading.rejected`, `turn.begun`, `reading.elsewhere`. */
export function decideReceived(
  state: WalkState,
  command: CommandOf<'reading.received' | 'reading.rejected' | 'turn.begun' | 'reading.elsewhere'>,
): Result<EventBody, Refusal> {
  const hands = needsHands(state, command);
  if (hands) return err(hands);
  if (command.type === 'reading.received') {
    return state.wrenches[command.data.wrench]
      ? ok({ type: command.type, data: command.data })
      : err(refusal('wrenchNotTaken'));
  }
  if (command.type === 'reading.rejected') {
    if (state.received?.seq !== command.data.received)
      return err(refusal('unknownReading', { seq: command.data.received }));
    return command.data.reason.trim() === ''
      ? err(refusal('reasonMissing'))
      : ok({ type: command.type, data: command.data });
  }
  if (!stageOf(state, command.data))
    return err(refusal('unknownStage', { stage: `${command.data.pass}/${command.data.stage}` }));
  if (!holeById(state.procedure, command.data.hole)) return err(refusal('unknownHole', { hole: command.data.hole }));
  return ok({ type: command.type, data: command.data } as EventBody);
}

/** `stage.done`: the stage on the screen takes no figure. */
export function decideStageDone(state: WalkState, command: CommandOf<'stage.done'>): Result<EventBody, Refusal> {
  const hands = needsHands(state, command);
  if (hands) return err(hands);
  const instruction = instructionFor(state, command);
  if (instruction.kind !== 'perform') return err(refusal('notTheInstruction'));
  if (!sameSlot(slotOf(command.data), instruction.slot)) {
    return err(refusal('notTheInstruction', { hole: labelOf(state.procedure, instruction.slot.hole) }));
  }
  const byEye = instruction.stage.kind === 'check';
  if (byEye && command.data.result === undefined) return err(refusal('valueMissing'));
  return ok({ type: command.type, data: command.data });
}
