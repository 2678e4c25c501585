import { pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import type { ShopSettings } from '@shared/contracts/settings.contract';
import { big, changed, json, moment, shopId, words } from '../columns';
import { ownShop, shopIsolation } from '../policies';

/** A shop. `prefix` begins its proof numbers; `epoch` changes when a backup is restored, so that tablets start afresh. */
export const shops = pgTable(
  'shops',
  {
    id: uuid('id').primaryKey(),
    name: text('name').notNull(),
    address: words('address'),
    prefix: text('prefix').notNull(),
    timeZone: text('time_zone').notNull(),
    settings: json<ShopSettings>('settings').notNull(),
    epoch: uuid('epoch').notNull().defaultRandom(),
    createdAt: moment('created_at').notNull().defaultNow(),
    changed: changed(),
  },
  () => [ownShop()],
);

/** What a shop's settings were from a catalogue cursor on; filled by a trigger, never changed. */
export const shopPolicies = pgTable(
  'shop_policies',
  { shopId: shopId(), since: big('since').notNull(), settings: json<ShopSettings>('settings').notNull() },
  (t) => [primaryKey({ columns: [t.shopId, t.since] }), shopIsolation()],
);

/** One counter per shop and purpose: `catalogue`, `ledger`, `proofs-2026` (decision 9, D3). */
export const shopCounters = pgTable(
  'shop_counters',
  { shopId: shopId(), name: text('name').notNull(), value: big('value').notNull() },
  (t) => [primaryKey({ columns: [t.shopId, t.name] }), shopIsolation()],
);
