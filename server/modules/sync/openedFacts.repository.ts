import { and, desc, eq } from 'drizzle-orm';
import { isUuid } from '@shared/kernel/ids';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { jobJoints } from '@db/schema/jobs';
import { procedureRevisions, procedures } from '@db/schema/procedures';
import type { ShopTx } from '../../tenancy/withShop';

/** A joint as far as opening a walk on it is concerned. */
export interface JointFacts {
  procedureCode: string;
  earlier: { readingsTaken: boolean; usedHoles: string[] };
}

/** A revision as far as walking it is concerned. */
export interface RevisionFacts {
  state: 'draft' | 'approved' | 'superseded' | 'withdrawn';
  document: ProcedureDocument;
}

/** A joint of a job, or null. */
export const findJoint = async (tx: ShopTx, job: string, joint: string): Promise<JointFacts | null> => {
  if (!isUuid(job) || !isUuid(joint)) return null;
  const rows = await tx.db
    .select({ procedureCode: jobJoints.procedureCode, earlier: jobJoints.earlier })
    .from(jobJoints)
    .where(and(eq(jobJoints.shopId, tx.shop), eq(jobJoints.id, joint), eq(jobJoints.jobId, job)));
  return rows[0] ?? null;
};

/** The revision a walk is bound to: by code, number and fingerprint (fault 22). */
export const findRevisionByHash = async (
  tx: ShopTx,
  procedure: { code: string; revision: number; hash: string },
): Promise<RevisionFacts | null> => {
  const rows = await tx.db
    .select({ state: procedureRevisions.state, document: procedureRevisions.document })
    .from(procedureRevisions)
    .innerJoin(
      procedures,
      and(eq(procedures.shopId, procedureRevisions.shopId), eq(procedures.id, procedureRevisions.procedureId)),
    )
    .where(
      and(
        eq(procedureRevisions.shopId, tx.shop),
        eq(procedureRevisions.hash, procedure.hash),
        eq(procedureRevisions.revision, procedure.revision),
        eq(procedures.code, procedure.code),
      ),
    )
    .orderBy(desc(procedureRevisions.revision))
    .limit(1);
  return rows[0] ?? null;
};
