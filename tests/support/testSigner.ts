import { webcrypto } from 'node:crypto';
import type { PublicJwk, RecordCrypto, Signer } from '@shared/record/crypto';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import { recordCryptoFrom } from '@shared/record/recordCryptoFrom';

/** A key made for a test, as a tablet would hold one: its private half signs, its public half can be looked up. */
export interface TestSigner {
  signer: Signer;
  publicJwk: PublicJwk;
}

/** Node's own Web Crypto behind the port that shared/record asks for. */
export const testCrypto: RecordCrypto = recordCryptoFrom(webcrypto.subtle);

/** Makes a fresh ES256 key pair. */
export async function makeTestSigner(): Promise<TestSigner> {
  const pair = await webcrypto.subtle.generateKey({ name: 'ECDSA', namedCurve: 'P-256' }, true, ['sign', 'verify']);
  const { x = '', y = '' } = await webcrypto.subtle.exportKey('jwk', pair.publicKey);
  const publicJwk: PublicJwk = { kty: 'EC', crv: 'P-256', x, y };
  const sign = async (input: Uint8Array): Promise<Uint8Array> =>
    new Uint8Array(
      await webcrypto.subtle.sign({ name: 'ECDSA', hash: 'SHA-256' }, pair.privateKey, new Uint8Array(input)),
    );
  return { signer: { kid: await jwkThumbprint(publicJwk, testCrypto), sign }, publicJwk };
}
