import type { WalkRow } from '@shared/contracts/walkRow.contract';
import type { StoredEvent } from '@shared/contracts/sync.contract';
import type { StoredRow } from '../sync/chain.repository';
import type { WalkRecord } from './walks.repository';

/** A stored walk's line as it travels; `siblings` are the walks of the same joint. */
export const toWalkRow = (row: WalkRecord, siblings: readonly { id: string; state: string }[] = []): WalkRow => ({
  id: row.id,
  job: row.jobId,
  joint: row.jointId,
  purpose: row.purpose,
  procedure: { code: row.procedureCode, revision: row.revision, hash: row.procedureHash },
  state: row.state,
  writer: row.writer,
  branch: row.branch,
  next: row.nextSeq,
  head: row.headHash,
  pulls: row.pulls,
  records: row.records,
  openedAt: row.openedAt.toISOString(),
  changedAt: row.changedAt.toISOString(),
  readingsDone: row.readingsDone,
  readingsDue: row.readingsDue,
  openDeviations: row.openDeviations,
  forked: row.forked,
  parallel: siblings.filter(({ id, state }) => id !== row.id && state !== 'voided').map(({ id }) => id),
  quarantined: row.quarantined,
  refusedSeals: row.refusedSeals,
  missingBlobs: row.missingBlobs,
});

/** A stored event as it travels. */
export const toStoredEvent = (row: StoredRow): StoredEvent => ({
  text: row.text,
  hash: row.hash,
  sig: row.sig,
  branch: row.branch,
  seq: row.seq,
  receivedAt: row.receivedAt.toISOString(),
});
