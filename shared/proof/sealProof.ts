import { base64urlToBytes, bytesToBase64url, utf8, utf8ToText } from '../record/bytes';
import { canonicalJson } from '../record/canonicalJson';
import type { Signer } from '../record/crypto';
import { signDetached } from '../record/signature';
import type { ProofDocument } from './proofDocument';
import { shownDisclosures, type SideLine } from './sideSheet';

/** The parts of a sealed proof: text of the document, its detached signature, and the lines of the side sheet. */
export interface OpenedProof {
  text: string;
  sig: string;
  disclosures: string[];
}

/**
 * Signs a document: a compact JWS (RFC 7515) over its RFC 8785 text, then each line of the side sheet, a tilde behind
 * every part (as RFC 9901 writes it). Lines can be taken away later; the signature does not cover them, only digests.
 */
export async function sealProof(
  document: ProofDocument,
  disclosures: readonly string[],
  signer: Signer,
): Promise<string> {
  const text = canonicalJson(document);
  const [header = '', , signature = ''] = (await signDetached(text, signer)).split('.');
  const jws = `${header}.${bytesToBase64url(utf8(text))}.${signature}`;
  return [jws, ...disclosures].map((part) => `${part}~`).join('');
}

/** Takes a sealed proof apart, or null where it is none. A bare compact JWS has no side sheet. Checks nothing. */
export function openProof(sealed: string): OpenedProof | null {
  const [jws = '', ...rest] = sealed.trim().split('~');
  const [header, payload, signature, ...more] = jws.split('.');
  if (!header || !payload || !signature || more.length > 0) return null;
  const bytes = base64urlToBytes(payload);
  const text = bytes && utf8ToText(bytes);
  if (text === null) return null;
  return { text, sig: `${header}..${signature}`, disclosures: rest.filter((part) => part !== '') };
}

/** The same sealed proof with only the lines of the side sheet that may be shown. A text that is no proof stays as it is. */
export function withholdSide(sealed: string, shown: readonly SideLine[]): string {
  const [jws = '', ...rest] = sealed.trim().split('~');
  const disclosures = shownDisclosures(
    rest.filter((part) => part !== ''),
    shown,
  );
  return [jws, ...disclosures].map((part) => `${part}~`).join('');
}
