import { rowsOf, type TabletDatabase } from './database';
import type { BlobRow, HeadRow, OutboxRow, StandingRow } from './rows';

/** How long a walk that is over and wholly confirmed stays on the tablet (decision 8). */
export const KEEP_DAYS = 60;
const DAY_MS = 86_400_000;
const CHAINED = ['events', 'receipts'] as const;

interface Kept {
  heads: HeadRow[];
  standings: StandingRow[];
  outbox: OutboxRow[];
  blobs: BlobRow[];
}

/**
 * Walks that may leave the tablet: over for the shop, confirmed to the last event and file, and untouched for 60 days.
 * Anything in doubt stays (I5).
 */
export function walksToPrune(kept: Kept, isOver: (walk: string) => boolean, now: number): string[] {
  const standing = new Map(kept.standings.map((row) => [row.walk, row]));
  const waiting = new Set([
    ...kept.outbox.map(({ walk }) => walk),
    ...kept.blobs.filter((blob) => blob.waiting === 1).map(({ walk }) => walk),
  ]);
  return kept.heads
    .filter(({ walk, next, lastAt }) => {
      const row = standing.get(walk);
      const confirmed = row?.confirmed === next && row.blocked === null && !row.forked;
      const touched = Math.max(Date.parse(lastAt), Date.parse(row?.sentAt ?? lastAt));
      return confirmed && !waiting.has(walk) && isOver(walk) && now - touched > KEEP_DAYS * DAY_MS;
    })
    .map(({ walk }) => walk);
}

/** Clears away what has had its time. Returns the walks that left. */
export async function pruneWalks(
  database: TabletDatabase,
  isOver: (walk: string) => boolean,
  now: number,
): Promise<string[]> {
  const stores = ['heads', 'standings', 'outbox', 'blobs', ...CHAINED] as const;
  return database.write(stores, async (transaction) => {
    const kept: Kept = {
      heads: await rowsOf<HeadRow>(transaction, 'heads'),
      standings: await rowsOf<StandingRow>(transaction, 'standings'),
      outbox: await rowsOf<OutboxRow>(transaction, 'outbox'),
      blobs: await rowsOf<BlobRow>(transaction, 'blobs'),
    };
    const leaving = walksToPrune(kept, isOver, now);
    for (const walk of leaving) {
      for (const store of CHAINED) transaction.objectStore(store).delete(IDBKeyRange.bound([walk], [walk, []]));
      for (const store of ['heads', 'standings']) transaction.objectStore(store).delete(walk);
    }
    for (const blob of kept.blobs) {
      if (leaving.includes(blob.walk)) transaction.objectStore('blobs').delete(blob.sha256);
    }
    return leaving;
  });
}
