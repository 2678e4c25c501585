import type { WalkState } from '@shared/walk/state';
import type { BatchEvent } from './parseBatch';
import { sealOf } from './sealOf';
import type { ConfirmationRecord } from './seals.repository';

/** How the sealed PINs of a chain stand: by sequence number, those that nobody has answered yet and those refused. */
export interface SealStatus {
  pending: number[];
  refused: number[];
}

type SealedEvent = Pick<BatchEvent, 'event'> & { hash: string };

/** A signature that no longer stands (sent back, renewed) needs no PIN any more. */
const stillCounts = (state: WalkState, { event }: SealedEvent): boolean =>
  (event.type !== 'walk.signed' && event.type !== 'walk.countersigned') ||
  state.signatures.some((sign) => sign.seq === event.seq && sign.stands);

/**
 * Looks at every seal of a chain: one that another event renews is settled by that one, and of several confirmations the
 * last counts (a PIN may be disowned later).
 */
export const sealStatus = (
  state: WalkState,
  events: readonly SealedEvent[],
  confirmations: readonly Pick<ConfirmationRecord, 'hash' | 'result' | 'nth'>[],
): SealStatus => {
  const carried = events.flatMap((event) => {
    const seal = sealOf(event.event);
    return seal ? [{ event, seal }] : [];
  });
  const renewed = new Set(carried.map(({ seal }) => seal.renews));
  const status: SealStatus = { pending: [], refused: [] };
  for (const { event } of carried) {
    if (renewed.has(event.event.seq) || !stillCounts(state, event)) continue;
    const last = confirmations.filter(({ hash }) => hash === event.hash).sort((a, b) => b.nth - a.nth)[0];
    if (!last) status.pending.push(event.event.seq);
    else if (last.result === 'refused') status.refused.push(event.event.seq);
  }
  return status;
};
