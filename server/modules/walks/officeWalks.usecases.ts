import type { OfficeWalk, OfficeWalkWhole } from '@shared/contracts/walks.contract';
import type { WalkStateName } from '@shared/contracts/walkRow.contract';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import type { ShopTx } from '../../tenancy/withShop';
import { ordersOfWalk } from '../countersign/orders.repository';
import { toOrder } from '../countersign/orders.mapping';
import { toJobRow, toJointRow } from '../jobs/jobs.mapping';
import { namesOf } from '../people/people.repository';
import { issueBlocks } from '../proofs/issueBlocks';
import { standingWalk, type StandingWalk } from '../sync/refreshWalk';
import { walkUnknown } from '../sync/sync.errors';
import { listTabletRows } from '../tablets/tablets.repository';
import { findOfficeWalks, latestProofs, type WalkFilter } from './officeWalks.repository';
import { toWalkRow } from './walks.mapping';
import { quarantineOfWalk, walksOfJoints } from './walks.repository';
import { walkChain } from './walks.usecases';

type Found = Awaited<ReturnType<typeof findOfficeWalks>>[number];

const toOfficeWalks = async (tx: ShopTx, rows: readonly Found[]): Promise<OfficeWalk[]> => {
  const siblings = await walksOfJoints(tx, [...new Set(rows.map(({ walk }) => walk.jointId))]);
  const proofs = await latestProofs(
    tx,
    rows.map(({ walk }) => walk.id),
  );
  return rows.map(({ walk, job, joint, procedureTitle, pullsName, recordsName }) => ({
    ...toWalkRow(walk, siblings.get(walk.jointId)),
    jobNumber: job.number,
    customer: job.customer,
    engine: [job.engineFamily, job.engineModel].filter(Boolean).join(' '),
    engineSerial: job.engineSerial,
    bank: joint.bank,
    procedureTitle: procedureTitle ?? '',
    pullsName: pullsName ?? '',
    recordsName: recordsName ?? '',
    proof: proofs.get(walk.id) ?? null,
  }));
};

/** Walks for an office list; `waiting: me` are those the caller may countersign (P1). */
export const listOfficeWalks = async (
  tx: ShopTx,
  caller: OfficeCaller,
  query: { state?: WalkStateName | undefined; waiting?: 'me' | undefined; q: string; limit: number },
): Promise<OfficeWalk[]> => {
  const { waiting, ...rest } = query;
  const filter: WalkFilter = { ...rest, ...(waiting && { countersignableBy: caller.person.id }) };
  return toOfficeWalks(tx, await findOfficeWalks(tx, filter));
};

const findOne = async (tx: ShopTx, id: string): Promise<Found> => {
  const [found] = await findOfficeWalks(tx, { id, q: '', limit: 1 });
  if (!found) throw walkUnknown();
  return found;
};

/** One walk's line. Throws 404 `walk.unknown`. */
export const officeWalk = async (tx: ShopTx, id: string): Promise<OfficeWalk> => {
  const [walk] = await toOfficeWalks(tx, [await findOne(tx, id)]);
  if (!walk) throw walkUnknown();
  return walk;
};

const branchesFor = ({ row, branches }: StandingWalk): OfficeWalkWhole['branches'] =>
  branches.map(({ branch, fromBranch, fromSeq, next, how }) => ({
    branch,
    from: fromBranch === null ? null : { branch: fromBranch, seq: fromSeq },
    next,
    how,
    stands: branch === row.branch,
  }));

const quarantineFor = async (tx: ShopTx, walk: string): Promise<OfficeWalkWhole['quarantined']> =>
  (await quarantineOfWalk(tx, walk)).map(({ event, settling }) => ({
    hash: event.hash,
    seq: event.seq,
    code: event.code,
    message: 'The rules of the walk refuse this event.',
    details: event.details,
    receivedAt: event.receivedAt.toISOString(),
    tablet: event.tablet,
    settled: settling !== null,
  }));

/** A walk whole, for review, countersignature and issue. */
export const officeWalkWhole = async (
  deps: Deps,
  tx: ShopTx,
  id: string,
  branch: number | undefined,
): Promise<OfficeWalkWhole> => {
  const found = await findOne(tx, id);
  const standing = await standingWalk(deps, tx, id);
  if (!standing) throw walkUnknown();
  const tablets = (await listTabletRows(tx)).map((tablet) => [tablet.id, tablet.name]);
  return {
    ...(await walkChain(deps, tx, id, branch)),
    walk: await officeWalk(tx, id),
    job: toJobRow(found.job),
    joint: toJointRow(found.joint),
    document: standing.state.procedure,
    names: await namesOf(tx),
    tablets: Object.fromEntries(tablets) as Record<string, string>,
    branches: branchesFor(standing),
    quarantined: await quarantineFor(tx, id),
    orders: (await ordersOfWalk(tx, id)).map(toOrder),
    issueBlocks: issueBlocks(standing),
  };
};
