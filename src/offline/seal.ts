import { CompactEncrypt, importJWK } from 'jose';
import { canonicalJson } from '@shared/record/canonicalJson';
import { bytesToHex, utf8 } from '@shared/record/bytes';
import type { PublicJwk, RecordCrypto } from '@shared/record/crypto';

/** A sealed PIN and the hash by which the event names it. */
export interface SealedPin {
  jwe: string;
  /** Hex SHA-256 of `jwe`: goes into the event's data. */
  hash: string;
}

/** Seals a text to the shop: nobody but the server can open it (decision 6). */
export type Sealer = (payload: Record<string, unknown>) => Promise<SealedPin>;

/**
 * Seals to the shop's ECDH-ES key: a fresh key pair for each seal, so that two seals of one PIN look nothing alike and a
 * tablet that is taken apart tells nothing of the PINs it has sent.
 */
export function sealerFor(sealingKey: PublicJwk & { kid?: string }, record: RecordCrypto): Sealer {
  return async (payload) => {
    const { kid, ...jwk } = sealingKey;
    const key = await importJWK(jwk, 'ECDH-ES');
    const jwe = await new CompactEncrypt(utf8(canonicalJson(payload)))
      .setProtectedHeader({ alg: 'ECDH-ES', enc: 'A256GCM', ...(kid ? { kid } : {}) })
      .encrypt(key);
    return { jwe, hash: bytesToHex(await record.sha256(utf8(jwe))) };
  };
}
