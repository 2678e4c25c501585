import { rowsOf, type TabletDatabase } from './database';
import type { BlobRow, Blocked, HeadRow, OutboxRow, StandingRow } from './rows';

/** One walk on this tablet, for *What's on this tablet*. */
export interface WalkOnTablet {
  walk: string;
  job: string;
  joint: string;
  purpose: string;
  procedure: string;
  openedAt: string;
  lastAt: string;
  events: number;
  /** Events and files that the server has not confirmed. */
  waiting: number;
  waitingFiles: number;
  /** Files that the server refused. */
  refusedFiles: number;
  sentAt: string | null;
  blocked: Blocked | null;
  /** Two tablets walked this walk; a supervisor says which branch stands (decision 5). */
  forked: boolean;
}

/** Every walk on this tablet, the one last written first. */
export async function walksOnTablet(database: TabletDatabase): Promise<WalkOnTablet[]> {
  return database.read(['heads', 'standings', 'outbox', 'blobs'], async (transaction) => {
    const heads = await rowsOf<HeadRow>(transaction, 'heads');
    const standings = await rowsOf<StandingRow>(transaction, 'standings');
    const outbox = await rowsOf<OutboxRow>(transaction, 'outbox');
    const blobs = await rowsOf<BlobRow>(transaction, 'blobs');
    return heads
      .map((head): WalkOnTablet => {
        const { walk, job, joint, purpose, procedure, openedAt, lastAt, next } = head;
        const standing = standings.find((row) => row.walk === walk);
        const files = blobs.filter((blob) => blob.walk === walk && blob.waiting === 1);
        return {
          ...{ walk, job, joint, purpose, procedure, openedAt, lastAt },
          events: next,
          waiting: outbox.filter((row) => row.walk === walk).length,
          waitingFiles: files.length,
          refusedFiles: files.filter(({ refused }) => refused !== null).length,
          sentAt: standing?.sentAt ?? null,
          blocked: standing?.blocked ?? null,
          forked: standing?.forked ?? false,
        };
      })
      .sort((a, b) => (a.lastAt < b.lastAt ? 1 : -1));
  });
}
