import { utf8 } from '@shared/record/bytes';
import type { Settings } from './settings';
import type { PinVerifier } from './settingValues';

/** PBKDF2 rounds of a new verifier (decision 10). */
export const PIN_ITERATIONS = 600_000;

const HMAC = { name: 'HMAC', hash: 'SHA-256' } as const;

/**
 * The tablet's HMAC key. It cannot be read out by a program, so that a copied database alone does not give the PINs to a
 * search; who controls the whole device can still use it there.
 */
async function pinKeyOf(settings: Settings): Promise<CryptoKey> {
  const kept = await settings.get('pinKey');
  if (kept) return kept;
  const made = (await crypto.subtle.generateKey(HMAC, false, ['sign', 'verify'])) as CryptoKey;
  return settings.update('pinKey', (old) => old ?? made);
}

async function stretched(pin: string, salt: Uint8Array<ArrayBuffer>, iterations: number): Promise<ArrayBuffer> {
  const material = await crypto.subtle.importKey('raw', utf8(pin), 'PBKDF2', false, ['deriveBits']);
  return crypto.subtle.deriveBits({ name: 'PBKDF2', hash: 'SHA-256', salt, iterations }, material, 256);
}

/** What is kept of a PIN that the server has just accepted. */
export async function makeVerifier(
  settings: Settings,
  { person, pin, pinVersion, iterations }: { person: string; pin: string; pinVersion: number; iterations: number },
): Promise<PinVerifier> {
  const salt = crypto.getRandomValues(new Uint8Array(16));
  const mac = await crypto.subtle.sign('HMAC', await pinKeyOf(settings), await stretched(pin, salt, iterations));
  return { person, pinVersion, salt, iterations, mac: new Uint8Array(mac) };
}

/** Whether a PIN is the one the verifier was made of. Compared by the browser, in constant time. */
export async function pinMatches(settings: Settings, verifier: PinVerifier, pin: string): Promise<boolean> {
  const bits = await stretched(pin, verifier.salt, verifier.iterations);
  return crypto.subtle.verify('HMAC', await pinKeyOf(settings), verifier.mac, bits);
}
