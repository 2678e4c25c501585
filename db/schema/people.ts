import { sql } from 'drizzle-orm';
import { foreignKey, index, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { Role } from '@shared/people/roles';
import { big, changed, moment, ref, rowId, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';
import { shops } from './shops';

/** A person of a shop: kept for ever, because records name them. `email` and `passwordHash` are for the office. */
export const people = pgTable(
  'people',
  {
    shopId: shopId(),
    id: rowId(),
    name: text('name').notNull(),
    email: text('email'),
    passwordHash: text('password_hash'),
    roles: text('roles').array().$type<Role[]>().notNull(),
    state: text('state', { enum: ['active', 'left'] })
      .notNull()
      .default('active'),
    leftAt: moment('left_at'),
    /** Version of the PIN in force; 0 while none is set. */
    pinVersion: whole('pin_version').notNull().default(0),
    createdAt: moment('created_at').notNull().defaultNow(),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    uniqueIndex('people_email').on(t.shopId, sql`lower(${t.email})`),
    // For shops_for_email alone, the one question that is asked before the shop is known.
    index('people_by_email').on(sql`lower(${t.email})`),
    shopIsolation(),
  ],
);

/**
 * The roles and state of a person from a catalogue cursor on; filled by a trigger on `people`, never changed. The server
 * asks it what somebody was allowed at the cursor an event knew (fault 16).
 */
export const personRoles = pgTable(
  'person_roles',
  {
    shopId: shopId(),
    personId: ref('person_id').notNull(),
    since: big('since').notNull(),
    roles: text('roles').array().$type<Role[]>().notNull(),
    state: text('state', { enum: ['active', 'left'] }).notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.personId, t.since] }),
    foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
    shopIsolation(),
  ],
);

/** PINs (argon2id). Older versions stay: a seal made before a change is checked against the PIN of its time. */
export const pins = pgTable(
  'pins',
  {
    shopId: shopId(),
    personId: ref('person_id').notNull(),
    version: whole('version').notNull(),
    hash: text('hash').notNull(),
    setAt: moment('set_at').notNull().defaultNow(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.personId, t.version] }),
    foreignKey({ columns: [t.shopId, t.personId], foreignColumns: [people.shopId, people.id] }),
    shopIsolation(),
  ],
);
