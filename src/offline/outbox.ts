import type { Receipt } from '@shared/contracts/sync.contract';
import type { SignedEvent } from '@shared/record/envelope';
import { rowOf, rowsOf, type TabletDatabase } from './database';
import type { Blocked, EventRow, HeadRow, OutboxRow, ReceiptRow, StandingRow } from './rows';

/** One walk's events that the server has not confirmed, in order. */
export interface WalkBacklog {
  walk: string;
  branch: number;
  events: { seq: number; size: number }[];
  blocked: Blocked | null;
}

/** A batch as it is sent. */
export interface Batch {
  branch: number;
  events: SignedEvent[];
  seals: { hash: string; jwe: string }[];
}

const chainRange = (walk: string, branch: number, from: number, to: number): IDBKeyRange =>
  IDBKeyRange.bound([walk, branch, from], [walk, branch, to]);

const wholeWalk = (walk: string): IDBKeyRange => IDBKeyRange.bound([walk], [walk, []]);

/** What waits, by walk; the walk whose first waiting event is oldest in key order comes first. */
export async function readBacklog(database: TabletDatabase): Promise<WalkBacklog[]> {
  return database.read(['outbox', 'standings'], async (transaction) => {
    const rows = await rowsOf<OutboxRow>(transaction, 'outbox');
    const standings = await rowsOf<StandingRow>(transaction, 'standings');
    const blocked = new Map(standings.map((row) => [row.walk, row.blocked]));
    const chains = new Map<string, WalkBacklog>();
    for (const { walk, branch, seq, size } of rows) {
      const key = `${walk}/${branch}`;
      const chain = chains.get(key) ?? { walk, branch, events: [], blocked: blocked.get(walk) ?? null };
      chain.events.push({ seq, size });
      chains.set(key, chain);
    }
    return [...chains.values()];
  });
}

/** The events of a planned batch with their seals. */
export async function batchOf(
  database: TabletDatabase,
  { walk, branch, from, to }: { walk: string; branch: number; from: number; to: number },
): Promise<Batch> {
  return database.read(['events', 'outbox'], async (transaction) => {
    const range = chainRange(walk, branch, from, to);
    const events = await rowsOf<EventRow>(transaction, 'events', range);
    const waiting = await rowsOf<OutboxRow>(transaction, 'outbox', range);
    return {
      branch,
      events: events.map(({ text, hash, sig }) => ({ text, hash, sig })),
      seals: waiting.flatMap(({ seal }) => (seal ? [seal] : [])),
    };
  });
}

async function standingOf(transaction: IDBTransaction, walk: string, branch: number): Promise<StandingRow> {
  const kept = await rowOf<StandingRow>(transaction, 'standings', walk);
  return kept ?? { walk, branch, confirmed: 0, blocked: null, sentAt: null, forked: false };
}

const refusedBy = ({ quarantined }: Receipt, at: string): Blocked | null => {
  const [first] = [...quarantined].sort((a, b) => a.seq - b.seq);
  return first ? { code: first.code, message: first.message, seq: first.seq, at } : null;
};

/** What a receipt came to. `grown`: the server holds events after ours that this tablet does not know. */
export type ReceiptFit = 'fits' | 'grown' | 'mismatch';

async function fitOf(
  transaction: IDBTransaction,
  { walk, branch }: SentBatch,
  { next, hash }: Receipt,
): Promise<ReceiptFit> {
  if (next === 0) return 'fits';
  const last = await rowOf<EventRow>(transaction, 'events', [walk, branch, next - 1]);
  if (!last) return 'grown';
  return last.hash === hash ? 'fits' : 'mismatch';
}

/** The batch a receipt answers. */
export interface SentBatch {
  walk: string;
  branch: number;
  to: number;
}

/**
 * Takes the server's word. Only what the receipt says is stored leaves the outbox, and only if its hash is ours (I2,
 * I5); where the office has already written on, at most what this batch held. A refused event blocks its walk and stays.
 * With `mismatch` the walk is blocked and nothing is removed.
 */
export async function applyReceipt(
  database: TabletDatabase,
  sent: SentBatch,
  receipt: Receipt,
  at: string,
): Promise<ReceiptFit> {
  const { walk, branch, to } = sent;
  return database.write(['events', 'outbox', 'standings', 'receipts'], async (transaction) => {
    const standing = await standingOf(transaction, walk, branch);
    const fit = await fitOf(transaction, sent, receipt);
    if (fit === 'mismatch') {
      const blocked: Blocked = { code: 'receipt.mismatch', message: '', seq: receipt.next, at };
      transaction.objectStore('standings').put({ ...standing, blocked });
      return fit;
    }
    const blocked = refusedBy(receipt, at);
    const next = fit === 'fits' ? receipt.next : (blocked?.seq ?? to + 1);
    if (next > 0) transaction.objectStore('outbox').delete(chainRange(walk, branch, 0, next - 1));
    const row: ReceiptRow = { walk, branch, next: receipt.next, hash: receipt.hash, receivedAt: at };
    transaction.objectStore('receipts').put(row);
    const confirmed = Math.max(standing.confirmed, next);
    const forked = standing.forked || receipt.forked;
    transaction.objectStore('standings').put({ ...standing, confirmed, blocked, sentAt: at, forked });
    return fit;
  });
}

/** Parks a walk until somebody looks at it. Its events stay where they are (I5, I6). */
export async function blockWalk(
  database: TabletDatabase,
  walk: string,
  branch: number,
  blocked: Blocked,
): Promise<void> {
  await database.write(['standings'], async (transaction) => {
    const standing = await standingOf(transaction, walk, branch);
    transaction.objectStore('standings').put({ ...standing, blocked });
  });
}

/** A person asked for another try: every parked walk may be sent again. */
export async function unblockAll(database: TabletDatabase): Promise<void> {
  await database.write(['standings', 'blobs'], async (transaction) => {
    for (const row of await rowsOf<StandingRow>(transaction, 'standings')) {
      if (row.blocked) transaction.objectStore('standings').put({ ...row, blocked: null });
    }
    for (const blob of await rowsOf<{ refused: string | null }>(transaction, 'blobs')) {
      if (blob.refused) transaction.objectStore('blobs').put({ ...blob, refused: null });
    }
  });
}

const isOwn = (row: EventRow, tablet: string): boolean =>
  (JSON.parse(row.text) as { tablet?: unknown }).tablet === tablet;

async function queueAgain(
  transaction: IDBTransaction,
  walk: string,
  { tablet, from }: { tablet: string; from: number },
): Promise<void> {
  const rows = await rowsOf<EventRow>(transaction, 'events', wholeWalk(walk));
  for (const row of rows) {
    if (row.seq < from || !isOwn(row, tablet)) continue;
    const key = [row.walk, row.branch, row.seq];
    if (await rowOf(transaction, 'outbox', key)) continue;
    const { branch, seq, hash, text, sig } = row;
    const again: OutboxRow = { walk, branch, seq, hash, size: 2 * (text.length + sig.length), seal: null };
    transaction.objectStore('outbox').put(again);
  }
}

/**
 * The server holds less than it once confirmed (an older backup, a lost reply): what it lacks goes back into the outbox.
 * Seals that were already delivered are gone; the server will ask for those signatures again.
 */
export async function resendFrom(database: TabletDatabase, walk: string, from: number, tablet: string): Promise<void> {
  await database.write(['events', 'outbox', 'standings'], async (transaction) => {
    await queueAgain(transaction, walk, { tablet, from });
    const standing = await rowOf<StandingRow>(transaction, 'standings', walk);
    if (standing) transaction.objectStore('standings').put({ ...standing, confirmed: from });
  });
}

/** The server's epoch changed (decision 9): everything this tablet wrote is offered again; what it has is a no-op. */
export async function resendAll(database: TabletDatabase, tablet: string): Promise<void> {
  await database.write(['events', 'outbox', 'standings', 'heads', 'blobs'], async (transaction) => {
    for (const head of await rowsOf<HeadRow>(transaction, 'heads')) {
      await queueAgain(transaction, head.walk, { tablet, from: 0 });
      const standing = await standingOf(transaction, head.walk, head.branch);
      transaction.objectStore('standings').put({ ...standing, confirmed: 0 });
    }
    for (const blob of await rowsOf<object>(transaction, 'blobs')) {
      transaction.objectStore('blobs').put({ ...blob, waiting: 1 });
    }
  });
}
