import { foreignKey, index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { big, moment, ref, rowId, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';
import { walkEvents } from './walkEvents';

/**
 * What the shop says about sealed PINs (insert-only, decision 6). `nth` 0 is the check of the PIN, 1 a later *not mine*.
 * The last one counts.
 */
export const confirmations = pgTable(
  'confirmations',
  {
    shopId: shopId(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    seq: whole('seq').notNull(),
    nth: whole('nth').notNull(),
    hash: text('hash').notNull(),
    personId: ref('person_id').notNull(),
    meaning: text('meaning').notNull(),
    result: text('result', { enum: ['accepted', 'refused'] }).notNull(),
    reason: text('reason'),
    at: moment('at').notNull(),
    jws: text('jws').notNull(),
    changed: big('changed').notNull().default(0),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.branch, t.seq, t.nth] }),
    index('confirmations_changed').on(t.shopId, t.changed),
    foreignKey({
      columns: [t.shopId, t.walkId, t.branch, t.seq],
      foreignColumns: [walkEvents.shopId, walkEvents.walkId, walkEvents.branch, walkEvents.seq],
    }),
    shopIsolation(),
  ],
);

/** Uses of a PIN to accept, skip, override or countersign, listed to their owner (P3). */
export const pinUses = pgTable(
  'pin_uses',
  {
    shopId: shopId(),
    id: rowId(),
    personId: ref('person_id').notNull(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    seq: whole('seq').notNull(),
    meaning: text('meaning').notNull(),
    at: moment('at').notNull(),
    tablet: text('tablet').notNull(),
    answer: text('answer', { enum: ['mine', 'notMine'] }),
    answeredAt: moment('answered_at'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index('pin_uses_person').on(t.shopId, t.personId, t.at),
    foreignKey({
      columns: [t.shopId, t.walkId, t.branch, t.seq],
      foreignColumns: [walkEvents.shopId, walkEvents.walkId, walkEvents.branch, walkEvents.seq],
    }),
    shopIsolation(),
  ],
);
