import { bytesToBase64url, utf8 } from './bytes';
import { canonicalJson } from './canonicalJson';
import type { PublicJwk, RecordCrypto } from './crypto';

// RFC 7638, 3.2. RSA keys sign nothing here; they are known so that the RFC's own example can check this function.
const REQUIRED: Readonly<Record<string, readonly string[]>> = { EC: ['crv', 'kty', 'x', 'y'], RSA: ['e', 'kty', 'n'] };

/** A public key of which a thumbprint can be taken. */
export type ThumbprintJwk = PublicJwk | { kty: 'RSA'; e: string; n: string };

/** The RFC 7638 thumbprint: base64url SHA-256 of the required members in order, other members left out. */
export async function jwkThumbprint(jwk: ThumbprintJwk, crypto: Pick<RecordCrypto, 'sha256'>): Promise<string> {
  const members = Object.entries(jwk).filter(([name]) => REQUIRED[jwk.kty]?.includes(name));
  return bytesToBase64url(await crypto.sha256(utf8(canonicalJson(Object.fromEntries(members)))));
}
