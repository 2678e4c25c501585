import { createHash, createPublicKey, verify, type KeyObject } from 'node:crypto';
import type { PublicJwk, RecordCrypto } from '@shared/record/crypto';

const MOST_KEYS_KEPT = 1_000;

const publicKeyOf = (jwk: PublicJwk): KeyObject | null => {
  try {
    return createPublicKey({ key: { ...jwk }, format: 'jwk' });
  } catch {
    return null; // a point off the curve verifies nothing
  }
};

/** Imports public keys once: a batch is verified with one key over hundreds of events. */
const keyImporter = () => {
  const imported = new Map<string, KeyObject | null>();
  return ({ kty, crv, x, y }: PublicJwk): KeyObject | null => {
    const name = `${x}.${y}`;
    const known = imported.get(name);
    if (known !== undefined) return known;
    if (imported.size >= MOST_KEYS_KEPT) imported.clear();
    const key = publicKeyOf({ kty, crv, x, y });
    imported.set(name, key);
    return key;
  };
};

/**
 * What the record needs of cryptography, by Node's own: hashing at once, signatures on the thread pool, so that a batch
 * of 500 uses every core and blocks no other request.
 */
export const nodeRecordCrypto = (): RecordCrypto => {
  const importKey = keyImporter();
  return {
    sha256: (bytes) => Promise.resolve(new Uint8Array(createHash('sha256').update(bytes).digest())),
    verifyEs256: (jwk, signingInput, sig) => {
      const key = importKey(jwk);
      if (!key || sig.length !== 64) return Promise.resolve(false);
      return new Promise((resolve, reject) => {
        verify('sha256', signingInput, { key, dsaEncoding: 'ieee-p1363' }, sig, (error, right) => {
          if (error) reject(error);
          else resolve(right);
        });
      });
    },
  };
};
