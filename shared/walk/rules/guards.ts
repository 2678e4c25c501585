import { hasRight, type Right } from '../../people/roles';
import type { WalkCommand } from '../commands';
import { wasInterrupted, workInstruction, type Instruction, type Now } from '../instruction';
import { refusal, type Refusal } from '../refusal';
import type { WalkState } from '../state';

/** The command of one event name. */
export type CommandOf<T extends WalkCommand['type']> = Extract<WalkCommand, { type: T }>;

/** The moment a command was made. */
export const nowOf = (command: WalkCommand): Now => ({ at: command.at, mono: command.mono, boot: command.boot });

/** The work instruction the command was made against. */
export const instructionFor = (state: WalkState, command: WalkCommand): Instruction =>
  workInstruction(state, nowOf(command));

const anytime = new Set<WalkCommand['type']>(['note.added', 'photo.added', 'walk.voided', 'walk.stopped']);
const whilePaused = new Set<WalkCommand['type']>([
  'walk.resumed',
  'hands.changed',
  'part.taken',
  'part.corrected',
  'reading.elsewhere',
]);
const whileSigned = new Set<WalkCommand['type']>([
  'walk.signed',
  'walk.countersigned',
  'walk.sentBack',
  'walk.released',
]);
const byOffice = new Set<WalkCommand['type']>(['walk.countersigned', 'walk.sentBack', 'walk.voided', 'walk.takenOver']);

/** Whether this is the same decision again, because its PIN was refused or disowned (decision 6). */
export const isRenewal = (command: WalkCommand): boolean => {
  if (command.type === 'wrench.taken') return command.data.override?.renews !== undefined;
  return 'renews' in command.data && command.data.renews !== undefined;
};

function officeGuard(state: WalkState, command: WalkCommand): Refusal | null {
  if (!byOffice.has(command.type)) return refusal('notTheWriter');
  if (command.type === 'walk.takenOver') return null;
  return state.writer === 'shop' ? null : refusal('notWithTheShop');
}

function tabletGuard(state: WalkState, command: WalkCommand): Refusal | null {
  if (state.writer === 'shop') return refusal('withTheShop');
  if (command.type === 'walk.takenOver') return refusal('notTheWriter');
  if (command.tablet !== state.tablet) return refusal('notTheWriter');
  if (anytime.has(command.type) || isRenewal(command)) return null;
  if (state.stopped) return refusal('stopped', { reason: state.stopped.reason });
  if (state.paused && !whilePaused.has(command.type)) return refusal('paused', { cause: state.paused });
  const signed = state.signatures.some((signature) => signature.stands);
  if (signed && !whileSigned.has(command.type)) return refusal('signedAlready');
  const asleep = wasInterrupted(state, command.boot) || state.mustLook.length > 0;
  return asleep && command.type !== 'walk.resumed' ? refusal('interrupted') : null;
}

/** What stands in the way of any command: who writes, whether the walk stands still, whether it slept (W9, decision 4). */
export function guard(state: WalkState, command: WalkCommand): Refusal | null {
  if (!state.opened) return command.type === 'walk.opened' ? null : refusal('notOpened');
  if (command.type === 'walk.opened') return refusal('alreadyOpened');
  if (state.voided) return refusal('voided');
  return command.tablet === 'office' ? officeGuard(state, command) : tabletGuard(state, command);
}

/** Refuses where the roles do not give the right. */
export const needsRight = (command: WalkCommand, right: Right): Refusal | null =>
  hasRight(command.roles, right) ? null : refusal('noRight', { right });

/** P1: nobody accepts, skips, overrides or countersigns in a walk in which they took a reading; P2 excepts a shop of one. */
export function needsOtherHands(state: WalkState, command: WalkCommand): Refusal | null {
  const own =
    state.everHands.includes(command.by) || state.hands.pulls === command.by || state.hands.records === command.by;
  return own && !state.opened?.policy.shopOfOne ? refusal('ownReadings') : null;
}

/** A decision that only a supervisor takes: right, other hands, a sealed PIN or an order from his own device. */
export function needsSupervisor(
  state: WalkState,
  command: WalkCommand,
  right: Right,
  proof: { seal?: string | undefined; order?: string | undefined },
): Refusal | null {
  const sealed = proof.seal !== undefined || proof.order !== undefined;
  return needsRight(command, right) ?? needsOtherHands(state, command) ?? (sealed ? null : refusal('sealMissing'));
}

/** The person at the tablet pulls or records (W1, W11). */
export function needsHands(state: WalkState, command: WalkCommand): Refusal | null {
  const { pulls, records } = state.hands;
  if (command.by !== pulls && command.by !== records) return refusal('notInHands');
  return needsRight(command, 'walk');
}

/** The first refusal of several. */
export const firstOf = (...refusals: (Refusal | null)[]): Refusal | null =>
  refusals.find((found) => found !== null) ?? null;
