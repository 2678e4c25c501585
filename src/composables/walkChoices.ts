import type { OfficeWalkWhole } from '@shared/contracts/walks.contract';
import { hasRight, type Right, type Role } from '@shared/people/roles';
import type { Deviation } from '@shared/walk/deviation';
import type { Choice } from '@shared/walk/events';
import { offersFor } from '@shared/walk/offers';
import type { WalkRecord } from './walkRecord';

/** Choices about a deviation that an order may carry. */
export type OrderChoice = 'accept' | 'restart' | 'replace' | 'restartJoint' | 'asItIs' | 'goOn';

/** Something somebody at the office may decide about a walk now. */
export type WalkChoice =
  | { kind: 'countersign' | 'sendBack' | 'voidWalk' }
  /** Placed for the tablet, which obeys at its next instruction (decision 4). */
  | { kind: 'stop' | 'goOn' | 'orderVoid' }
  | { kind: 'decide'; deviation: Deviation; choices: OrderChoice[] }
  | { kind: 'skipWait'; pass: string };

/** Why nothing, or less than one might think, may be decided. */
export type WalkNoChoice = 'right' | 'ownReadings' | 'voided' | 'broken' | 'notSigned' | 'forked';

/** What may be decided, and why not more. */
export interface WalkChoices {
  choices: WalkChoice[];
  why: WalkNoChoice | null;
}

const BY_ORDER: readonly Choice[] = ['accept', 'restart', 'replace', 'restartJoint', 'asItIs', 'goOn'];
const isByOrder = (choice: Choice): choice is OrderChoice => BY_ORDER.includes(choice);

/** P1: whoever pulled or recorded judges nothing here, unless the shop is one person (P2). */
function isOwn({ state }: WalkRecord, person: string): boolean {
  const hands = [...state.everHands, state.hands.pulls, state.hands.records];
  return hands.includes(person) && !state.opened?.policy.shopOfOne;
}

/** A countersignature whose PIN was refused or called not theirs is made anew, by the same person or another. */
const needsAnew = ({ state, seals }: WalkRecord): boolean =>
  state.signatures.some(
    ({ seq, role, stands }) =>
      role === 'countersigner' &&
      stands &&
      seals.some((seal) => seal.seq === seq && seal.confirmation?.result === 'refused'),
  );

function officeChoices(
  { walk: { state } }: OfficeWalkWhole,
  record: WalkRecord,
  can: (right: Right) => boolean,
  own: boolean,
): WalkChoice[] {
  const signed = state === 'signed' || state === 'finished';
  const waits = state === 'signed' || (state === 'finished' && needsAnew(record));
  return [
    ...(waits && can('countersign') && !own ? [{ kind: 'countersign' } as const] : []),
    ...(signed && can('sendBack') && !own ? [{ kind: 'sendBack' } as const] : []),
    ...(can('voidWalk') ? [{ kind: 'voidWalk' } as const] : []),
  ];
}

function decisions({ state, view }: WalkRecord): WalkChoice[] {
  const waiting = state.deviations.filter(({ status }) => status === 'open' || status === 'held');
  const about = waiting.flatMap((deviation): WalkChoice[] => {
    const choices = offersFor(state, deviation).offered.filter(isByOrder);
    return choices.length > 0 ? [{ kind: 'decide', deviation, choices }] : [];
  });
  const { instruction } = view;
  return instruction.kind === 'wait' ? [...about, { kind: 'skipWait', pass: instruction.pass.id }] : about;
}

function tabletChoices(record: WalkRecord, can: (right: Right) => boolean, own: boolean): WalkChoice[] {
  if (!can('accept')) return [];
  return [
    ...(own ? [] : decisions(record)),
    record.state.stopped ? { kind: 'goOn' } : { kind: 'stop' },
    ...(own ? [] : [{ kind: 'orderVoid' } as const]),
  ];
}

/** What the person signed in may decide about this walk. The server decides again; this only spares the refusal. */
export function walkChoices(
  whole: OfficeWalkWhole,
  record: WalkRecord,
  person: { id: string; roles: readonly Role[] },
): WalkChoices {
  const can = (right: Right): boolean => hasRight(person.roles, right);
  const none = (why: WalkNoChoice): WalkChoices => ({ choices: [], why });
  if (!can('countersign') && !can('accept')) return none('right');
  if (record.unreadableAt !== null) return none('broken');
  if (whole.walk.state === 'voided') return none('voided');
  if (whole.walk.forked) return none('forked');
  const own = isOwn(record, person.id);
  const byOffice = whole.walk.writer === 'office';
  const choices = byOffice ? officeChoices(whole, record, can, own) : tabletChoices(record, can, own);
  return { choices, why: own ? 'ownReadings' : null };
}
