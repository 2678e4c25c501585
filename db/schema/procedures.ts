import { foreignKey, index, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { changed, json, moment, ref, rowId, shopId, whole, words } from '../columns';
import { shopIsolation } from '../policies';
import { shops } from './shops';

/** A procedure: how one joint is tightened. Its content stands in its revisions. */
export const procedures = pgTable(
  'procedures',
  {
    shopId: shopId(),
    id: rowId(),
    code: text('code').notNull(),
    title: text('title').notNull(),
    engine: words('engine'),
    component: words('component'),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('procedures_code').on(t.shopId, t.code),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    shopIsolation(),
  ],
);

/**
 * A revision. Once it is no draft any more a trigger refuses every change of document and hash. `hash` is the SHA-256 of
 * the document's canonical JSON.
 */
export const procedureRevisions = pgTable(
  'procedure_revisions',
  {
    shopId: shopId(),
    procedureId: ref('procedure_id').notNull(),
    revision: whole('revision').notNull(),
    hash: text('hash').notNull(),
    document: json<ProcedureDocument>('document').notNull(),
    state: text('state', { enum: ['draft', 'approved', 'superseded', 'withdrawn'] }).notNull(),
    writtenBy: ref('written_by').notNull(),
    writtenAt: moment('written_at').notNull().defaultNow(),
    approvedBy: ref('approved_by'),
    approvedAt: moment('approved_at'),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.procedureId, t.revision] }),
    index('procedure_revisions_hash').on(t.shopId, t.hash),
    foreignKey({ columns: [t.shopId, t.procedureId], foreignColumns: [procedures.shopId, procedures.id] }),
    shopIsolation(),
  ],
);
