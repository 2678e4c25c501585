import type { JobRow, JointRow } from '@shared/contracts/jobRow.contract';
import type { JobWhole } from '@shared/contracts/jobs.contract';
import { toWalkRow } from '../walks/walks.mapping';
import type { WalkRecord } from '../walks/walks.repository';
import type { JobRecord, JointRecord } from './jobs.repository';

/** A stored job as it travels. */
export const toJobRow = (row: JobRecord): JobRow => ({
  id: row.id,
  number: row.number,
  customer: row.customer,
  engineFamily: row.engineFamily,
  engineModel: row.engineModel,
  engineSerial: row.engineSerial,
  vin: row.vin,
  claim: row.claim,
  odometer: row.odometer,
  hours: row.hours,
  state: row.state,
  createdAt: row.createdAt.toISOString(),
  changedAt: row.changedAt.toISOString(),
});

/** A stored joint as it travels. */
export const toJointRow = (row: JointRecord): JointRow => ({
  id: row.id,
  job: row.jobId,
  procedure: row.procedureCode,
  purpose: row.purpose,
  bank: row.bank,
  castingNumber: row.castingNumber,
  retired: row.retired,
});

/** A job with its joints and their walks. */
export const toJobWhole = (job: JobRecord, joints: readonly JointRecord[], walks: readonly WalkRecord[]): JobWhole => {
  const own = walks.filter((walk) => walk.jobId === job.id);
  const siblingsOf = (joint: string) => own.filter((walk) => walk.jointId === joint);
  return {
    ...toJobRow(job),
    joints: joints.filter((joint) => joint.jobId === job.id).map(toJointRow),
    walks: own.map((walk) => toWalkRow(walk, siblingsOf(walk.jointId))),
  };
};
