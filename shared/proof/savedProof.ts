import { canonicalJson } from '../record/canonicalJson';
import type { PublicJwk } from '../record/crypto';
import { openProof } from './sealProof';

/** A proof as somebody keeps it: sealed, with the keys the shop published when it was saved. */
export interface SavedProof {
  sealed: string;
  keys: PublicJwk[];
}

/** The text of a file that can be checked without the shop, for as long as anybody keeps it. */
export function writeSavedProof({ sealed, keys }: SavedProof): string {
  const plain = keys.map(({ kty, crv, x, y }) => ({ kty, crv, x, y }));
  return canonicalJson({ format: 'boltwalk.saved', version: 1, sealed, keys: plain });
}

function isJwk(value: unknown): value is PublicJwk {
  if (typeof value !== 'object' || value === null) return false;
  const { kty, crv, x, y } = value as Record<string, unknown>;
  return kty === 'EC' && crv === 'P-256' && typeof x === 'string' && typeof y === 'string';
}

function jsonOf(text: string): Record<string, unknown> | null {
  try {
    const value: unknown = JSON.parse(text);
    return typeof value === 'object' && value !== null ? (value as Record<string, unknown>) : null;
  } catch {
    return null;
  }
}

/** Reads a saved file, the public answer of a shop's server, or a bare sealed proof; null where it is none of them. */
export function readSavedProof(text: string): SavedProof | null {
  const value = jsonOf(text);
  if (!value) return openProof(text) ? { sealed: text.trim(), keys: [] } : null;
  const sealed = value.sealed ?? value.jws;
  if (typeof sealed !== 'string' || !openProof(sealed)) return null;
  return { sealed, keys: Array.isArray(value.keys) ? value.keys.filter(isJwk) : [] };
}
