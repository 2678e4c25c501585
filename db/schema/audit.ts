import { index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { json, moment, ref, rowId, shopId, words } from '../columns';
import { shopIsolation } from '../policies';

/** Who did what in the office and on tablets besides the walks themselves (insert-only). */
export const audit = pgTable(
  'audit',
  {
    shopId: shopId(),
    id: rowId(),
    at: moment('at').notNull(),
    personId: ref('person_id'),
    tablet: words('tablet'),
    action: text('action').notNull(),
    subject: words('subject'),
    details: json<Record<string, unknown>>('details').notNull().default({}),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.id] }), index('audit_at').on(t.shopId, t.at), shopIsolation()],
);
