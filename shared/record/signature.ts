import { err, ok, type Result } from '../kernel/result';
import { base64urlToBytes, bytesToBase64url, utf8, utf8ToText } from './bytes';
import { canonicalJson } from './canonicalJson';
import type { PublicJwk, RecordCrypto, Signer } from './crypto';

/**
 * Why a signature does not count: not of the form `header..signature`, another algorithm than ES256, signed by a key
 * nobody here knows, or not a signature of this text.
 */
export interface SignatureProblem {
  code: 'malformedSignature' | 'wrongAlgorithm' | 'unknownKey' | 'wrongSignature';
  kid?: string;
}

/** The keys that may have signed, by RFC 7638 thumbprint. A `Map` fits. */
export type KeyByKid = Pick<ReadonlyMap<string, PublicJwk>, 'get'>;

const headerFor = (kid: string): string => canonicalJson({ alg: 'ES256', kid });

const signingInput = (header: string, text: string): Uint8Array => utf8(`${header}.${bytesToBase64url(utf8(text))}`);

/** Signs a text: a compact JWS with the payload left out (RFC 7515, appendix F), header `{"alg":"ES256","kid":…}`. */
export async function signDetached(text: string, signer: Signer): Promise<string> {
  const header = bytesToBase64url(utf8(headerFor(signer.kid)));
  const signature = await signer.sign(signingInput(header, text));
  return `${header}..${bytesToBase64url(signature)}`;
}

function readHeader(encoded: string): Result<string, SignatureProblem> {
  const bytes = base64urlToBytes(encoded);
  const text = bytes && utf8ToText(bytes);
  if (!text) return err({ code: 'malformedSignature' });
  let header: unknown;
  try {
    header = JSON.parse(text);
  } catch {
    return err({ code: 'malformedSignature' });
  }
  const { alg, kid } = (header ?? {}) as { alg?: unknown; kid?: unknown };
  if (alg !== 'ES256') return err({ code: typeof alg === 'string' ? 'wrongAlgorithm' : 'malformedSignature' });
  // Only our own header counts: an extra member (`crit`, `b64`) would change what was signed without our knowing.
  if (typeof kid !== 'string' || headerFor(kid) !== text) return err({ code: 'malformedSignature' });
  return ok(kid);
}

/** Checks a detached signature over a text; gives the thumbprint of the key that made it. Never throws on bad input. */
export async function verifyDetached(
  text: string,
  sig: string,
  keyByKid: KeyByKid,
  crypto: RecordCrypto,
): Promise<Result<{ kid: string }, SignatureProblem>> {
  const [header, payload, signature, ...more] = sig.split('.');
  if (!header || payload !== '' || !signature || more.length > 0) return err({ code: 'malformedSignature' });
  const bytes = base64urlToBytes(signature);
  if (bytes?.length !== 64) return err({ code: 'malformedSignature' });
  const kid = readHeader(header);
  if (!kid.ok) return kid;
  const key = keyByKid.get(kid.value);
  if (!key) return err({ code: 'unknownKey', kid: kid.value });
  const right = await crypto.verifyEs256(key, signingInput(header, text), bytes);
  return right ? ok({ kid: kid.value }) : err({ code: 'wrongSignature', kid: kid.value });
}
