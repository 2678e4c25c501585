import type { ProcedureRow } from '@shared/contracts/procedures.contract';
import { notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { findRevision, listProcedureRows, listRevisionRows } from './procedures.repository';

type RevisionLine = Awaited<ReturnType<typeof listRevisionRows>>[number];

const toRevision = ({
  procedureId: _procedure,
  approvedAt,
  ...row
}: RevisionLine): ProcedureRow['revisions'][number] => ({
  ...row,
  approvedAt: approvedAt?.toISOString() ?? null,
});

/** Every procedure with its revisions. */
export const listProcedures = async (tx: ShopTx): Promise<ProcedureRow[]> => {
  const revisions = await listRevisionRows(tx);
  return (await listProcedureRows(tx)).map(({ id, code, title, engine, component }) => ({
    id,
    code,
    title,
    engine,
    component,
    revisions: revisions.filter(({ procedureId }) => procedureId === id).map(toRevision),
  }));
};

/** A procedure with one revision's document: the one asked for, else the approved, else the newest. */
export const getProcedure = async (tx: ShopTx, id: string, wanted?: number) => {
  const procedure = (await listProcedures(tx)).find((one) => one.id === id);
  const revisions = procedure?.revisions ?? [];
  const revision =
    wanted === undefined
      ? (revisions.find(({ state }) => state === 'approved') ?? revisions[0])
      : revisions.find((one) => one.revision === wanted);
  const stored = revision ? await findRevision(tx, id, revision.revision) : null;
  if (!procedure || !revision || !stored) throw notFound('procedure.unknown', 'There is no such procedure.');
  return { ...procedure, revision, document: stored.document };
};
