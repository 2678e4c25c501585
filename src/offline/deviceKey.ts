import type { PublicJwk, RecordCrypto, Signer } from '@shared/record/crypto';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import type { DeviceKey } from './settingValues';

const ES256 = { name: 'ECDSA', namedCurve: 'P-256' } as const;

/** Makes the tablet's ES256 key. The private half is not extractable: it can be used here, but never copied out. */
export async function makeDeviceKey(record: RecordCrypto): Promise<DeviceKey> {
  const pair = await crypto.subtle.generateKey(ES256, false, ['sign', 'verify']);
  const exported = await crypto.subtle.exportKey('jwk', pair.publicKey);
  const publicJwk: PublicJwk = { kty: 'EC', crv: 'P-256', x: exported.x ?? '', y: exported.y ?? '' };
  return { kid: await jwkThumbprint(publicJwk, record), publicJwk, privateKey: pair.privateKey };
}

/** Signs with the tablet's key. */
export const signerOf = (key: DeviceKey): Signer => ({
  kid: key.kid,
  sign: async (input) =>
    new Uint8Array(await crypto.subtle.sign({ name: 'ECDSA', hash: 'SHA-256' }, key.privateKey, new Uint8Array(input))),
});
