import { z } from 'zod';
import { id, idParams, moment, namedJwk, sha256, text } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** What a proof is worth today (D3). */
export const proofState = z.enum(['issued', 'superseded', 'revoked', 'inDoubt']);

/** A proof's line in a list. */
export const proofRow = z.object({
  id,
  number: z.string(),
  issue: z.number().int(),
  state: proofState,
  walk: id,
  issuedAt: moment,
  issuedBy: id,
  jobNumber: z.string(),
  engineSerial: z.string(),
  vin: z.string(),
  claim: z.string(),
  customer: z.string(),
  procedure: z.string(),
  /** SHA-256 of the signed document's payload. */
  fingerprint: sha256,
  publicUrl: z.string(),
  revokedReason: z.string().nullable(),
});
/** A proof's line in a list. */
export type ProofRow = z.output<typeof proofRow>;

/**
 * A proof with its signed document: a compact JWS whose payload is the RFC 8785 text of the document, then the lines of
 * the side sheet, a tilde behind every part (`openProof` of shared/proof takes it apart).
 */
export const proofWhole = proofRow.extend({ jws: z.string() });
/** A proof with its signed document. */
export type ProofWhole = z.output<typeof proofWhole>;

/** Search by VIN, serial, job, claim, number, customer; an empty `q` gives the newest. */
export const listProofs = defineEndpoint({
  method: 'GET',
  path: '/api/proofs',
  auth: 'office',
  right: 'keepProofs',
  query: z.object({
    q: z.string().trim().max(100).default(''),
    limit: z.coerce.number().int().min(1).max(200).default(50),
  }),
  responses: { 200: z.object({ proofs: z.array(proofRow) }) },
});
/**
 * Issues the proof of a finished walk; issuing again after a change is a new issue that supersedes the last. Errors:
 * `proof.blocked` 409 with `details.blocks` (`{code, details}`: `proof.notSigned`, `proof.notCountersigned`,
 * `proof.notReleased`, `proof.confirmationMissing`, `proof.confirmationRefused`, `proof.quarantined`, `proof.forked`,
 * `proof.blobsMissing`, `proof.notIssuable`, `proof.voided`), `walk.broken` 409 with `details.seq`, `walk.unknown` 404.
 */
export const issueProof = defineEndpoint({
  method: 'POST',
  path: '/api/walks/:id/proof',
  auth: 'office',
  right: 'keepProofs',
  params: idParams,
  body: z.object({
    note: z.string().trim().max(500).default(''),
    language: z.enum(['en', 'es']).default('en'),
  }),
  responses: { 201: proofWhole },
});
/** A proof. Errors: `proof.unknown` 404. */
export const getProof = defineEndpoint({
  method: 'GET',
  path: '/api/proofs/:id',
  auth: 'office',
  right: 'keepProofs',
  params: idParams,
  responses: { 200: proofWhole },
});
/**
 * The page, made from the stored document: the same bytes every time, but for a stamp where the proof is worth less today.
 * Errors: `proof.unknown` 404, `proof.documentBroken` 409 where the stored document cannot be read any more.
 */
export const proofPdf = defineEndpoint({
  method: 'GET',
  path: '/api/proofs/:id/pdf',
  auth: 'office',
  right: 'keepProofs',
  params: idParams,
  query: z.object({ size: z.enum(['letter', 'a4']).default('a4'), language: z.enum(['en', 'es']).default('en') }),
  responses: { 200: { kind: 'binary', contentType: 'application/pdf' } },
});
/** Revokes: the public page says so from then on. Errors: `proof.unknown` 404, `proof.notInForce` 409. */
export const revokeProof = defineEndpoint({
  method: 'POST',
  path: '/api/proofs/:id/revoke',
  auth: 'office',
  right: 'keepProofs',
  params: idParams,
  body: z.object({ reason: text(500) }),
  responses: { 200: proofRow },
});

/** What anybody with the QR code sees. */
export const publicProofAnswer = z.object({
  number: z.string(),
  issue: z.number().int(),
  state: proofState,
  shop: z.object({ id, name: z.string() }),
  issuedAt: moment,
  reason: z.string().nullable(),
  /** Number and link of the issue that took its place. */
  supersededBy: z.object({ number: z.string(), issue: z.number().int(), publicUrl: z.string() }).nullable(),
  jws: z.string(),
  keys: z.array(namedJwk),
  /** SHA-256 of each event of the record as the shop stores it today: a change is named by its event. */
  stored: z.array(sha256),
});
/** What anybody with the QR code sees. */
export type PublicProof = z.output<typeof publicProofAnswer>;

/** Errors: `proof.unknown` 404. */
export const publicProof = defineEndpoint({
  method: 'GET',
  path: '/api/public/proofs/:token',
  auth: 'public',
  params: z.object({ token: z.string().max(100) }),
  responses: { 200: publicProofAnswer },
});
/** The shop's signing keys, past ones too (RFC 7517). Errors: `shop.unknown` 404. */
export const publicJwks = defineEndpoint({
  method: 'GET',
  path: '/api/public/jwks/:shop',
  auth: 'public',
  params: z.object({ shop: id }),
  responses: { 200: z.object({ keys: z.array(namedJwk) }) },
});
