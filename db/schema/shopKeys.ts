import { foreignKey, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import type { PublicJwk } from '@shared/record/crypto';
import { json, moment, shopId } from '../columns';
import { shopIsolation } from '../policies';
import { shops } from './shops';

/**
 * A shop's ES256 signing and ECDH-ES sealing keys. The private part is a JWE to a key derived from APP_SECRET. Retired
 * keys stay: what they signed has to verify for ever.
 */
export const shopKeys = pgTable(
  'shop_keys',
  {
    shopId: shopId(),
    kid: text('kid').notNull(),
    purpose: text('purpose', { enum: ['signing', 'sealing'] }).notNull(),
    publicJwk: json<PublicJwk>('public_jwk').notNull(),
    privateSealed: text('private_sealed').notNull(),
    state: text('state', { enum: ['active', 'retired'] })
      .notNull()
      .default('active'),
    createdAt: moment('created_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.kid] }),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    shopIsolation(),
  ],
);
