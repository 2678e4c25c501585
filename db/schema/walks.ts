import { boolean, foreignKey, index, pgTable, primaryKey, text } from 'drizzle-orm/pg-core';
import type { WalkStateName } from '@shared/contracts/walkRow.contract';
import type { Purpose } from '@shared/walk/events';
import { changed, json, moment, ref, rowId, shopId, whole } from '../columns';
import { shopIsolation } from '../policies';
import { jobJoints, jobs } from './jobs';

/** A walk's line: a projection of the branch that stands (decision 14). The truth is `walk_events`. */
export const walks = pgTable(
  'walks',
  {
    shopId: shopId(),
    id: rowId(),
    jobId: ref('job_id').notNull(),
    jointId: ref('joint_id').notNull(),
    purpose: text('purpose').$type<Purpose>().notNull(),
    procedureCode: text('procedure_code').notNull(),
    revision: whole('revision').notNull(),
    procedureHash: text('procedure_hash').notNull(),
    state: text('state').$type<WalkStateName>().notNull(),
    writer: text('writer').notNull(),
    branch: whole('branch').notNull(),
    nextSeq: whole('next_seq').notNull(),
    headHash: text('head_hash').notNull(),
    pulls: ref('pulls').notNull(),
    records: ref('records').notNull(),
    shopOfOne: boolean('shop_of_one').notNull(),
    openedAt: moment('opened_at').notNull(),
    changedAt: moment('changed_at').notNull(),
    readingsDone: whole('readings_done').notNull(),
    readingsDue: whole('readings_due').notNull(),
    openDeviations: whole('open_deviations').notNull(),
    /** Any reading, voided ones too, and the holes whose fastener counts as used: what the next walk inherits (W1). */
    readingsTaken: boolean('readings_taken').notNull(),
    usedHoles: json<string[]>('used_holes').notNull(),
    forked: boolean('forked').notNull().default(false),
    quarantined: whole('quarantined').notNull().default(0),
    refusedSeals: whole('refused_seals').notNull().default(0),
    missingBlobs: whole('missing_blobs').notNull().default(0),
    changed: changed(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.id] }),
    index('walks_joint').on(t.shopId, t.jointId),
    index('walks_job').on(t.shopId, t.jobId),
    index('walks_changed').on(t.shopId, t.changed),
    index('walks_state').on(t.shopId, t.state, t.changedAt),
    foreignKey({ columns: [t.shopId, t.jobId], foreignColumns: [jobs.shopId, jobs.id] }),
    foreignKey({ columns: [t.shopId, t.jointId], foreignColumns: [jobJoints.shopId, jobJoints.id] }),
    shopIsolation(),
  ],
);

/** Who pulled and who recorded while a reading was taken: what the self-countersign trigger looks in (P1). */
export const walkHands = pgTable(
  'walk_hands',
  { shopId: shopId(), walkId: ref('walk_id').notNull(), personId: ref('person_id').notNull() },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.personId] }),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);

/** Deviations of a walk's branches: a projection, for lists and trends. */
export const deviations = pgTable(
  'deviations',
  {
    shopId: shopId(),
    walkId: ref('walk_id').notNull(),
    branch: whole('branch').notNull(),
    deviation: text('deviation').notNull(),
    seq: whole('seq').notNull(),
    at: moment('at').notNull(),
    kind: text('kind').notNull(),
    hole: text('hole'),
    slot: json<unknown>('slot'),
    reading: whole('reading'),
    status: text('status').notNull(),
    settlings: json<unknown[]>('settlings').notNull(),
  },
  (t) => [
    primaryKey({ columns: [t.shopId, t.walkId, t.branch, t.deviation] }),
    foreignKey({ columns: [t.shopId, t.walkId], foreignColumns: [walks.shopId, walks.id] }),
    shopIsolation(),
  ],
);
