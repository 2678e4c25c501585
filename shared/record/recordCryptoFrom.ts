import type { PublicJwk, RecordCrypto } from './crypto';

/** The part of `SubtleCrypto` that the record uses; both the browser's and Node's fit. */
export interface SubtleCryptoLike {
  digest(algorithm: 'SHA-256', data: Uint8Array<ArrayBuffer>): Promise<ArrayBuffer>;
  importKey(
    format: 'jwk',
    key: PublicJwk,
    algorithm: { name: 'ECDSA'; namedCurve: 'P-256' },
    extractable: boolean,
    usages: 'verify'[],
  ): Promise<unknown>;
  verify(
    algorithm: { name: 'ECDSA'; hash: 'SHA-256' },
    key: unknown,
    signature: Uint8Array<ArrayBuffer>,
    data: Uint8Array<ArrayBuffer>,
  ): Promise<boolean>;
}

const MOST_KEYS_KEPT = 256;

/**
 * {@link RecordCrypto} over Web Crypto. Imported keys are kept, because a chain is verified with one or two keys over
 * hundreds of events. A key that cannot be imported (a point off the curve) verifies nothing: the answer is false.
 */
export function recordCryptoFrom(subtle: SubtleCryptoLike): RecordCrypto {
  const imported = new Map<string, Promise<{ key: unknown } | null>>();

  const importOnce = (jwk: PublicJwk): Promise<{ key: unknown } | null> => {
    const name = `${jwk.x}.${jwk.y}`;
    const known = imported.get(name);
    if (known) return known;
    if (imported.size >= MOST_KEYS_KEPT) imported.clear();
    const { kty, crv, x, y } = jwk;
    const made = subtle
      .importKey('jwk', { kty, crv, x, y }, { name: 'ECDSA', namedCurve: 'P-256' }, false, ['verify'])
      .then(
        (key) => ({ key }),
        () => null,
      );
    imported.set(name, made);
    return made;
  };

  return {
    sha256: async (bytes) => new Uint8Array(await subtle.digest('SHA-256', new Uint8Array(bytes))),
    verifyEs256: async (jwk, signingInput, sig) => {
      if (sig.length !== 64) return false;
      const found = await importOnce(jwk);
      if (!found) return false;
      const algorithm = { name: 'ECDSA', hash: 'SHA-256' } as const;
      return subtle.verify(algorithm, found.key, new Uint8Array(sig), new Uint8Array(signingInput));
    },
  };
}
