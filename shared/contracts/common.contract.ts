import { z } from 'zod';
import { isUuid } from '../kernel/ids';

/** Any identifier of a row: a UUID in lower case (ids are compared as text). */
export const id = z.string().refine(isUuid, { error: 'id.notUuid' });
/** Path parameters of everything addressed by one identifier. */
export const idParams = z.object({ id });
/** Lower-case hex SHA-256. */
export const sha256 = z.string().regex(/^[0-9a-f]{64}$/);
/** ISO 8601 UTC moment. */
export const moment = z.iso.datetime();
/** Lone surrogates and U+0000 can stand neither in a chain nor in the database. */
const isStorable = (value: string): boolean => !/\p{Surrogate}/u.test(value) && !value.includes('\u0000');
/** Text somebody typed: trimmed, well-formed, without U+0000. */
export const text = (most: number) =>
  z.string().trim().min(1).max(most).refine(isStorable, { error: 'text.notWellFormed' });
/** Like `text`, but may be left empty. */
export const optionalText = (most: number) =>
  z.string().trim().max(most).refine(isStorable, { error: 'text.notWellFormed' });
/** Public part of an ES256 or ECDH-ES key on P-256 (RFC 7517). */
export const publicJwk = z.object({
  kty: z.literal('EC'),
  crv: z.literal('P-256'),
  x: z.string().regex(/^[A-Za-z0-9_-]{43}$/),
  y: z.string().regex(/^[A-Za-z0-9_-]{43}$/),
  kid: z.string().max(64).optional(),
});
/** Public key with its RFC 7638 thumbprint as `kid`. */
export const namedJwk = publicJwk.extend({ kid: z.string().max(64) });
/** A compact JWE (RFC 7516): ECDH-ES + A256GCM to the shop's sealing key. */
export const sealedPin = z
  .string()
  .max(4096)
  .regex(/^[A-Za-z0-9_-]+\.\.[A-Za-z0-9_-]+\.[A-Za-z0-9_-]+\.[A-Za-z0-9_-]+$/);
/** A role of product.md "People and rights". */
export const role = z.enum(['technician', 'supervisor', 'clerk', 'keeper', 'admin']);
/** Purpose of a walk (W1). */
export const purpose = z.enum(['finalAssembly', 'trialFit', 'torquePlate', 'stripDown', 'recheck']);
/** Nothing to say but that it is done. */
export const done = z.object({ done: z.literal(true) });

/** Every refusal: `code` is translated as `errors.<code>`, `details` fills its message. */
export const errorAnswer = z.object({
  error: z.object({
    code: z.string(),
    message: z.string(),
    details: z.record(z.string(), z.unknown()).optional(),
  }),
});
/** Shape of every refusal. */
export type ErrorAnswer = z.output<typeof errorAnswer>;
