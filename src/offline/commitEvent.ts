import { utf8 } from '@shared/record/bytes';
import type { SignedEvent } from '@shared/record/envelope';
import { rowOf, type TabletDatabase } from './database';
import { BALLAST_ID } from './ballast';
import type { BlobRow, DocumentRow, EventRow, HeadRow, OutboxRow, StandingRow } from './rows';
import { StorageError } from './storageError';
import type { NewBlob } from './walkAct';

/** Everything that is saved together with one event: all of it or nothing. */
export interface EventCommit {
  head: HeadRow;
  /** Hash the stored head must still have; null for the first event of a walk. */
  expected: string | null;
  event: SignedEvent;
  seal: OutboxRow['seal'];
  blobs: readonly NewBlob[];
  at: string;
  /** Only with the first event. */
  document: DocumentRow | null;
}

const STORES = ['events', 'heads', 'outbox', 'blobs', 'documents', 'standings'] as const;

const standingOf = (head: HeadRow): StandingRow => ({
  walk: head.walk,
  branch: head.branch,
  confirmed: 0,
  blocked: null,
  sentAt: null,
  forked: false,
});

const sizeOnWire = (event: SignedEvent, seal: OutboxRow['seal']): number =>
  utf8(JSON.stringify(event)).length + (seal ? seal.jwe.length + 100 : 0);

function putAll(transaction: IDBTransaction, commit: EventCommit): void {
  const { head, event, seal, at } = commit;
  const place = { walk: head.walk, branch: head.branch, seq: head.next - 1 };
  const row: EventRow = { ...place, ...event };
  const waiting: OutboxRow = { ...place, hash: event.hash, size: sizeOnWire(event, seal), seal };
  // `add`, not `put`: an event that is there already is never written over.
  transaction.objectStore('events').add(row);
  transaction.objectStore('outbox').add(waiting);
  transaction.objectStore('heads').put(head);
  for (const blob of commit.blobs) {
    const held: BlobRow = { ...blob, walk: head.walk, waiting: 1, refused: null, at };
    transaction.objectStore('blobs').put(held);
  }
  if (!commit.document) return;
  transaction.objectStore('documents').put(commit.document);
  transaction.objectStore('standings').put(standingOf(head));
}

const writeOnce = (database: TabletDatabase, commit: EventCommit): Promise<void> =>
  database.write(STORES, async (transaction) => {
    const stored = await rowOf<HeadRow>(transaction, 'heads', commit.head.walk);
    // Web Locks keep a second writer away; this holds where a browser has none, or another tab broke in (fault 12).
    if ((stored?.hash ?? null) !== commit.expected) throw new StorageError('storage.headMoved');
    putAll(transaction, commit);
  });

const releaseBallast = (database: TabletDatabase): Promise<boolean> =>
  database.write(['ballast'], async (transaction) => {
    const held = await rowOf(transaction, 'ballast', BALLAST_ID);
    transaction.objectStore('ballast').delete(BALLAST_ID);
    return held !== undefined;
  });

/**
 * Saves an event in one strict transaction; resolves once it is committed. On a full disk the kept space is given to a
 * reading, but not to a photo, which can wait (fault 13). Throws `StorageError`; then nothing was written, or, after
 * `storage.lost`, it has to be looked up whether it was.
 */
export async function commitEvent(database: TabletDatabase, commit: EventCommit): Promise<{ ballastUsed: boolean }> {
  try {
    await writeOnce(database, commit);
    return { ballastUsed: false };
  } catch (error) {
    const full = error instanceof StorageError && error.code === 'storage.full';
    if (!full || commit.blobs.length > 0 || !(await releaseBallast(database))) throw error;
    await writeOnce(database, commit);
    return { ballastUsed: true };
  }
}
