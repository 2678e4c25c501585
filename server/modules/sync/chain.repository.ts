import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import type { SignedEvent } from '@shared/record/envelope';
import { quarantinedEvents, walkBranches, walkEvents } from '@db/schema/walkEvents';
import type { ShopTx } from '../../tenancy/withShop';
import type { BatchEvent } from './parseBatch';

/** Where an event stands. */
export interface Place {
  branch: number;
  seq: number;
}

/** A branch of a walk and how far it goes. `next` of a branch without events of its own is the seq after its beginning. */
export interface Branch {
  branch: number;
  fromBranch: number | null;
  fromSeq: number;
  fromHash: string;
  how: 'first' | 'fork' | 'takeOver';
  next: number;
  head: string;
}

/** Lets one request after the other write a walk: of two that bring the same batch, the second finds it stored (fault 7). */
export const lockWalk = async (tx: ShopTx, walk: string): Promise<void> => {
  await tx.db.execute(sql`select pg_advisory_xact_lock(hashtextextended(${`${tx.shop} ${walk}`}, 0))`);
};

/** Where these hashes stand in the walk; a hash that is not stored is missing. */
export const placesOf = async (tx: ShopTx, walk: string, hashes: string[]): Promise<Map<string, Place>> => {
  const rows = await tx.db
    .select({ hash: walkEvents.hash, branch: walkEvents.branch, seq: walkEvents.seq })
    .from(walkEvents)
    .where(and(eq(walkEvents.shopId, tx.shop), eq(walkEvents.walkId, walk), inArray(walkEvents.hash, hashes)));
  return new Map(rows.map(({ hash, branch, seq }) => [hash, { branch, seq }]));
};

/** The walk's branches, in the order of their opening. */
export const branchesOf = async (tx: ShopTx, walk: string): Promise<Branch[]> => {
  const result = await tx.db.execute<{
    branch: number;
    from_branch: number | null;
    from_seq: number;
    from_hash: string;
    how: Branch['how'];
    next: number | null;
    head: string | null;
  }>(sql`
    select b.branch, b.from_branch, b.from_seq, b.from_hash, b.how, e.seq + 1 as next, e.hash as head
    from walk_branches b
    left join lateral (
      select seq, hash from walk_events e
      where e.shop_id = b.shop_id and e.walk_id = b.walk_id and e.branch = b.branch order by seq desc limit 1
    ) e on true
    where b.shop_id = ${tx.shop} and b.walk_id = ${walk} order by b.branch`);
  return result.rows.map((row) => ({
    branch: row.branch,
    fromBranch: row.from_branch,
    fromSeq: row.from_seq,
    fromHash: row.from_hash,
    how: row.how,
    next: row.next ?? row.from_seq + 1,
    head: row.head ?? row.from_hash,
  }));
};

/** Opens a branch. */
export const insertBranch = async (
  tx: ShopTx,
  walk: string,
  branch: Pick<Branch, 'branch' | 'fromBranch' | 'fromSeq' | 'fromHash' | 'how'>,
  openedAt: Date,
): Promise<void> => {
  await tx.db.insert(walkBranches).values({ shopId: tx.shop, walkId: walk, ...branch, openedAt });
};

/** A stored event with what the server knows of it. */
export interface StoredRow extends SignedEvent {
  branch: number;
  seq: number;
  receivedAt: Date;
  flags: string[];
}

const storedColumns = {
  bytes: walkEvents.bytes,
  hash: walkEvents.hash,
  sig: walkEvents.sig,
  branch: walkEvents.branch,
  seq: walkEvents.seq,
  receivedAt: walkEvents.receivedAt,
  flags: walkEvents.flags,
};

const toStored = ({ bytes, ...row }: Omit<StoredRow, 'text'> & { bytes: Buffer }): StoredRow => ({
  ...row,
  text: bytes.toString('utf8'),
});

/** A stretch of one branch, in order. */
export const eventsOfBranch = async (
  tx: ShopTx,
  walk: string,
  branch: number,
  upTo: number = 2 ** 31 - 1,
): Promise<StoredRow[]> => {
  const rows = await tx.db
    .select(storedColumns)
    .from(walkEvents)
    .where(
      and(
        eq(walkEvents.shopId, tx.shop),
        eq(walkEvents.walkId, walk),
        eq(walkEvents.branch, branch),
        sql`${walkEvents.seq} <= ${upTo}`,
      ),
    )
    .orderBy(asc(walkEvents.seq));
  return rows.map(toStored);
};

/** Appends events in one statement. The bytes are the truth; every other column is read from the same text. */
export const insertEvents = async (
  tx: ShopTx,
  walk: string,
  branch: number,
  events: readonly (BatchEvent & { flags: string[] })[],
  receivedAt: Date,
): Promise<void> => {
  const texts = events.map(({ signed }) => signed.text);
  const hashes = events.map(({ signed }) => signed.hash);
  const sigs = events.map(({ signed }) => signed.sig);
  const flags = events.map((event) => JSON.stringify(event.flags));
  await tx.db.execute(sql`
    insert into walk_events (shop_id, walk_id, branch, seq, hash, prev, bytes, sig, type, by_person, tablet, at, mono,
      boot, known, body, flags, received_at)
    select ${tx.shop}::uuid, ${walk}::uuid, ${branch}::int, (e.body->>'seq')::int, e.hash, e.body->>'prev',
      convert_to(e.text, 'UTF8'), e.sig, e.body->>'type', (e.body->>'by')::uuid, e.body->>'tablet',
      (e.body->>'at')::timestamptz, (e.body->>'mono')::float8, e.body->>'boot', (e.body->>'known')::bigint, e.body,
      e.flags::jsonb, ${receivedAt.toISOString()}::timestamptz
    from (
      select t.text, t.text::jsonb as body, t.hash, t.sig, t.flags
      from unnest(${sql.param(texts)}::text[], ${sql.param(hashes)}::text[], ${sql.param(sigs)}::text[],
        ${sql.param(flags)}::text[]) as t(text, hash, sig, flags)
    ) e`);
};

/** A refused event as stored. */
export type QuarantinedRow = typeof quarantinedEvents.$inferSelect;

/** Which of these hashes were refused before. */
export const quarantinedOf = async (tx: ShopTx, hashes: string[]): Promise<Map<string, QuarantinedRow>> => {
  const rows = await tx.db
    .select()
    .from(quarantinedEvents)
    .where(and(eq(quarantinedEvents.shopId, tx.shop), inArray(quarantinedEvents.hash, hashes)));
  return new Map(rows.map((row) => [row.hash, row]));
};

/** Keeps refused events whole. */
export const insertQuarantined = async (
  tx: ShopTx,
  walk: string,
  tablet: string,
  refused: readonly { event: BatchEvent; code: string; details: Record<string, unknown> }[],
  receivedAt: Date,
): Promise<void> => {
  if (refused.length === 0) return;
  const rows = refused.map(({ event: { signed, envelope }, code, details }) => ({
    shopId: tx.shop,
    hash: signed.hash,
    walkId: walk,
    seq: envelope.seq,
    prev: envelope.prev,
    bytes: Buffer.from(signed.text, 'utf8'),
    sig: signed.sig,
    tablet,
    code,
    details,
    receivedAt,
  }));
  await tx.db.insert(quarantinedEvents).values(rows).onConflictDoNothing();
};

/** The events of a walk that can carry a sealed PIN, on every branch. */
export const sealableEvents = async (tx: ShopTx, walk: string): Promise<StoredRow[]> => {
  const types = ['walk.signed', 'walk.countersigned', 'walk.sentBack', 'walk.voided', 'deviation.settled'];
  const rows = await tx.db
    .select(storedColumns)
    .from(walkEvents)
    .where(
      and(
        eq(walkEvents.shopId, tx.shop),
        eq(walkEvents.walkId, walk),
        inArray(walkEvents.type, [...types, 'wait.skipped', 'wrench.taken']),
      ),
    )
    .orderBy(asc(walkEvents.branch), asc(walkEvents.seq));
  return rows.map(toStored);
};
