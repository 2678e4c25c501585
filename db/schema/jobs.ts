import { sql } from 'drizzle-orm';
import { boolean, foreignKey, index, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core';
import type { Purpose } from '@shared/walk/events';
import { changed, json, moment, ref, rowId, shopId, words } from '../columns';
import { shopIsolation } from '../policies';
import { shops } from './shops';

/** A job of the shop. `search` is what search_shop looks in. */
export const jobs = pgTable(
  'jobs',
  {
    shopId: shopId(),
    id: rowId(),
    number: text('number').notNull(),
    customer: words('customer'),
    engineFamily: words('engine_family'),
    engineModel: words('engine_model'),
    engineSerial: words('engine_serial'),
    vin: words('vin'),
    claim: words('claim'),
    odometer: json<{ value: string; unit: 'km' | 'mi' }>('odometer'),
    hours: text('hours'),
    state: text('state', { enum: ['open', 'closed'] })
      .notNull()
      .default('open'),
    createdBy: ref('created_by'),
    createdAt: moment('created_at').notNull().defaultNow(),
    changedAt: moment('changed_at').notNull().defaultNow(),
    changed: changed(),
    search: text('search').generatedAlwaysAs(
      sql`lower(number || ' ' || customer || ' ' || engine_family || ' ' || engine_model || ' ' || engine_serial || ' ' || vin || ' ' || claim)`,
    ),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    uniqueIndex('jobs_number').on(t.shopId, t.number),
    index('jobs_changed').on(t.shopId, t.changed),
    foreignKey({ columns: [t.shopId], foreignColumns: [shops.id] }),
    shopIsolation(),
  ],
);

/** Which joint of which job (decision 14), and what earlier walks left on it (W1). */
export const jobJoints = pgTable(
  'job_joints',
  {
    shopId: shopId(),
    id: rowId(),
    jobId: ref('job_id').notNull(),
    procedureCode: text('procedure_code').notNull(),
    purpose: text('purpose').$type<Purpose>().notNull().default('finalAssembly'),
    bank: words('bank'),
    castingNumber: words('casting_number'),
    retired: boolean('retired').notNull().default(false),
    earlier: json<{ readingsTaken: boolean; usedHoles: string[] }>('earlier')
      .notNull()
      .default({ readingsTaken: false, usedHoles: [] }),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index('job_joints_job').on(t.shopId, t.jobId),
    index('job_joints_changed').on(t.shopId, t.changed),
    foreignKey({ columns: [t.shopId, t.jobId], foreignColumns: [jobs.shopId, jobs.id] }),
    shopIsolation(),
  ],
);
