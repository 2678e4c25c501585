import { z } from 'zod';
import { id, moment, purpose, sha256 } from './common.contract';

/**
 * Where a walk stands, for lists. `walking`: readings are being taken; `review`: every pass done, not signed;
 * `signed`: waits for its countersignature (or for release); `finished`: signed and, where the shop asks,
 * countersigned; `sentBack`, `stopped`, `voided`.
 */
export const walkState = z.enum(['walking', 'review', 'signed', 'finished', 'sentBack', 'stopped', 'voided']);
/** Where a walk stands. */
export type WalkStateName = z.output<typeof walkState>;

/** A walk's line in a list: a projection of its chain. */
export const walkRow = z.object({
  id,
  job: id,
  joint: id,
  purpose,
  procedure: z.object({ code: z.string(), revision: z.number().int(), hash: sha256 }),
  state: walkState,
  /** Who writes: a tablet's id, or `office` (decision 4). */
  writer: z.string(),
  /** Branch that stands, next sequence number and hash of its head. */
  branch: z.number().int(),
  next: z.number().int(),
  head: sha256,
  pulls: id,
  records: id,
  openedAt: moment,
  changedAt: moment,
  /** Final readings taken and due: `31 of 56`. */
  readingsDone: z.number().int(),
  readingsDue: z.number().int(),
  openDeviations: z.number().int(),
  /** More than one branch and nobody has said which stands (decision 5). */
  forked: z.boolean(),
  /** Other walks of the same job joint that are not voided (decision 5, parallel walks). */
  parallel: z.array(id),
  /** Events refused by the rules that a person has to look at. */
  quarantined: z.number().int(),
  /** Sealed PINs that were refused or disowned and not renewed (decision 6). */
  refusedSeals: z.number().int(),
  /** Photos and files named by events and not yet here. */
  missingBlobs: z.number().int(),
});
/** A walk's line in a list. */
export type WalkRow = z.output<typeof walkRow>;
