import type { WalkRow } from '@shared/contracts/walkRow.contract';
import type { HeadRow, StandingRow } from './rows';

/** How the server's walks differ from those on this tablet. */
export interface ServerAhead {
  /** Walks here whose chain has grown at the server: the office wrote, or this tablet lost its end. */
  grown: string[];
  /** Walks of which the server holds events by this tablet that this tablet no longer has (fault 20). */
  lost: string[];
}

const OVER = new Set<WalkRow['state']>(['finished', 'voided']);

/**
 * Compares by sequence number. `writer` says whose a walk is now: of a walk that this tablet writes, nobody else can
 * have written the end.
 */
export function aheadAtServer(
  walks: readonly WalkRow[],
  heads: readonly HeadRow[],
  standings: readonly StandingRow[],
  tablet: string,
): ServerAhead {
  const headBy = new Map(heads.map((head) => [head.walk, head]));
  const standingBy = new Map(standings.map((standing) => [standing.walk, standing]));
  const ahead: ServerAhead = { grown: [], lost: [] };
  for (const row of walks) {
    const head = headBy.get(row.id);
    const mine = row.writer === tablet;
    if (!head) {
      // A finished walk leaves the tablet after its time (pruneWalks.ts): that is no loss.
      if (mine && row.next > 0 && !OVER.has(row.state)) ahead.lost.push(row.id);
      continue;
    }
    const allSent = standingBy.get(row.id)?.confirmed === head.next;
    if (row.next <= head.next || !allSent || row.forked) continue;
    ahead.grown.push(row.id);
    if (mine) ahead.lost.push(row.id);
  }
  return ahead;
}
