import { sql } from 'drizzle-orm';
import { index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { json, moment, rowId, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';

/** Work to be done after a commit (decision 15): written in the same transaction as its cause. */
export const outbox = pgTable(
  'outbox',
  {
    shopId: shopId(),
    id: rowId(),
    kind: text('kind').notNull(),
    payload: json<Record<string, unknown>>('payload').notNull(),
    createdAt: moment('created_at').notNull(),
    nextAt: moment('next_at').notNull(),
    attempts: whole('attempts').notNull().default(0),
    doneAt: moment('done_at'),
    error: text('error'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index('outbox_waiting')
      .on(t.shopId, t.nextAt)
      .where(sql`done_at is null`),
    shopIsolation(),
  ],
);
