import { beforeAll, describe, expect, it } from 'vitest';
import { makeTestSigner, testCrypto, type TestSigner } from '../../tests/support/testSigner';
import { bytesToBase64url, utf8 } from './bytes';
import type { PublicJwk } from './crypto';
import { signDetached, verifyDetached } from './signature';

let key: TestSigner;
let keys: Map<string, PublicJwk>;
const verify = (text: string, sig: string) => verifyDetached(text, sig, keys, testCrypto);
const header = (value: unknown) => bytesToBase64url(utf8(typeof value === 'string' ? value : JSON.stringify(value)));

beforeAll(async () => {
  key = await makeTestSigner();
  keys = new Map([[key.signer.kid, key.publicJwk]]);
});

describe('a detached signature', () => {
  it('has no payload in it and verifies over its text alone', async () => {
    const sig = await signDetached('text é', key.signer);
    expect(sig.split('.')).toHaveLength(3);
    expect(sig.split('.')[1]).toBe('');
    expect(await verify('text é', sig)).toEqual({ ok: true, value: { kid: key.signer.kid } });
    expect(await verify('text e', sig)).toMatchObject({ error: { code: 'wrongSignature' } });
  });

  it('counts only with our own header', async () => {
    const tail = (await signDetached('t', key.signer)).split('.')[2] ?? '';
    const kid = key.signer.kid;
    const code = async (first: string) => {
      const result = await verify('t', `${first}..${tail}`);
      return result.ok ? 'accepted' : result.error.code;
    };
    expect(await code(header({ alg: 'none', kid }))).toBe('wrongAlgorithm');
    expect(await code(header({ alg: 'HS256', kid }))).toBe('wrongAlgorithm');
    expect(await code(header({ alg: 'ES256', kid, crit: ['b64'], b64: false }))).toBe('malformedSignature');
    expect(await code(header({ kid, alg: 'ES256' }))).toBe('malformedSignature');
    expect(await code(header({ alg: 'ES256' }))).toBe('malformedSignature');
    expect(await code(header('null'))).toBe('malformedSignature');
    expect(await code(header('{'))).toBe('malformedSignature');
    expect(await code(header({ alg: 'ES256', kid: 'nobody' }))).toBe('unknownKey');
  });

  it.each(['', '.', '..', 'a.b.c', 'e30..AAAA', 'a..b..c', '💥'])('is never %j', async (sig) => {
    expect(await verify('t', sig)).toMatchObject({ ok: false, error: { code: 'malformedSignature' } });
  });

  it('verifies by no key that lies off the curve', async () => {
    const off: PublicJwk = { ...key.publicJwk, y: key.publicJwk.x };
    const sig = await signDetached('t', key.signer);
    expect(await verifyDetached('t', sig, new Map([[key.signer.kid, off]]), testCrypto)).toMatchObject({
      error: { code: 'wrongSignature' },
    });
  });
});
