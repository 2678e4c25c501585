import { foreignKey, index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import { moment, ref, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';
import { walks } from './walks';

/** Photos and files the server holds, by SHA-256; the bytes stand in the blob folder. */
export const blobs = pgTable(
  'blobs',
  {
    shopId: shopId(),
    sha256: text('sha256').notNull(),
    bytes: whole('bytes').notNull(),
    tablet: text('tablet').notNull(),
    receivedAt: moment('received_at').notNull(),
  },
  (t) => [primaryKey({ columns: [t.shopId, t.sha256] }), shopIsolation()],
);

/** Photos and files that events of a walk name: a walk is complete when all are held (fault 18). */
export const walkBlobs = pgTable(
  'walk_blobs',
  { shopId: shopId(), walkId: ref('walk_id').notNull(), sha256: text('sha256').notNull() },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.sha256] }),
    index('walk_blobs_sha256').on(t.shopId, t.sha256),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);
