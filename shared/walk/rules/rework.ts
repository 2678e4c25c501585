import { err, ok, type Result } from '../../kernel/result';
import type { EventBody } from '../events';
import type { Instruction } from '../instruction';
import { offersFor, settlingOpen } from '../offers';
import { refusal, type Refusal } from '../refusal';
import { holeById, labelOf } from '../slots';
import type { WalkState } from '../state';
import { firstOf, instructionFor, needsHands, needsRight, needsSupervisor, type CommandOf } from './guards';

/** `deviation.noted`: reported by a person. */
export function decideDeviationNoted(
  state: WalkState,
  command: CommandOf<'deviation.noted'>,
): Result<EventBody, Refusal> {
  const { kind, hole } = command.data;
  const needsHole = kind !== 'other' && kind !== 'wrenchDropped';
  const refused = firstOf(
    needsHands(state, command),
    hole !== null && !holeById(state.procedure, hole) ? refusal('unknownHole', { hole }) : null,
    needsHole && hole === null ? refusal('unknownHole', { hole: '' }) : null,
    kind === 'other' && command.data.note.trim() === '' ? refusal('reasonMissing') : null,
  );
  return refused ? err(refused) : ok({ type: command.type, data: command.data });
}

function acceptRefusal(state: WalkState, command: CommandOf<'deviation.settled'>): Refusal | null {
  if (command.data.choice !== 'accept')
    return command.data.order === undefined ? needsHands(state, command) : needsRight(command, 'accept');
  const reason = command.data.reason.trim() === '' ? refusal('reasonMissing') : null;
  return firstOf(needsSupervisor(state, command, 'accept', command.data), reason);
}

/** A held deviation is decided by a supervisor alone: accept, or what the rework rule gives (R9). */
function heldRefusal(command: CommandOf<'deviation.settled'>, held: boolean): Refusal | null {
  const { choice } = command.data;
  if (!held || choice === 'accept' || choice === 'restart' || choice === 'replace' || choice === 'restartJoint')
    return null;
  return refusal('choiceNotOffered', { choice });
}

const needsReason = new Set(['asItIs', 'hold', 'answered', 'looked']);

/** `deviation.settled` (R1–R9, R11). */
export function decideSettled(state: WalkState, command: CommandOf<'deviation.settled'>): Result<EventBody, Refusal> {
  const { data } = command;
  const deviation = state.deviations.find((candidate) => candidate.id === data.deviation);
  if (!deviation) return err(refusal('unknownDeviation', { deviation: data.deviation }));
  if (data.renews !== undefined)
    return decideRenewed(
      state,
      command,
      deviation.settlings.map((settling) => settling.seq),
    );
  if (!settlingOpen(state, deviation)) return err(refusal('loosenedAlready'));
  const { offered } = offersFor(state, deviation);
  const acceptable = offered.includes(data.choice) || (data.choice === 'accept' && offered.includes('asItIs'));
  const reason = needsReason.has(data.choice) && data.reason.trim() === '' ? refusal('reasonMissing') : null;
  const refused = firstOf(
    acceptable ? null : refusal('choiceNotOffered', { choice: data.choice }),
    heldRefusal(command, deviation.status === 'held'),
    acceptRefusal(state, command),
    reason,
  );
  return refused ? err(refused) : ok({ type: command.type, data });
}

/** The same decision again, by the same or another supervisor, because its PIN did not hold (decision 6). */
function decideRenewed(
  state: WalkState,
  command: CommandOf<'deviation.settled'>,
  settlings: number[],
): Result<EventBody, Refusal> {
  const { data } = command;
  const refused = firstOf(
    settlings.includes(data.renews ?? -1) && data.choice === 'accept' ? null : refusal('notRenewable'),
    acceptRefusal(state, command),
  );
  return refused ? err(refused) : ok({ type: command.type, data });
}

/** `hold.set`, `hold.cleared` (R9). */
export function decideHold(
  state: WalkState,
  command: CommandOf<'hold.set' | 'hold.cleared'>,
): Result<EventBody, Refusal> {
  const deviation = state.deviations.find((candidate) => candidate.id === command.data.deviation);
  if (!deviation) return err(refusal('unknownDeviation', { deviation: command.data.deviation }));
  const hands = needsHands(state, command);
  if (hands) return err(hands);
  if (command.type === 'hold.cleared') {
    return deviation.status === 'held' ? ok({ type: command.type, data: command.data }) : err(refusal('notHeld'));
  }
  const { offered } = offersFor(state, deviation);
  const may = deviation.status === 'open' && (offered.includes('hold') || offered.includes('asItIs'));
  return may ? ok({ type: command.type, data: command.data }) : err(refusal('choiceNotOffered', { choice: 'hold' }));
}

type FastenerCommand = CommandOf<'fastener.loosened' | 'fastener.removed' | 'fastener.fitted' | 'thread.repaired'>;

const kinds = {
  'fastener.loosened': 'loosen',
  'fastener.removed': 'remove',
  'fastener.fitted': 'fit',
  'thread.repaired': 'repair',
} as const;

function handworkRefusal(command: FastenerCommand, instruction: Instruction): Refusal | null {
  switch (command.type) {
    case 'fastener.loosened':
      return instruction.kind === 'loosen' && command.data.round === instruction.round
        ? null
        : refusal('notTheInstruction');
    case 'fastener.removed': {
      const { thread, washer, hole } = command.data.looked;
      return thread && washer && hole ? null : refusal('lookedMissing');
    }
    case 'fastener.fitted':
      if (!command.data.ranIn) return refusal('notRanIn');
      if (instruction.kind !== 'fit') return refusal('notTheInstruction');
      if (command.data.part === 'same' && instruction.part === 'new') return refusal('newPartNeeded');
      return command.data.part === 'new' && instruction.stock < 1 ? refusal('noPartLeft') : null;
    case 'thread.repaired':
      return command.data.photo === '' || command.data.how.trim() === '' ? refusal('photoMissing') : null;
  }
}

/** Loosen, take out, look, fit: each only for the hole on the screen (R2, R6, R7). */
export function decideHandwork(state: WalkState, command: FastenerCommand): Result<EventBody, Refusal> {
  const hands = needsHands(state, command);
  if (hands) return err(hands);
  const instruction = instructionFor(state, command);
  if (instruction.kind !== kinds[command.type]) return err(refusal('notTheInstruction'));
  if (!('hole' in instruction) || instruction.hole !== command.data.hole) {
    const hole = 'hole' in instruction && instruction.hole ? labelOf(state.procedure, instruction.hole) : '';
    return err(refusal('notTheInstruction', { hole }));
  }
  const refused = handworkRefusal(command, instruction);
  return refused ? err(refused) : ok({ type: command.type, data: command.data } as EventBody);
}
