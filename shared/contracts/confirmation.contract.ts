import { z } from 'zod';
import { id, moment, sha256 } from './common.contract';

/**
 * What the shop says about a sealed PIN (decision 6): insert-only, signed with the shop's ES256 key. `jws` is a detached
 * JWS over the RFC 8785 text of every other field. `reason` of a refusal: `pin.wrong`, `pin.personLeft`, `pin.notSet`,
 * `pin.wait`, `seal.unreadable`, `seal.otherEvent`, `seal.rightMissing`, or `pin.disowned` for a later *not mine*.
 */
export const confirmation = z.object({
  walk: id,
  branch: z.number().int(),
  seq: z.number().int(),
  hash: sha256,
  person: id,
  meaning: z.string(),
  result: z.enum(['accepted', 'refused']),
  reason: z.string().nullable(),
  at: moment,
  jws: z.string(),
});
/** What the shop says about a sealed PIN. */
export type Confirmation = z.output<typeof confirmation>;

/** An order from the office (decision 4), shop-signed over the RFC 8785 text of every field but `jws` and `state`. */
export const order = z.object({
  id,
  walk: id,
  kind: z.enum(['stop', 'goOn', 'void', 'withdraw', 'decide', 'skipWait', 'branch', 'release']),
  /** `decide`: which deviation and how it is settled. */
  deviation: z.string().nullable(),
  choice: z.string().nullable(),
  /** `skipWait`: the pass; `branch`: the branch that stands. */
  pass: z.string().nullable(),
  branch: z.number().int().nullable(),
  reason: z.string(),
  by: id,
  at: moment,
  jws: z.string(),
  state: z.enum(['open', 'obeyed', 'withdrawn']),
});
/** An order from the office. */
export type Order = z.output<typeof order>;
