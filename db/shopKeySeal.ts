import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';

const NONCE = 12;
const TAG = 16;

/** The secret that keys of the demo's shops are sealed with where none is given; production refuses it. */
export const DEMO_SECRET = 'boltwalk-demo-secret-not-for-a-real-shop';

const keyFrom = (secret: string, shop: string): Buffer =>
  Buffer.from(hkdfSync('sha256', secret, shop, 'boltwalk shop keys 1', 32));

/** Seals a private JWK for storage: AES-256-GCM, key by HKDF-SHA-256 from the secret, bound to the shop and the `kid`. */
export const sealPrivateJwk = (jwk: object, secret: string, shop: string, kid: string): string => {
  const nonce = randomBytes(NONCE);
  const cipher = createCipheriv('aes-256-gcm', keyFrom(secret, shop), nonce).setAAD(Buffer.from(kid));
  const body = Buffer.concat([cipher.update(JSON.stringify(jwk), 'utf8'), cipher.final()]);
  return Buffer.concat([nonce, body, cipher.getAuthTag()]).toString('base64url');
};

/** Opens what `sealPrivateJwk` made, or answers null when none of the secrets fits. */
export const openPrivateJwk = (
  sealed: string,
  secrets: readonly string[],
  shop: string,
  kid: string,
): Record<string, string> | null => {
  const bytes = Buffer.from(sealed, 'base64url');
  for (const secret of secrets) {
    const decipher = createDecipheriv('aes-256-gcm', keyFrom(secret, shop), bytes.subarray(0, NONCE));
    decipher.setAAD(Buffer.from(kid)).setAuthTag(bytes.subarray(-TAG));
    try {
      const text = Buffer.concat([decipher.update(bytes.subarray(NONCE, -TAG)), decipher.final()]).toString('utf8');
      return JSON.parse(text) as Record<string, string>;
    } catch {
      continue; // another secret may fit
    }
  }
  return null;
};
