import type { PublicProof } from '@shared/contracts/proofs.contract';
import { readSavedProof, type SavedProof } from '@shared/proof/savedProof';
import type { PublicJwk } from '@shared/record/crypto';

/** Why a proof is not here; each has its own sentence. */
export type FetchProblem =
  | { code: 'unknown' | 'offline' }
  | { code: 'answer'; status: number }
  | { code: 'tooLarge'; size: number }
  | { code: 'notAProof' | 'unreadable'; name: string };

/** Found, or why not. */
export type Found<T> = { ok: true; value: T } | { ok: false; problem: FetchProblem };

/** No record comes near this: it would only freeze the page. */
const LARGEST_BYTES = 40 * 1024 * 1024;

const isAnswer = (value: unknown): value is PublicProof => {
  if (typeof value !== 'object' || value === null) return false;
  const { jws, keys, state, number } = value as Record<string, unknown>;
  return typeof jws === 'string' && Array.isArray(keys) && typeof state === 'string' && typeof number === 'string';
};

async function jsonFrom(path: string): Promise<{ status: number; body: unknown } | null> {
  try {
    const response = await fetch(path, { cache: 'no-store', credentials: 'omit' });
    const isJson = response.headers.get('content-type')?.startsWith('application/json') ?? false;
    return { status: response.status, body: isJson ? ((await response.json()) as unknown) : null };
  } catch {
    return null;
  }
}

/** Today's truth about a proof, asked of the shop's server. */
export async function fetchProof(token: string): Promise<Found<PublicProof>> {
  const answer = await jsonFrom(`/api/public/proofs/${encodeURIComponent(token)}`);
  if (!answer) return { ok: false, problem: { code: 'offline' } };
  if (answer.status === 404 && answer.body !== null) return { ok: false, problem: { code: 'unknown' } };
  if (answer.status !== 200 || !isAnswer(answer.body))
    return { ok: false, problem: { code: 'answer', status: answer.status } };
  return { ok: true, value: answer.body };
}

/** The keys a shop publishes; null where it cannot be asked here. */
export async function fetchShopKeys(shop: string): Promise<PublicJwk[] | null> {
  const answer = await jsonFrom(`/api/public/jwks/${encodeURIComponent(shop)}`);
  const keys = answer?.status === 200 ? (answer.body as { keys?: unknown }).keys : null;
  return Array.isArray(keys) ? (keys as PublicJwk[]) : null;
}

/** A saved proof out of a file; it is read here and sent nowhere. */
export async function readProofFile(file: File): Promise<Found<SavedProof>> {
  const { name, size } = file;
  if (size > LARGEST_BYTES) return { ok: false, problem: { code: 'tooLarge', size: Math.round(size / 1024 / 1024) } };
  try {
    const saved = readSavedProof(await file.text());
    return saved ? { ok: true, value: saved } : { ok: false, problem: { code: 'notAProof', name } };
  } catch {
    return { ok: false, problem: { code: 'unreadable', name } };
  }
}
