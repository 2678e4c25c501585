import { z } from 'zod';
import { id, idParams, moment, role, text } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** A person as the office sees them; `email` is there for admins only. */
export const personRow = z.object({
  id,
  name: z.string(),
  roles: z.array(role),
  state: z.enum(['active', 'left']),
  hasPin: z.boolean(),
  email: z.string().nullable(),
});
/** A person as the office sees them. */
export type PersonRow = z.output<typeof personRow>;

/** Everybody of the shop, also those who left (records name them). */
export const listPeople = defineEndpoint({
  method: 'GET',
  path: '/api/people',
  auth: 'office',
  right: 'see',
  responses: { 200: z.object({ people: z.array(personRow) }) },
});

/** Marks somebody as gone: signed out everywhere, PIN no longer accepted, records stay (fault 16). */
export const markLeft = defineEndpoint({
  method: 'POST',
  path: '/api/people/:id/leave',
  auth: 'office',
  right: 'administer',
  params: idParams,
  body: z.object({ reason: text(300) }),
  responses: { 200: personRow },
});

/** Six digits, trivial ones refused (P4). */
export const pin = z.string().regex(/^\d{6}$/, { error: 'pin.sixDigits' });

/** Sets one's own PIN; asks for the password again. Errors: `pin.trivial` 400, `signIn.refused` 401, `signIn.wait` 429. */
export const setOwnPin = defineEndpoint({
  method: 'POST',
  path: '/api/people/me/pin',
  auth: 'office',
  body: z.object({ password: z.string().min(1).max(200), pin }),
  responses: { 200: z.object({ pinVersion: z.number().int() }) },
});

/** One use of a PIN to accept, skip, override or countersign (P3). */
export const pinUse = z.object({
  id,
  walk: id,
  branch: z.number().int(),
  seq: z.number().int(),
  meaning: z.string(),
  at: moment,
  tablet: z.string(),
  tabletName: z.string(),
  jobNumber: z.string(),
  answer: z.enum(['mine', 'notMine']).nullable(),
  answeredAt: moment.nullable(),
});
/** One use of a PIN. */
export type PinUse = z.output<typeof pinUse>;

/** One's own PIN uses of the last 30 days, newest first. */
export const listPinUses = defineEndpoint({
  method: 'GET',
  path: '/api/pin-uses',
  auth: 'office',
  responses: { 200: z.object({ uses: z.array(pinUse) }) },
});
/** *Mine.* Errors: `pinUse.unknown` 404 (also somebody else's), `pinUse.answered` 409. */
export const ownPinUse = defineEndpoint({
  method: 'POST',
  path: '/api/pin-uses/:id/own',
  auth: 'office',
  params: idParams,
  responses: { 200: pinUse },
});
/** *Not mine*: the signature counts as refused and blocks issue until it is renewed. */
export const disownPinUse = defineEndpoint({
  method: 'POST',
  path: '/api/pin-uses/:id/disown',
  auth: 'office',
  params: idParams,
  responses: { 200: pinUse },
});
