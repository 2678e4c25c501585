import { and, asc, desc, eq, gt, inArray, sql } from 'drizzle-orm';
import type { JobFields, JointFields } from '@shared/contracts/jobRow.contract';
import { vinSearchKey } from '@shared/vehicle/vin';
import { jobJoints, jobs } from '@db/schema/jobs';
import { procedures } from '@db/schema/procedures';
import { walks } from '@db/schema/walks';
import type { ShopTx } from '../../tenancy/withShop';
import type { WalkRecord } from '../walks/walks.repository';

/** A job as stored. */
export type JobRecord = typeof jobs.$inferSelect;
/** A joint as stored. */
export type JointRecord = typeof jobJoints.$inferSelect;

const mine = (tx: ShopTx, id: string) => and(eq(jobs.shopId, tx.shop), eq(jobs.id, id));

/** Ids of jobs or proofs that hold a phrase, newest first (decision 13). */
export const searchShop = async (
  tx: ShopTx,
  kind: 'jobs' | 'proofs',
  phrase: string,
  most: number,
): Promise<string[]> => {
  const found = new Set<string>();
  // A VIN misread from the plate (O for 0, I for 1) still finds its engine.
  for (const spelling of new Set([phrase, vinSearchKey(phrase)])) {
    const result = await tx.db.execute<{ id: string }>(sql`select id from search_shop(${kind}, ${spelling}, ${most})`);
    for (const { id } of result.rows) found.add(id);
  }
  return [...found];
};

/** Jobs by state, newest first; with ids given only those. */
export const findJobs = (
  tx: ShopTx,
  wanted: { state?: 'open' | 'closed'; ids?: string[]; limit: number },
): Promise<JobRecord[]> =>
  tx.db
    .select()
    .from(jobs)
    .where(
      and(
        eq(jobs.shopId, tx.shop),
        wanted.state === undefined ? undefined : eq(jobs.state, wanted.state),
        wanted.ids === undefined ? undefined : inArray(jobs.id, wanted.ids),
      ),
    )
    .orderBy(desc(jobs.changedAt))
    .limit(wanted.limit);

/** A job, or null. */
export const findJob = async (tx: ShopTx, id: string): Promise<JobRecord | null> => {
  const rows = await tx.db.select().from(jobs).where(mine(tx, id));
  return rows[0] ?? null;
};

/** Whether another job has this number. */
export const numberTaken = async (tx: ShopTx, number: string, besides: string): Promise<boolean> => {
  const rows = await tx.db
    .select({ id: jobs.id })
    .from(jobs)
    .where(and(eq(jobs.shopId, tx.shop), eq(jobs.number, number)));
  return rows.some(({ id }) => id !== besides);
};

/** Stores a job; answers false when another has its number by now. */
export const insertJob = async (
  tx: ShopTx,
  job: JobFields & { id: string; createdBy: string; createdAt: Date; changedAt: Date },
): Promise<boolean> => {
  const rows = await tx.db
    .insert(jobs)
    .values({ shopId: tx.shop, ...job })
    .onConflictDoNothing({ target: [jobs.shopId, jobs.number] })
    .returning({ id: jobs.id });
  return rows.length > 0;
};

/** Changes a job. */
export const updateJob = async (
  tx: ShopTx,
  id: string,
  change: Partial<JobFields> & { state?: 'open' | 'closed'; changedAt: Date },
): Promise<void> => {
  await tx.db.update(jobs).set(change).where(mine(tx, id));
};

/** Joints of these jobs. */
export const jointsOf = (tx: ShopTx, jobIds: string[]): Promise<JointRecord[]> =>
  tx.db
    .select()
    .from(jobJoints)
    .where(and(eq(jobJoints.shopId, tx.shop), inArray(jobJoints.jobId, jobIds)))
    .orderBy(asc(jobJoints.changed));

/** Stores a joint. */
export const insertJoint = async (
  tx: ShopTx,
  joint: JointFields & { id: string; jobId: string },
): Promise<JointRecord> => {
  const { procedure: procedureCode, ...fields } = joint;
  const rows = await tx.db
    .insert(jobJoints)
    .values({ shopId: tx.shop, procedureCode, ...fields })
    .returning();
  const [row] = rows;
  if (!row) throw new Error('a joint was not stored');
  return row;
};

/** Whether the shop has a procedure of this code. */
export const procedureExists = async (tx: ShopTx, code: string): Promise<boolean> => {
  const rows = await tx.db
    .select({ id: procedures.id })
    .from(procedures)
    .where(and(eq(procedures.shopId, tx.shop), eq(procedures.code, code)));
  return rows.length > 0;
};

/** Walks of these jobs. */
export const walksOfJobs = (tx: ShopTx, jobIds: string[]): Promise<WalkRecord[]> =>
  tx.db
    .select()
    .from(walks)
    .where(and(eq(walks.shopId, tx.shop), inArray(walks.jobId, jobIds)))
    .orderBy(asc(walks.openedAt));

/** Jobs whose row changed after a cursor. */
export const jobsSince = (tx: ShopTx, since: number): Promise<JobRecord[]> =>
  tx.db
    .select()
    .from(jobs)
    .where(and(eq(jobs.shopId, tx.shop), gt(jobs.changed, since), since === 0 ? eq(jobs.state, 'open') : undefined))
    .orderBy(asc(jobs.number));

/** Joints whose row changed after a cursor, of open jobs at first. */
export const jointsSince = async (tx: ShopTx, since: number): Promise<JointRecord[]> => {
  const rows = await tx.db
    .select({ joint: jobJoints })
    .from(jobJoints)
    .innerJoin(jobs, and(eq(jobs.shopId, jobJoints.shopId), eq(jobs.id, jobJoints.jobId)))
    .where(
      and(
        eq(jobJoints.shopId, tx.shop),
        gt(jobJoints.changed, since),
        since === 0 ? eq(jobs.state, 'open') : undefined,
      ),
    )
    .orderBy(asc(jobJoints.changed));
  return rows.map(({ joint }) => joint);
};
