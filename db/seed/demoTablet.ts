import { createHash, webcrypto } from 'node:crypto';
import { CompactEncrypt, importJWK } from 'jose';
import type { CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { Receipt } from '@shared/contracts/sync.contract';
import type { EnrolledTablet } from '@shared/contracts/tablets.contract';
import { canonicalJson } from '@shared/record/canonicalJson';
import type { PublicJwk, RecordCrypto, Signer } from '@shared/record/crypto';
import type { SignedEvent } from '@shared/record/envelope';
import { jwkThumbprint } from '@shared/record/jwkThumbprint';
import { recordCryptoFrom } from '@shared/record/recordCryptoFrom';
import type { SealFor } from './walker/walkLog';

const crypto: RecordCrypto = recordCryptoFrom(webcrypto.subtle);

/** A PIN sealed for an event: its hash goes into the event, the JWE beside the batch. */
interface SealMade {
  seal: string;
  jwe: string;
}

/** A tablet that the demo's walks were written on: real key, real seals, real requests. */
export interface DemoTablet {
  id: string;
  shop: string;
  signer: Signer;
  crypto: RecordCrypto;
  catalogue: CatalogueAnswer;
  seal(what: SealFor, pin: string): Promise<SealMade>;
  /** Sends a chain; throws unless the server stores every event of it. */
  send(walk: string, events: readonly SignedEvent[], seals: readonly { hash: string; jwe: string }[]): Promise<Receipt>;
}

/** Asks the server; throws with what it answered unless it succeeds. */
export async function ask<T>(
  url: string,
  method: string,
  body?: unknown,
  headers: Record<string, string> = {},
): Promise<T> {
  const answer = await fetch(url, {
    method,
    headers: { 'content-type': 'application/json', ...headers },
    ...(body === undefined ? {} : { body: JSON.stringify(body) }),
  });
  const text = await answer.text();
  if (!answer.ok) throw new Error(`${method} ${url} answered ${answer.status}: ${text}`);
  return JSON.parse(text) as T;
}

async function makeKey(): Promise<{ publicJwk: PublicJwk; signer: Signer }> {
  const pair = await webcrypto.subtle.generateKey({ name: 'ECDSA', namedCurve: 'P-256' }, true, ['sign', 'verify']);
  const { x = '', y = '' } = await webcrypto.subtle.exportKey('jwk', pair.publicKey);
  const publicJwk: PublicJwk = { kty: 'EC', crv: 'P-256', x, y };
  const algorithm = { name: 'ECDSA', hash: 'SHA-256' };
  const sign = async (input: Uint8Array): Promise<Uint8Array> =>
    new Uint8Array(await webcrypto.subtle.sign(algorithm, pair.privateKey, new Uint8Array(input)));
  return { publicJwk, signer: { kid: await jwkThumbprint(publicJwk, crypto), sign } };
}

const sealTo =
  (sealingKey: EnrolledTablet['sealingKey']) =>
  async (what: SealFor, pin: string): Promise<SealMade> => {
    const { kid, ...jwk } = sealingKey;
    const payload = new TextEncoder().encode(canonicalJson({ ...what, pin, pinVersion: 1 }));
    const header = { alg: 'ECDH-ES', enc: 'A256GCM', ...(kid ? { kid } : {}) };
    const jwe = await new CompactEncrypt(payload).setProtectedHeader(header).encrypt(await importJWK(jwk, 'ECDH-ES'));
    return { jwe, seal: createHash('sha256').update(jwe).digest('hex') };
  };

/** Enrols a tablet at the demo's door and fetches the catalogue, as a browser does. */
export async function enrolDemoTablet(url: string): Promise<DemoTablet> {
  const { publicJwk, signer } = await makeKey();
  const enrolled = await ask<EnrolledTablet>(`${url}/api/demo/tablet`, 'POST', { publicJwk });
  const bearer = { authorization: `Bearer ${enrolled.token}` };
  const catalogue = await ask<CatalogueAnswer>(`${url}/api/tablet/catalogue`, 'GET', undefined, bearer);
  return {
    id: enrolled.tablet.id,
    shop: enrolled.shop.id,
    signer,
    crypto,
    catalogue,
    seal: sealTo(enrolled.sealingKey),
    send: async (walk, events, seals) => {
      const path = `${url}/api/tablet/walks/${walk}/events`;
      const receipt = await ask<Receipt>(path, 'POST', { branch: 0, events, seals }, bearer);
      const refused = receipt.quarantined.map(({ seq, code, details }) => `${seq} ${code} ${JSON.stringify(details)}`);
      if (refused.length > 0) throw new Error(`the server refuses events of the demo: ${refused.join('; ')}`);
      return receipt;
    },
  };
}
