import { createPublicKey, verify } from 'node:crypto';
import { flattenedVerify, importJWK, calculateJwkThumbprint } from 'jose';
import { describe, expect, it } from 'vitest';
import { base64urlToBytes, bytesToBase64url, bytesToHex, utf8 } from '@shared/record/bytes';
import { sealEvent } from '@shared/record/chain';
import type { PublicJwk } from '@shared/record/crypto';
import { ZERO_HASH, type Envelope } from '@shared/record/envelope';
import { jwkThumbprint, type ThumbprintJwk } from '@shared/record/jwkThumbprint';
import { signDetached } from '@shared/record/signature';
import { isUuid, uuidV7 } from '@shared/kernel/ids';
import { makeTestSigner, testCrypto } from '../support/testSigner';
import { provenance, workedExample } from './reference';

const digest = workedExample<{ utf8: string }, { hex: string }>('REF-REC-01');
const es256 = workedExample<{ jwk: PublicJwk; signing_input: string; signature_b64url: string }, { valid: boolean }>(
  'REF-REC-04',
);
const rsa = workedExample<{ jwk: ThumbprintJwk }, { thumbprint: string }>('REF-REC-05');
const ec = workedExample<object, { thumbprint: string }>('REF-REC-06');
const uuid = workedExample<{ uuid: string }, { unix_ms: number; iso: string }>('REF-REC-07');

describe('published vectors', () => {
  it(provenance(digest), async () => {
    expect(bytesToHex(await testCrypto.sha256(utf8(digest.inputs.utf8)))).toBe(digest.expected.hex);
  });

  it(provenance(es256), async () => {
    const { jwk, signing_input, signature_b64url } = es256.inputs;
    const signature = base64urlToBytes(signature_b64url);
    if (!signature) throw new Error('The published signature is no base64url');
    expect(signature).toHaveLength(64);
    expect(await testCrypto.verifyEs256(jwk, utf8(signing_input), signature)).toBe(true);
    expect(await testCrypto.verifyEs256(jwk, utf8(`${signing_input}A`), signature)).toBe(false);
    expect(await testCrypto.verifyEs256(jwk, utf8(signing_input), signature.with(9, 0xaa))).toBe(false);
    expect(await testCrypto.verifyEs256(jwk, utf8(signing_input), signature.slice(1))).toBe(false);
  });

  it(provenance(rsa), async () => {
    expect(await jwkThumbprint(rsa.inputs.jwk, testCrypto)).toBe(rsa.expected.thumbprint);
  });

  it(provenance(ec), async () => {
    const withMore = { ...es256.inputs.jwk, kid: 'ignored', use: 'sig' };
    expect(await jwkThumbprint(withMore, testCrypto)).toBe(ec.expected.thumbprint);
  });

  it('RFC 7515, appendix C: base64url of 3 236 255 224 193 is A-z_4ME (memory, confidence 1.0)', () => {
    expect(bytesToBase64url(new Uint8Array([3, 236, 255, 224, 193]))).toBe('A-z_4ME');
    expect(base64urlToBytes('A-z_4ME')).toEqual(new Uint8Array([3, 236, 255, 224, 193]));
  });

  it(provenance(uuid), () => {
    const expected = uuid.inputs.uuid.toLowerCase();
    const random = new Uint8Array(Buffer.from(expected.replaceAll('-', ''), 'hex'));
    expect(uuidV7(Date.parse(uuid.expected.iso), random)).toBe(expected);
    expect(uuid.expected.unix_ms).toBe(Date.parse(uuid.expected.iso));
    expect(isUuid(expected)).toBe(true);
  });
});

describe('independent judges of what we sign (run here)', () => {
  const id = '017f22e2-79b0-7cc3-98c4-dc0c0c07398f';
  const envelope: Envelope = {
    ...{ v: 1, shop: id, walk: id, branch: 0, seq: 0, prev: ZERO_HASH, at: '2026-03-05T14:03:22Z', mono: 0 },
    ...{ boot: 'b1', known: 0, by: id, tablet: id, type: 'note.added', data: { text: 'ángulo 90° 😂' } },
  };

  it('the jose library verifies a sealed event as a JWS with detached payload (RFC 7515, appendix F)', async () => {
    const { signer, publicJwk } = await makeTestSigner();
    const { text, sig } = await sealEvent(envelope, signer, testCrypto);
    const [header = '', payload, signature = ''] = sig.split('.');
    expect(payload).toBe('');
    const jws = { protected: header, payload: Buffer.from(text, 'utf8').toString('base64url'), signature };
    const verified = await flattenedVerify(jws, await importJWK({ ...publicJwk }, 'ES256'));
    expect(verified.protectedHeader).toEqual({ alg: 'ES256', kid: await calculateJwkThumbprint({ ...publicJwk }) });
    expect(new TextDecoder().decode(verified.payload)).toBe(text);
  });

  it("Node's OpenSSL verifies our signature over header.payload", async () => {
    const { signer, publicJwk } = await makeTestSigner();
    const [header, , signature = ''] = (await signDetached('{"a":1}', signer)).split('.');
    const input = Buffer.from(`${header}.${Buffer.from('{"a":1}').toString('base64url')}`);
    const key = { key: createPublicKey({ key: { ...publicJwk }, format: 'jwk' }), dsaEncoding: 'ieee-p1363' } as const;
    expect(verify('sha256', input, key, Buffer.from(signature, 'base64url'))).toBe(true);
    expect(verify('sha256', Buffer.from('x'), key, Buffer.from(signature, 'base64url'))).toBe(false);
  });
});
