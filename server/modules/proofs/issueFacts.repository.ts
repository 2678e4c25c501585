import { and, eq } from 'drizzle-orm';
import { jobJoints, jobs } from '@db/schema/jobs';
import { procedureRevisions, procedures } from '@db/schema/procedures';
import type { ShopTx } from '../../tenancy/withShop';

/** When a revision was approved, or null. */
export const approvalOf = async (tx: ShopTx, code: string, revision: number): Promise<string | null> => {
  const rows = await tx.db
    .select({ at: procedureRevisions.approvedAt })
    .from(procedureRevisions)
    .innerJoin(
      procedures,
      and(eq(procedures.shopId, procedureRevisions.shopId), eq(procedures.id, procedureRevisions.procedureId)),
    )
    .where(
      and(eq(procedureRevisions.shopId, tx.shop), eq(procedures.code, code), eq(procedureRevisions.revision, revision)),
    );
  return rows[0]?.at?.toISOString() ?? null;
};

/** The job and the joint of a walk. */
export const jobAndJoint = async (tx: ShopTx, jobId: string, jointId: string) => {
  const rows = await tx.db
    .select({ job: jobs, joint: jobJoints })
    .from(jobJoints)
    .innerJoin(jobs, and(eq(jobs.shopId, jobJoints.shopId), eq(jobs.id, jobJoints.jobId)))
    .where(and(eq(jobJoints.shopId, tx.shop), eq(jobJoints.id, jointId), eq(jobs.id, jobId)));
  return rows[0] ?? null;
};
