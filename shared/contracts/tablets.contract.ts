import { z } from 'zod';
import { id, idParams, moment, namedJwk, publicJwk, text } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** A tablet as the admin sees it. */
export const tabletRow = z.object({
  id,
  name: z.string(),
  state: z.enum(['active', 'revoked']),
  kid: z.string(),
  enrolledAt: moment,
  seenAt: moment.nullable(),
  revokedAt: moment.nullable(),
  /** Last report of what waits on the tablet (POST /api/tablet/report). */
  report: z.object({ at: moment, waiting: z.number(), refused: z.number(), stored: z.number() }).nullable(),
});
/** A tablet as the admin sees it. */
export type TabletRow = z.output<typeof tabletRow>;

/** What a tablet learns when it is enrolled: kept in its settings for good. */
export const enrolledTablet = z.object({
  tablet: z.object({ id, name: z.string() }),
  shop: z.object({ id, name: z.string() }),
  /** Keys that sign confirmations, orders and office events. */
  signingKeys: z.array(namedJwk),
  /** Key to which PINs are sealed (ECDH-ES). */
  sealingKey: namedJwk,
  /** Bearer token, 15 minutes. */
  token: z.string(),
  expiresAt: moment,
});
/** What a tablet learns when it is enrolled. */
export type EnrolledTablet = z.output<typeof enrolledTablet>;

/** A one-time code, valid for an hour, shown once. */
export const createEnrolmentCode = defineEndpoint({
  method: 'POST',
  path: '/api/tablets/enrolment-codes',
  auth: 'office',
  right: 'administer',
  body: z.object({ note: z.string().trim().max(80).default('') }),
  responses: { 201: z.object({ code: z.string(), expiresAt: moment }) },
});

/** Text that a tablet signs to prove that it holds the private key: `boltwalk-enrol:<code>:<kid>`. */
export const enrolmentProofText = (code: string, kid: string): string => `boltwalk-enrol:${code}:${kid}`;
/**
 * Enrols a tablet. `proof` is the detached JWS (as on events) over `enrolmentProofText`. Errors: `enrolment.unknownCode`
 * 404, `enrolment.codeUsed` 409, `enrolment.codeExpired` 410, `enrolment.badProof` 400.
 */
export const enrol = defineEndpoint({
  method: 'POST',
  path: '/api/tablets/enrol',
  auth: 'public',
  body: z.object({ code: text(80), name: text(60), publicJwk, proof: z.string().max(1000) }),
  responses: { 201: enrolledTablet },
});

/** A challenge, valid for two minutes, for a tablet that wants a token. */
export const challenge = defineEndpoint({
  method: 'POST',
  path: '/api/tablets/challenge',
  auth: 'public',
  body: z.object({ shop: id, tablet: id }),
  responses: { 200: z.object({ challenge: z.string(), expiresAt: moment }) },
});
/** Text that a tablet signs for a token. */
export const challengeText = (value: string): string => `boltwalk-token:${value}`;
/**
 * A bearer for 15 minutes. `signature` is the detached JWS over `challengeText`. Errors: `tablet.revoked` 403,
 * `tablet.unknown` 404, `challenge.expired` 410, `challenge.badSignature` 401.
 */
export const token = defineEndpoint({
  method: 'POST',
  path: '/api/tablets/token',
  auth: 'public',
  body: z.object({ shop: id, tablet: id, challenge: z.string().max(500), signature: z.string().max(1000) }),
  responses: { 200: z.object({ token: z.string(), expiresAt: moment }) },
});

/** Every tablet of the shop, revoked ones too. */
export const listTablets = defineEndpoint({
  method: 'GET',
  path: '/api/tablets',
  auth: 'office',
  right: 'administer',
  responses: { 200: z.object({ tablets: z.array(tabletRow) }) },
});
/** Revokes a tablet's key: what it sends from then on is refused and stays on it. */
export const revokeTablet = defineEndpoint({
  method: 'POST',
  path: '/api/tablets/:id/revoke',
  auth: 'office',
  right: 'administer',
  params: idParams,
  body: z.object({ reason: text(300) }),
  responses: { 200: tabletRow },
});
