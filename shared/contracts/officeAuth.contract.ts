import { z } from 'zod';
import { done, id, role } from './common.contract';
import { shopSettings } from './settings.contract';
import { defineEndpoint } from './defineEndpoint';

/** Name of the header that carries the token of `me.csrf` with every office write. */
export const CSRF_HEADER = 'x-boltwalk-csrf';

/** Who is signed in at the office. `csrf` goes back in `CSRF_HEADER` with every write. */
export const officeMe = z.object({
  person: z.object({ id, name: z.string(), email: z.string(), roles: z.array(role) }),
  shop: z.object({ id, name: z.string(), timeZone: z.string(), settings: shopSettings }),
  csrf: z.string(),
});
/** Who is signed in at the office. */
export type OfficeMe = z.output<typeof officeMe>;

/**
 * Sign in by e-mail and password; sets the session cookie (httpOnly). Errors: `signIn.refused` 401,
 * `signIn.wait` 429 with `details.seconds`, `signIn.whichShop` 409 with `details.shops` when one address and password
 * fit several shops (then send `shop`).
 */
export const signIn = defineEndpoint({
  method: 'POST',
  path: '/api/office/sign-in',
  auth: 'public',
  body: z.object({ email: z.email().max(200), password: z.string().min(1).max(200), shop: id.optional() }),
  responses: { 200: officeMe },
});
/** Ends the session. */
export const signOut = defineEndpoint({
  method: 'POST',
  path: '/api/office/sign-out',
  auth: 'office',
  responses: { 200: done },
});
/** Who is signed in; 401 `session.missing` or `session.expired` when nobody is. */
export const me = defineEndpoint({
  method: 'GET',
  path: '/api/office/me',
  auth: 'office',
  responses: { 200: officeMe },
});
