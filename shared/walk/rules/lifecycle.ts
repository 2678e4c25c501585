import { err, ok, type Result } from '../../kernel/result';
import type { EventBody } from '../events';
import { signersLeft, wasInterrupted, resumeWays } from '../instruction';
import { refusal, type Refusal } from '../refusal';
import { stockOf } from '../route';
import { fastenerOf, holeById, stageOf } from '../slots';
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

/** `walk.opened` (W1). */
export function decideOpened(state: WalkState, command: CommandOf<'walk.opened'>): Result<EventBody, Refusal> {
  const { data } = command;
  const { code, hash } = data.procedure;
  const unknown = data.earlier.usedHoles.find((hole) => !holeById(state.procedure, hole));
  const refused = firstOf(
    needsRight(command, 'walk'),
    code === state.procedure.code && hash === state.procedureHash ? null : refusal('procedureMismatch'),
    command.by === data.records || command.by === data.pulls ? null : refusal('notInHands'),
    unknown === undefined ? null : refusal('unknownHole', { hole: unknown }),
  );
  return refused ? err(refused) : ok({ type: command.type, data });
}

/** `walk.paused`. */
export function decidePaused(state: WalkState, command: CommandOf<'walk.paused'>): Result<EventBody, Refusal> {
  const hands = needsHands(state, command);
  return hands ? err(hands) : ok({ type: command.type, data: command.data });
}

/** A part short at one hole keeps the walk paused until one is there (R7). */
function partShort(state: WalkState): boolean {
  if (state.paused !== 'noPartLeft') return false;
  const hole = state.deviations.filter((deviation) => deviation.kind === 'noPartLeft').at(-1)?.hole;
  return hole !== null && hole !== undefined && stockOf(state, fastenerOf(state.procedure, hole).id) < 1;
}

/** `walk.resumed` (W9): what was begun is said, and the way on is one of those offered. */
export function decideResumed(state: WalkState, command: CommandOf<'walk.resumed'>): Result<EventBody, Refusal> {
  const { data } = command;
  const asleep = wasInterrupted(state, command.boot) || state.mustLook.length > 0;
  if (!state.paused && !asleep) return err(refusal('nothingToResume'));
  if (partShort(state)) return err(refusal('noPartLeft'));
  const refused = needsRight(command, 'walk');
  if (refused) return err(refused);
  const instruction = instructionFor(state, command);
  const working = instruction.kind === 'pull' || instruction.kind === 'perform' || instruction.kind === 'takeWrench';
  if (!working) {
    const plain = data.begun === 'notBegun' && data.way === 'asInstructed' && data.at === null;
    return plain ? ok({ type: command.type, data }) : err(refusal('wayNotOffered', { way: data.way }));
  }
  const hole = state.mustLook[0] ?? instruction.slot.hole;
  const { pass, stage } = instruction.slot;
  const named = data.at?.pass === pass && data.at.stage === stage && data.at.hole === hole;
  if (!named) return err(refusal('notTheInstruction'));
  if (data.begun === 'notBegun')
    return data.way === 'asInstructed'
      ? ok({ type: command.type, data })
      : err(refusal('wayNotOffered', { way: data.way }));
  const found = stageOf(state, instruction.slot);
  const offered = found ? resumeWays(state, { ...instruction.slot, hole }, found.stage) : [];
  return offered.includes(data.way)
    ? ok({ type: command.type, data })
    : err(refusal('wayNotOffered', { way: data.way }));
}

/** `walk.signed` (W12): everybody who pulled or recorded, once nothing is left to do. */
export function decideSigned(state: WalkState, command: CommandOf<'walk.signed'>): Result<EventBody, Refusal> {
  const { data } = command;
  const right = firstOf(needsRight(command, 'sign'), data.seal === '' ? refusal('sealMissing') : null);
  if (right) return err(right);
  if (data.meaning !== 'tightenedAsRecorded' && data.meaning !== 'recordedAsTold')
    return err(refusal('meaningNotYours'));
  if (data.renews !== undefined)
    return renewsSignature(state, command) ? ok({ type: command.type, data }) : err(refusal('notRenewable'));
  if (!signersLeft(state).includes(command.by)) return err(refusal('nothingToSign'));
  return instructionFor(state, command).kind === 'sign' ? ok({ type: command.type, data }) : err(refusal('workOpen'));
}

function renewsSignature(state: WalkState, command: CommandOf<'walk.signed' | 'walk.countersigned'>): boolean {
  const before = state.signatures.find((sign) => sign.seq === command.data.renews && sign.stands);
  const role = command.type === 'walk.signed' ? 'signer' : 'countersigner';
  return before?.role === role && (role === 'countersigner' || before.by === command.by);
}

/** `walk.countersigned` (W12, P1): at the tablet before release, or by the shop after it. */
export function decideCountersigned(
  state: WalkState,
  command: CommandOf<'walk.countersigned'>,
): Result<EventBody, Refusal> {
  const { data } = command;
  const right = needsSupervisor(state, command, 'countersign', { seal: data.seal === '' ? undefined : data.seal });
  if (right) return err(right);
  if (data.meaning !== 'checkedRecord' && data.meaning !== 'checkedRecordAndJoint')
    return err(refusal('meaningNotYours'));
  if (data.renews !== undefined)
    return renewsSignature(state, command) ? ok({ type: command.type, data }) : err(refusal('notRenewable'));
  if (state.signatures.some((sign) => sign.stands && sign.role === 'countersigner'))
    return err(refusal('signedAlready'));
  return state.everHands.length > 0 && signersLeft(state).length === 0
    ? ok({ type: command.type, data })
    : err(refusal('notSigned'));
}

/** `walk.sentBack` (R11). */
export function decideSentBack(state: WalkState, command: CommandOf<'walk.sentBack'>): Result<EventBody, Refusal> {
  const { items, seal } = command.data;
  const unknown = items.find(({ hole }) => hole !== null && !holeById(state.procedure, hole));
  const jointly = items.find(({ hole, action }) => hole === null && (action === 'restart' || action === 'replace'));
  const refused = firstOf(
    needsRight(command, 'sendBack'),
    needsOtherHands(state, command),
    seal === '' ? refusal('sealMissing') : null,
    items.length === 0 || items.some(({ note }) => note.trim() === '') ? refusal('reasonMissing') : null,
    unknown ? refusal('unknownHole', { hole: unknown.hole ?? '' }) : null,
    jointly ? refusal('unknownHole', { hole: '' }) : null,
    signersLeft(state).length > 0 || state.everHands.length === 0 ? refusal('notSigned') : null,
  );
  return refused ? err(refused) : ok({ type: command.type, data: command.data });
}

/** `walk.released` (decision 4): after signing, and with nothing sent back at the tablet. */
export function decideReleased(state: WalkState, command: CommandOf<'walk.released'>): Result<EventBody, Refusal> {
  const kind = instructionFor(state, command).kind;
  const done = kind === 'countersign' || kind === 'release';
  return done && command.data.to === 'shop'
    ? ok({ type: command.type, data: command.data })
    : err(refusal('notSigned'));
}

/** `walk.takenOver`: written by the shop; forced only by a supervisor (W11). */
export function decideTakenOver(state: WalkState, command: CommandOf<'walk.takenOver'>): Result<EventBody, Refusal> {
  const { data } = command;
  if (data.forced) {
    const right = needsRight(command, 'voidWalk');
    return right ? err(right) : ok({ type: command.type, data });
  }
  const right = needsRight(command, 'walk');
  if (right) return err(right);
  const paused = state.paused === 'handedOver' && state.writer === 'tablet';
  return state.writer === 'shop' || paused ? ok({ type: command.type, data }) : err(refusal('notWithTheShop'));
}

/** `walk.voided` (W13): a supervisor's, or by order; everything is kept. */
export function decideVoided(_state: WalkState, command: CommandOf<'walk.voided'>): Result<EventBody, Refusal> {
  const { data } = command;
  const right = data.order === undefined ? needsRight(command, 'voidWalk') : null;
  if (right) return err(right);
  return data.reason.trim() === '' ? err(refusal('reasonMissing')) : ok({ type: command.type, data });
}

/** `walk.stopped`: an order from the office, obeyed here; `goOn` only where it stands still (A3). */
export function decideStopped(state: WalkState, command: CommandOf<'walk.stopped'>): Result<EventBody, Refusal> {
  const { data } = command;
  if (data.order === '') return err(refusal('reasonMissing'));
  if (data.why === 'goOn' && !state.stopped) return err(refusal('notStopped'));
  return ok({ type: command.type, data });
}

/** `hands.changed` (W11). */
export function decideHands(state: WalkState, command: CommandOf<'hands.changed'>): Result<EventBody, Refusal> {
  const { pulls, records } = command.data;
  const refused = firstOf(
    needsRight(command, 'walk'),
    pulls === '' || records === '' ? refusal('valueMissing') : null,
    command.by === pulls || command.by === records || needsHands(state, command) === null
      ? null
      : refusal('notInHands'),
  );
  return refused ? err(refused) : ok({ type: command.type, data: command.data });
}

/** `note.added`, `photo.added`: kept whenever they come. */
export function decideNote(
  state: WalkState,
  command: CommandOf<'note.added' | 'photo.added'>,
): Result<EventBody, Refusal> {
  const { hole } = command.data;
  if (hole !== null && !holeById(state.procedure, hole)) return err(refusal('unknownHole', { hole }));
  if (command.type === 'note.added' && command.data.text.trim() === '') return err(refusal('valueMissing'));
  return ok({ type: command.type, data: command.data } as EventBody);
}
