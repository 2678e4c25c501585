import { z } from 'zod';
import { id, idParams, moment, text } from './common.contract';
import { order } from './confirmation.contract';
import { defineEndpoint } from './defineEndpoint';
import { jobRow, jointRow } from './jobRow.contract';
import { quarantinedEvent, walkChain } from './sync.contract';
import { walkRow, walkState } from './walkRow.contract';
import type { ProcedureDocument } from '../procedure/procedure';

/** A walk in an office list, with the words that make it findable. */
export const officeWalk = walkRow.extend({
  jobNumber: z.string(),
  customer: z.string(),
  engine: z.string(),
  engineSerial: z.string(),
  bank: z.string(),
  procedureTitle: z.string(),
  pullsName: z.string(),
  recordsName: z.string(),
  /** Number of the proof in force, if one was issued. */
  proof: z.object({ id, number: z.string(), state: z.string() }).nullable(),
});
/** A walk in an office list. */
export type OfficeWalk = z.output<typeof officeWalk>;

/** Walks, last changed first. `waiting=me`: those signed and waiting for a countersignature that the caller may give (P1). */
export const listWalks = defineEndpoint({
  method: 'GET',
  path: '/api/walks',
  auth: 'office',
  right: 'see',
  query: z.object({
    state: walkState.optional(),
    waiting: z.enum(['me']).optional(),
    q: z.string().trim().max(100).default(''),
    limit: z.coerce.number().int().min(1).max(200).default(100),
  }),
  responses: { 200: z.object({ walks: z.array(officeWalk) }) },
});

/** Why a proof cannot be issued yet: codes translated as `errors.<code>`. */
export const issueBlock = z.object({ code: z.string(), details: z.record(z.string(), z.unknown()).optional() });

/** A walk whole, for review, countersignature and issue. The browser folds `events` with the shared rules to show it. */
export const officeWalkWhole = walkChain.extend({
  walk: officeWalk,
  job: jobRow,
  joint: jointRow,
  document: z.custom<ProcedureDocument>((value) => typeof value === 'object' && value !== null),
  /** Names beside the person ids of the chain (decision 7), left people too. */
  names: z.record(id, z.string()),
  tablets: z.record(z.string(), z.string()),
  branches: z.array(
    z.object({
      branch: z.number().int(),
      from: z.object({ branch: z.number().int(), seq: z.number().int() }).nullable(),
      next: z.number().int(),
      how: z.enum(['first', 'fork', 'takeOver']),
      stands: z.boolean(),
    }),
  ),
  quarantined: z.array(quarantinedEvent.extend({ receivedAt: moment, tablet: z.string(), settled: z.boolean() })),
  orders: z.array(order),
  issueBlocks: z.array(issueBlock),
});
/** A walk whole. */
export type OfficeWalkWhole = z.output<typeof officeWalkWhole>;

/** A walk whole. Errors: `walk.unknown` 404. */
export const getWalk = defineEndpoint({
  method: 'GET',
  path: '/api/walks/:id',
  auth: 'office',
  right: 'see',
  params: idParams,
  query: z.object({ branch: z.coerce.number().int().min(0).optional() }),
  responses: { 200: officeWalkWhole },
});

/** PIN of the person signed in, over the cookie's TLS connection; checked with the same growing delay as on tablets. */
const ownPin = z.string().regex(/^\d{6}$/, { error: 'pin.sixDigits' });
/** Hash of the chain head that was looked at: a signature covers an exact head (fault 25). */
const head = z.string().regex(/^[0-9a-f]{64}$/);

/**
 * Countersigns after release (decision 4). Errors: `walk.headMoved` 409, `walk.notReleased` 409, `pin.wrong` 403,
 * `pin.wait` 429, and refusals of the walk's rules (`ownReadings`, `noRight`, … 409).
 */
export const countersign = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/countersign',
  auth: 'office',
  right: 'countersign',
  params: idParams,
  body: z.object({ head, pin: ownPin, meaning: z.enum(['checkedRecord', 'checkedRecordAndJoint']) }),
  responses: { 200: officeWalk },
});
/** Sends back, hole by hole (R11); the walk is released to the tablets again. Errors as `countersign`. */
export const sendBack = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/send-back',
  auth: 'office',
  right: 'sendBack',
  params: idParams,
  body: z.object({
    head,
    pin: ownPin,
    items: z
      .array(
        z.object({
          hole: z.string().max(40).nullable(),
          action: z.enum(['answer', 'look', 'restart', 'replace', 'restartJoint']),
          note: text(500),
        }),
      )
      .min(1)
      .max(200),
  }),
  responses: { 200: officeWalk },
});
/** Voids a walk the shop holds (W13); while a tablet holds it, place an order. Errors as `countersign`. */
export const voidWalk = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/void',
  auth: 'office',
  right: 'voidWalk',
  params: idParams,
  body: z.object({ head, pin: ownPin, reason: text(500) }),
  responses: { 200: officeWalk },
});
/**
 * Places an order that the tablet obeys at its next instruction. Errors: `order.incomplete` 400, `order.notOffered` 409,
 * `pin.wrong` 403, `pin.wait` 429. P1: whoever took readings cannot decide, skip or void.
 */
export const placeOrder = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/orders',
  auth: 'office',
  right: 'accept',
  params: idParams,
  body: z.object({
    pin: ownPin,
    kind: z.enum(['stop', 'goOn', 'void', 'withdraw', 'decide', 'skipWait', 'branch', 'release']),
    deviation: z.string().max(40).nullable().default(null),
    choice: z.enum(['accept', 'restart', 'replace', 'restartJoint', 'asItIs', 'goOn']).nullable().default(null),
    pass: z.string().max(60).nullable().default(null),
    branch: z.number().int().min(0).nullable().default(null),
    reason: text(500),
  }),
  responses: { 201: order },
});
/** Says which branch of a forked walk stands; the other's readings stay physical facts (decision 5). Errors: `walk.notForked` 409. */
export const chooseBranch = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/branch',
  auth: 'office',
  right: 'accept',
  params: idParams,
  body: z.object({ pin: ownPin, branch: z.number().int().min(0), reason: text(500) }),
  responses: { 200: officeWalk },
});
/** Marks refused events as looked at, with a reason; they stay stored. */
export const settleQuarantine = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/quarantine',
  auth: 'office',
  right: 'accept',
  params: idParams,
  body: z.object({ hash: z.string().regex(/^[0-9a-f]{64}$/), reason: text(500) }),
  responses: { 200: officeWalk },
});
