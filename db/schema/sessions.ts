import { foreignKey, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import { moment, ref, rowId, shopId } from '../columns';
import { shopIsolation } from '../policies';
import { people } from './people';

/** An office session: the cookie holds a token, this row its SHA-256. */
export const sessions = pgTable(
  'sessions',
  {
    shopId: shopId(),
    id: rowId(),
    tokenHash: text('token_hash').notNull(),
    personId: ref('person_id').notNull(),
    csrf: text('csrf').notNull(),
    createdAt: moment('created_at').notNull(),
    expiresAt: moment('expires_at').notNull(),
    endedAt: moment('ended_at'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('sessions_token').on(t.shopId, t.tokenHash),
    foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
    shopIsolation(),
  ],
);
