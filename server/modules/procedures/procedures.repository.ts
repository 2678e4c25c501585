import { and, asc, desc, eq, gt, ne } from 'drizzle-orm';
import { procedureRevisions, procedures } from '@db/schema/procedures';
import type { ShopTx } from '../../tenancy/withShop';

/** A procedure as stored. */
export type ProcedureRecord = typeof procedures.$inferSelect;
/** A revision as stored. */
export type RevisionRecord = typeof procedureRevisions.$inferSelect;

/** Every procedure, by code. */
export const listProcedureRows = (tx: ShopTx): Promise<ProcedureRecord[]> =>
  tx.db.select().from(procedures).where(eq(procedures.shopId, tx.shop)).orderBy(asc(procedures.code));

/** Every revision without its document, newest first. */
export const listRevisionRows = (tx: ShopTx) =>
  tx.db
    .select({
      procedureId: procedureRevisions.procedureId,
      revision: procedureRevisions.revision,
      hash: procedureRevisions.hash,
      state: procedureRevisions.state,
      writtenBy: procedureRevisions.writtenBy,
      approvedBy: procedureRevisions.approvedBy,
      approvedAt: procedureRevisions.approvedAt,
    })
    .from(procedureRevisions)
    .where(eq(procedureRevisions.shopId, tx.shop))
    .orderBy(desc(procedureRevisions.revision));

/** One revision with its document, or null. */
export const findRevision = async (tx: ShopTx, procedure: string, revision: number): Promise<RevisionRecord | null> => {
  const rows = await tx.db
    .select()
    .from(procedureRevisions)
    .where(
      and(
        eq(procedureRevisions.shopId, tx.shop),
        eq(procedureRevisions.procedureId, procedure),
        eq(procedureRevisions.revision, revision),
      ),
    );
  return rows[0] ?? null;
};

/** Revisions that tablets know, changed after a cursor: every one that is no draft, since an old walk may be resumed. */
export const revisionsSince = (tx: ShopTx, since: number) =>
  tx.db
    .select({ code: procedures.code, revision: procedureRevisions })
    .from(procedureRevisions)
    .innerJoin(
      procedures,
      and(eq(procedures.shopId, procedureRevisions.shopId), eq(procedures.id, procedureRevisions.procedureId)),
    )
    .where(
      and(
        eq(procedureRevisions.shopId, tx.shop),
        gt(procedureRevisions.changed, since),
        ne(procedureRevisions.state, 'draft'),
      ),
    )
    .orderBy(asc(procedures.code), asc(procedureRevisions.revision));
