import { z } from 'zod';
import { LONGEST_EVENT } from '../record/envelope';
import { done, id, moment, namedJwk, sealedPin, sha256 } from './common.contract';
import { confirmation } from './confirmation.contract';
import { defineEndpoint } from './defineEndpoint';
import { walkRow } from './walkRow.contract';

/** Most events in one batch. */
export const MOST_EVENTS = 500;
/** Largest batch in bytes. */
export const MOST_BATCH_BYTES = 4 * 1024 * 1024;

/** One event on the wire: RFC 8785 text of its envelope, SHA-256 of it, detached JWS over it. */
export const signedEvent = z.object({
  text: z.string().min(2).max(LONGEST_EVENT),
  hash: sha256,
  sig: z.string().max(500),
});
/** PIN sealed for the event of that hash (decision 6). `hash` is the event's hash, not the seal's. */
export const seal = z.object({ hash: sha256, jwe: sealedPin });

/** An event that the server keeps but will not append: a person has to look at it (I5, I6). */
export const quarantinedEvent = z.object({
  hash: sha256,
  seq: z.number().int(),
  code: z.string(),
  message: z.string(),
  details: z.record(z.string(), z.unknown()).optional(),
});
/** An event that the server keeps but will not append. */
export type QuarantinedEvent = z.output<typeof quarantinedEvent>;

/**
 * What is committed (I2). Every event of the batch is now either stored up to `next`, or listed in `quarantined`: none
 * needs to be sent again. The same batch sent twice gets the same receipt but for `accepted`.
 */
export const receipt = z.object({
  walk: id,
  /** Branch the events stand on; another than the tablet's own means a fork (decision 5). */
  branch: z.number().int(),
  forked: z.boolean(),
  /** First sequence number the server does not hold on this branch, and the hash of the event before it. */
  next: z.number().int(),
  hash: sha256,
  /** Events stored by this very request. */
  accepted: z.number().int(),
  quarantined: z.array(quarantinedEvent),
  /** Answers to the sealed PINs of this batch's events. */
  confirmations: z.array(confirmation),
  /** SHA-256 of files that events of this batch name and the server does not hold. */
  missingBlobs: z.array(sha256),
});
/** What is committed. */
export type Receipt = z.output<typeof receipt>;

/**
 * Stores a batch of one walk: consecutive events of one chain. Whole-batch errors store nothing: `batch.notCanonical`,
 * `batch.wrongHash`, `batch.badSignature`, `batch.unknownVersion`, `batch.unknownType`, `batch.otherWalk`,
 * `batch.otherShop`, `batch.otherTablet`, `batch.notConsecutive` (400, `details.index`), `batch.hole` (409,
 * `details.expectedSeq` and `details.branch`: send again from there), `batch.tooLarge` (413), `tablet.revoked` (403).
 */
export const syncEvents = defineEndpoint({
  method: 'POST',
  path: '/api/tablet/walks/:walk/events',
  auth: 'tablet',
  params: z.object({ walk: id }),
  body: z.object({
    branch: z.number().int().min(0).max(1000),
    events: z.array(signedEvent).min(1).max(MOST_EVENTS),
    seals: z.array(seal).max(MOST_EVENTS).default([]),
  }),
  limit: MOST_BATCH_BYTES,
  tooLarge: 'batch.tooLarge',
  responses: { 200: receipt },
});

/** One stored event with the branch it stands on (which may differ from the branch in its text after a fork). */
export const storedEvent = signedEvent.extend({ branch: z.number().int(), seq: z.number().int(), receivedAt: moment });
/** One stored event. */
export type StoredEvent = z.output<typeof storedEvent>;

/** A walk whole: for resuming it on another tablet, for the office, and for checking it. */
export const walkChain = z.object({
  walk: walkRow,
  /** Branch asked for (default: the one that stands), from seq 0 through its parent branches. */
  branch: z.number().int(),
  events: z.array(storedEvent),
  confirmations: z.array(confirmation),
  /** Public keys of every tablet and of the shop that signed in it, by `kid`. */
  keys: z.array(namedJwk),
});
/** A walk whole. */
export type WalkChain = z.output<typeof walkChain>;

/** The stored chain of a walk. Errors: `walk.unknown` 404. */
export const walkForTablet = defineEndpoint({
  method: 'GET',
  path: '/api/tablet/walks/:walk',
  auth: 'tablet',
  params: z.object({ walk: id }),
  query: z.object({ branch: z.coerce.number().int().min(0).optional() }),
  responses: { 200: walkChain },
});

/**
 * Makes this tablet the next writer (W11). Not forced: the walk must have been released (`walk.released` to `tablet`) or
 * handed over; forced: needs a supervisor's sealed PIN and opens a new branch. The tablet then writes `walk.takenOver`
 * with the branch of the answer. Errors: `walk.heldElsewhere` 409, `pin.wrong` 403, `pin.wait` 429, `right.missing` 403.
 */
export const takeOver = defineEndpoint({
  method: 'POST',
  path: '/api/tablet/walks/:walk/take-over',
  auth: 'tablet',
  params: z.object({ walk: id }),
  body: z.object({
    forced: z.boolean(),
    person: id,
    /** Sealed `{pin, person, walk, seq, prev, meaning: 'takeOver', pinVersion}`; required when forced. */
    jwe: sealedPin.optional(),
  }),
  responses: { 200: z.object({ branch: z.number().int(), next: z.number().int(), hash: sha256 }) },
});

/**
 * Checks a PIN online: first sign-in of a person on this tablet. Sealed payload `{pin, person, tablet, at}` (`at` at most
 * five minutes from the server's clock). Errors: `pin.wrong` 403, `pin.notSet` 409, `pin.personLeft` 403, `pin.wait` 429
 * with `details.seconds`, `seal.unreadable` 400.
 */
export const pinCheck = defineEndpoint({
  method: 'POST',
  path: '/api/tablet/pin-check',
  auth: 'tablet',
  body: z.object({ person: id, jwe: sealedPin }),
  responses: { 200: z.object({ person: id, pinVersion: z.number().int(), at: moment }) },
});

/** What waits on the tablet, so that the office sees it (I6). */
export const tabletReport = defineEndpoint({
  method: 'POST',
  path: '/api/tablet/report',
  auth: 'tablet',
  body: z.object({
    waiting: z.number().int().min(0),
    refused: z.number().int().min(0),
    /** Bytes kept. */
    stored: z.number().int().min(0),
    /** Walks whose stored head the tablet no longer holds (fault 20). */
    lost: z.array(id).max(200).default([]),
    version: z.string().max(40),
  }),
  responses: { 200: done },
});
