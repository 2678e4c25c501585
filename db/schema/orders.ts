import { foreignKey, index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import type { Order } from '@shared/contracts/confirmation.contract';
import { changed, moment, ref, rowId, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';
import { walks } from './walks';

/** Orders from the office (decision 4), shop-signed; the tablet obeys by writing the event named. */
export const orders = pgTable(
  'orders',
  {
    shopId: shopId(),
    id: rowId(),
    walkId: ref('walk_id').notNull(),
    kind: text('kind').$type<Order['kind']>().notNull(),
    deviation: text('deviation'),
    choice: text('choice'),
    pass: text('pass'),
    branch: whole('branch'),
    reason: text('reason').notNull(),
    byPerson: ref('by_person').notNull(),
    at: moment('at').notNull(),
    jws: text('jws').notNull(),
    state: text('state', { enum: ['open', 'obeyed', 'withdrawn'] }).notNull(),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index('orders_walk').on(t.shopId, t.walkId),
    index('orders_changed').on(t.shopId, t.changed),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);
