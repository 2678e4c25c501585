import { sql } from 'drizzle-orm';
import { foreignKey, index, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import { moment, ref, rowId, shopId, whole, words } from '../columns';
import { shopIsolation } from '../policies';
import { walks } from './walks';

/**
 * Issued proofs. `jws` is made once (decision 16) and a trigger refuses to change it; a note, a doubt or a correction is
 * a new `issue` of the same number. The columns beside it are for searching.
 */
export const proofs = pgTable(
  'proofs',
  {
    shopId: shopId(),
    id: rowId(),
    number: text('number').notNull(),
    issue: whole('issue').notNull(),
    state: text('state', { enum: ['issued', 'superseded', 'revoked', 'inDoubt'] }).notNull(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    headHash: text('head_hash').notNull(),
    issuedAt: moment('issued_at').notNull(),
    issuedBy: ref('issued_by').notNull(),
    jws: text('jws').notNull(),
    fingerprint: text('fingerprint').notNull(),
    publicToken: text('public_token').notNull(),
    revokedAt: moment('revoked_at'),
    revokedReason: text('revoked_reason'),
    jobNumber: words('job_number'),
    customer: words('customer'),
    engineSerial: words('engine_serial'),
    vin: words('vin'),
    claim: words('claim'),
    procedureCode: words('procedure_code'),
    search: text('search').generatedAlwaysAs(
      sql`lower(number || ' ' || job_number || ' ' || customer || ' ' || engine_serial || ' ' || vin || ' ' || claim || ' ' || procedure_code)`,
    ),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('proofs_number').on(t.shopId, t.number, t.issue),
    uniqueIndex('proofs_token').on(t.shopId, t.publicToken),
    index('proofs_walk').on(t.shopId, t.walkId),
    index('proofs_newest').on(t.shopId, t.issuedAt),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);

/**
 * The shop's own chain over its finished walks (insert-only, decision 16): one line when the last confirmation of a walk
 * is in. `text` is the RFC 8785 text of the line, `hash` its SHA-256, `sig` a detached JWS by the shop.
 */
export const ledger = pgTable(
  'ledger',
  {
    shopId: shopId(),
    seq: whole('seq').notNull(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    headHash: text('head_hash').notNull(),
    prev: text('prev').notNull(),
    text: text('text').notNull(),
    hash: text('hash').notNull(),
    sig: text('sig').notNull(),
    at: moment('at').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.seq] }),
    uniqueIndex('ledger_head').on(t.shopId, t.walkId, t.headHash),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);
