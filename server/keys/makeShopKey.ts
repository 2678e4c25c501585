import { generateKeyPairSync } from 'node:crypto';
import type { PublicJwk, RecordCrypto } from '@shared/record/crypto';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';

/** A fresh key pair on P-256, for ES256 (signing) or ECDH-ES (sealing), named by the RFC 7638 thumbprint. */
export const makeShopKey = async (purpose: 'signing' | 'sealing', crypto: RecordCrypto) => {
  const { privateKey } = generateKeyPairSync('ec', { namedCurve: 'P-256' });
  const privateJwk = privateKey.export({ format: 'jwk' });
  const { x = '', y = '' } = privateJwk;
  const publicJwk: PublicJwk = { kty: 'EC', crv: 'P-256', x, y };
  return { kid: await jwkThumbprint(publicJwk, crypto), purpose, publicJwk, privateJwk };
};
