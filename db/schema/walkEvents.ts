import { doublePrecision, foreignKey, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import { big, bytes, json, moment, ref, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';
import { walks } from './walks';

/**
 * The branches of a walk. Branch 0 is the first chain; a fork or a forced takeover begins the next one on the event
 * `fromSeq` of branch `fromBranch` (none: a second first event). `reservedFor` is the tablet a takeover was granted to.
 */
export const walkBranches = pgTable(
  'walk_branches',
  {
    shopId: shopId(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    fromBranch: whole('from_branch'),
    fromSeq: whole('from_seq').notNull().default(-1),
    fromHash: text('from_hash').notNull(),
    how: text('how', { enum: ['first', 'fork', 'takeOver'] }).notNull(),
    reservedFor: text('reserved_for'),
    openedAt: moment('opened_at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.branch] }),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);

/**
 * The chain (insert-only). `bytes` is the canonical text as signed; every other column is read from it, but `branch`
 * (where it stands, which differs from the text's branch after a fork), `receivedAt` and `flags` (what the server
 * noticed: a jump of the clock, facts that differ from its own history, a person who had left).
 */
export const walkEvents = pgTable(
  'walk_events',
  {
    shopId: shopId(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    seq: whole('seq').notNull(),
    hash: text('hash').notNull(),
    prev: text('prev').notNull(),
    bytes: bytes('bytes').notNull(),
    sig: text('sig').notNull(),
    type: text('type').notNull(),
    byPerson: ref('by_person').notNull(),
    tablet: text('tablet').notNull(),
    at: moment('at').notNull(),
    mono: doublePrecision('mono').notNull(),
    boot: text('boot').notNull(),
    known: big('known').notNull(),
    body: json<Record<string, unknown>>('body').notNull(),
    flags: json<string[]>('flags').notNull().default([]),
    receivedAt: moment('received_at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.branch, t.seq] }),
    uniqueIndex('walk_events_hash').on(t.shopId, t.walkId, t.hash),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);

/** Which branch of a forked walk stands (insert-only, decision 5). */
export const branchChoices = pgTable(
  'branch_choices',
  {
    shopId: shopId(),
    walkId: ref('walk_id').notNull(),
    nth: whole('nth').notNull(),
    branch: whole('branch').notNull(),
    /** How far each branch went when it was chosen: what comes beyond that has to be chosen about again. */
    heads: json<Record<string, number>>('heads').notNull().default({}),
    byPerson: ref('by_person').notNull(),
    reason: text('reason').notNull(),
    at: moment('at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.nth] }),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);

/** Events the rules refused: kept whole, never appended (insert-only; I5). The walk may not exist. */
export const quarantinedEvents = pgTable(
  'quarantined_events',
  {
    shopId: shopId(),
    hash: text('hash').notNull(),
    walkId: ref('walk_id').notNull(),
    seq: whole('seq').notNull(),
    prev: text('prev').notNull(),
    bytes: bytes('bytes').notNull(),
    sig: text('sig').notNull(),
    tablet: text('tablet').notNull(),
    code: text('code').notNull(),
    details: json<Record<string, unknown>>('details').notNull().default({}),
    receivedAt: moment('received_at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.hash] }),
    uniqueIndex('quarantined_events_walk').on(t.shopId, t.walkId, t.seq, t.hash),
    shopIsolation(),
  ],
);

/** Somebody looked at a refused event (insert-only). */
export const quarantineSettlings = pgTable(
  'quarantine_settlings',
  {
    shopId: shopId(),
    hash: text('hash').notNull(),
    byPerson: ref('by_person').notNull(),
    reason: text('reason').notNull(),
    at: moment('at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.hash] }),
    foreignKey({ columns: [t.shopId, t.hash], foreignColumns: [quarantinedEvents.shopId, quarantinedEvents.hash] }),
    shopIsolation(),
  ],
);
