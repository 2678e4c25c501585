import type { Deviation } from '@shared/walk/deviation';
import type { Choice } from '@shared/walk/events';
import type { Offers } from '@shared/walk/offers';

/** What may be chosen about a deviation, and two ways that are no decision: typed wrong, and no longer held. */
export type SettleId = Choice | 'typedWrong' | 'withdraw';

/** Lists of usual reasons. */
export type ReasonKind = 'accept' | 'asItIs' | 'hold' | 'answered' | 'looked' | 'typed';

/** From which list a choice asks for a reason first; null where it needs none. */
export function reasonKind(id: SettleId): ReasonKind | null {
  if (id === 'typedWrong') return 'typed';
  return id === 'accept' || id === 'asItIs' || id === 'hold' || id === 'answered' || id === 'looked' ? id : null;
}

/** A held deviation is decided by a supervisor: accept, renew, or take the hold back (R9). */
const whileHeld = new Set<SettleId>(['accept', 'restart', 'replace', 'restartJoint']);

/** *Ask a supervisor* also leads to holding it where none is there: one choice of the list, not two (sketch 3). */
export const mayHold = (deviation: Deviation, offers: Offers): boolean =>
  deviation.status === 'open' && offers.offered.includes('accept') && offers.offered.includes('hold');

/** Ids in the order of the list. */
export function offeredIds(deviation: Deviation, offers: Offers): SettleId[] {
  const order: SettleId[] = offers.offered.filter((id) => id !== 'hold' || !mayHold(deviation, offers));
  // Whoever may look at it and leave it may also have it accepted on the spot (R8).
  if (order.includes('asItIs') && !order.includes('accept')) order.push('accept');
  if (deviation.status === 'held') return [...order.filter((id) => whileHeld.has(id)), 'withdraw'];
  return offers.mayVoid ? [...order, 'typedWrong'] : order;
}
