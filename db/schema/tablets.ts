import { foreignKey, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { PublicJwk } from '@shared/record/crypto';
import { json, moment, ref, rowId, shopId, words } from '../columns';
import { shopIsolation } from '../policies';
import { shops } from './shops';

/** Last word of a tablet about what waits on it (I6). */
export interface TabletReportRow {
  at: string;
  waiting: number;
  refused: number;
  stored: number;
  lost: string[];
  version: string;
}

/** An enrolled device. Its key never changes; a revoked one stays, because what it signed has to verify (fault 17). */
export const tablets = pgTable(
  'tablets',
  {
    shopId: shopId(),
    id: rowId(),
    name: text('name').notNull(),
    kid: text('kid').notNull(),
    publicJwk: json<PublicJwk>('public_jwk').notNull(),
    state: text('state', { enum: ['active', 'revoked'] })
      .notNull()
      .default('active'),
    enrolledAt: moment('enrolled_at').notNull(),
    seenAt: moment('seen_at'),
    revokedAt: moment('revoked_at'),
    revokedReason: words('revoked_reason'),
    report: json<TabletReportRow>('report'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('tablets_kid').on(t.shopId, t.kid),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    shopIsolation(),
  ],
);

/** One-time codes for enrolling a tablet; only their SHA-256 is kept. */
export const enrolmentCodes = pgTable(
  'enrolment_codes',
  {
    shopId: shopId(),
    id: rowId(),
    codeHash: text('code_hash').notNull(),
    note: words('note'),
    createdBy: ref('created_by'),
    createdAt: moment('created_at').notNull(),
    expiresAt: moment('expires_at').notNull(),
    usedAt: moment('used_at'),
    usedBy: ref('used_by'),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('enrolment_codes_hash').on(t.shopId, t.codeHash),
    foreignKey({ columns: [t.shopId, t.usedBy], foreignColumns: [tablets.shopId, tablets.id] }),
    shopIsolation(),
  ],
);
