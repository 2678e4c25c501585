import { pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { moment, ref, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';

/** Failed sign-ins in a row of one person: the wait grows with them and never locks a shop out. */
export const signInFailures = pgTable(
  'sign_in_failures',
  {
    shopId: shopId(),
    personId: ref('person_id').notNull(),
    count: whole('count').notNull(),
    waitUntil: moment('wait_until').notNull(),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.personId] }), shopIsolation()],
);

/** Wrong PINs in a row of one person; `where` is a tablet's id or `office`, so that one tablet blocks no other. */
export const pinFailures = pgTable(
  'pin_failures',
  {
    shopId: shopId(),
    personId: ref('person_id').notNull(),
    place: text('place').notNull(),
    count: whole('count').notNull(),
    waitUntil: moment('wait_until').notNull(),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.personId, t.place] }), shopIsolation()],
);
