import type { JobFields, JointFields, JointRow } from '@shared/contracts/jobRow.contract';
import type { JobWhole } from '@shared/contracts/jobs.contract';
import { hasRight } from '@shared/people/roles';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import { forbidden } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import * as refuse from './jobs.errors';
import { toJobWhole, toJointRow } from './jobs.mapping';
import * as store from './jobs.repository';
import type { JobRecord } from './jobs.repository';

const whole = async (tx: ShopTx, jobs: JobRecord[]): Promise<JobWhole[]> => {
  const ids = jobs.map(({ id }) => id);
  if (ids.length === 0) return [];
  const joints = await store.jointsOf(tx, ids);
  const walks = await store.walksOfJobs(tx, ids);
  return jobs.map((job) => toJobWhole(job, joints, walks));
};

const demandJob = async (tx: ShopTx, id: string): Promise<JobRecord> => {
  const job = await store.findJob(tx, id);
  if (!job) throw refuse.jobUnknown();
  return job;
};

const wholeById = async (tx: ShopTx, id: string): Promise<JobWhole> => {
  const [job] = await whole(tx, [await demandJob(tx, id)]);
  if (!job) throw refuse.jobUnknown();
  return job;
};

/** Jobs, newest first, found by a phrase where one is given. */
export const listJobs = async (
  tx: ShopTx,
  query: { q: string; state: 'open' | 'closed' | 'all'; limit: number },
): Promise<JobWhole[]> => {
  const ids = query.q === '' ? undefined : await store.searchShop(tx, 'jobs', query.q, query.limit);
  if (ids?.length === 0) return [];
  const state = query.state === 'all' ? undefined : query.state;
  return whole(tx, await store.findJobs(tx, { ...(state && { state }), ...(ids && { ids }), limit: query.limit }));
};

/** A job. Throws 404 `job.unknown`. */
export const getJob = wholeById;

const demandProcedures = async (tx: ShopTx, joints: readonly JointFields[]): Promise<void> => {
  for (const code of new Set(joints.map(({ procedure }) => procedure))) {
    if (!(await store.procedureExists(tx, code))) throw refuse.procedureUnknown(code);
  }
};

/** Opens a job with its first joints. */
export const createJob = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: JobFields & { joints: JointFields[] },
): Promise<JobWhole> => {
  const { joints, ...fields } = request;
  await demandProcedures(tx, joints);
  const id = deps.ids.uuid();
  const now = deps.clock.now();
  const stored = await store.insertJob(tx, {
    ...fields,
    id,
    createdBy: caller.person.id,
    createdAt: now,
    changedAt: now,
  });
  if (!stored) throw refuse.numberTaken(fields.number);
  for (const joint of joints) await store.insertJoint(tx, { ...joint, id: deps.ids.uuid(), jobId: id });
  await writeAudit(deps, tx, { person: caller.person.id, action: 'job.opened', subject: fields.number });
  return wholeById(tx, id);
};

type JobChange = Partial<JobFields> & { state?: 'open' | 'closed' | undefined };

/** Claim fields belong to those who issue proofs, everything else to those who keep jobs. */
const demandRights = (caller: OfficeCaller, change: JobChange): void => {
  const changed = Object.entries(change).filter(([, value]) => value !== undefined);
  for (const [field] of changed) {
    const { roles } = caller.person;
    const allowed = hasRight(roles, 'keepJobs') || (field === 'claim' && hasRight(roles, 'keepProofs'));
    if (!allowed) throw forbidden('right.missing', 'Your roles do not allow this.', { right: 'keepJobs', field });
  }
};

const demandClosable = async (tx: ShopTx, job: string): Promise<void> => {
  const walks = await store.walksOfJobs(tx, [job]);
  const open = walks.filter(({ state }) => state !== 'finished' && state !== 'voided');
  if (open.length > 0) throw refuse.walksOpen(open.length);
};

/** Changes fields of a job, or closes and reopens it. */
export const updateJob = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  id: string,
  change: JobChange,
): Promise<JobWhole> => {
  demandRights(caller, change);
  const job = await demandJob(tx, id);
  if (change.number !== undefined && (await store.numberTaken(tx, change.number, id))) {
    throw refuse.numberTaken(change.number);
  }
  if (change.state === 'closed') await demandClosable(tx, id);
  await store.updateJob(tx, id, { ...change, changedAt: deps.clock.now() });
  const details = { fields: Object.keys(change) };
  await writeAudit(deps, tx, { person: caller.person.id, action: 'job.changed', subject: job.number, details });
  return wholeById(tx, id);
};

/** Adds a joint to an open job. */
export const addJoint = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  id: string,
  joint: JointFields,
): Promise<JointRow> => {
  const job = await demandJob(tx, id);
  if (job.state === 'closed') throw refuse.jobClosed();
  await demandProcedures(tx, [joint]);
  const row = await store.insertJoint(tx, { ...joint, id: deps.ids.uuid(), jobId: id });
  await store.updateJob(tx, id, { changedAt: deps.clock.now() });
  await writeAudit(deps, tx, { person: caller.person.id, action: 'job.jointAdded', subject: job.number });
  return toJointRow(row);
};
