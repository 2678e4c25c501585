import { foreignKey, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import { big, changed, json, moment, ref, rowId, shopId } from '../columns';
import { shopIsolation } from '../policies';
import { shops } from './shops';

const state = () => text('state', { enum: ['inService', 'quarantined', 'away', 'retired'] });

/** A wrench of the crib with its latest evaluated calibration: the snapshot that `wrench.taken` copies (J7). */
export const wrenches = pgTable(
  'wrenches',
  {
    shopId: shopId(),
    id: rowId(),
    tag: text('tag').notNull(),
    snapshot: json<WrenchSnapshot>('snapshot').notNull(),
    state: state().notNull().default('inService'),
    changedAt: moment('changed_at').notNull().defaultNow(),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('wrenches_tag').on(t.shopId, t.tag),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    shopIsolation(),
  ],
);

/** What a wrench was from a catalogue cursor on; filled by a trigger, never changed (decision 1). */
export const wrenchHistory = pgTable(
  'wrench_history',
  {
    shopId: shopId(),
    wrenchId: ref('wrench_id').notNull(),
    since: big('since').notNull(),
    snapshot: json<WrenchSnapshot>('snapshot').notNull(),
    state: state().notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.wrenchId, t.since] }),
    foreignKey({ columns: [t.shopId, t.wrenchId], foreignColumns: [wrenches.shopId, wrenches.id] }),
    shopIsolation(),
  ],
);
