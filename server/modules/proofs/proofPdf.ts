import type { PublicJwk } from '@shared/record/crypto';
import { conflict } from '../../http/errors';
import type { ProofStamp } from '../../pdf/drawProofPdf';
import { printSealedProof } from '../../pdf/renderProofPdf';
import type { ProofRecord } from './proofs.repository';

/** A proof with what has to be known to print it as it stands today. */
export interface PrintableProof {
  row: ProofRecord;
  keys: readonly PublicJwk[];
  /** Hashes of the walk's events as they are stored now. */
  storedHashes: string[];
}

/** Makes the printed page of a sealed proof: the same bytes for the same proof, size and language (decision 16). */
export type ProofPdf = (
  proof: PrintableProof,
  options: { size: 'letter' | 'a4'; language: 'en' | 'es' },
) => Promise<Uint8Array>;

function stampsOf({ state, revokedReason }: ProofRecord): ProofStamp[] {
  const reason = revokedReason ?? '';
  if (state === 'revoked' || state === 'inDoubt') return [{ code: state, reason }];
  return state === 'superseded' ? [{ code: 'superseded' }] : [];
}

/** Prints in a thread of its own. Throws 409 `proof.documentBroken` where the stored document is none any more (fault 21). */
export const pdfOfProof: ProofPdf = async ({ row, keys, storedHashes }, { size, language: lang }) => {
  const plain = keys.map(({ kty, crv, x, y }) => ({ kty, crv, x, y }));
  const job = { sealed: row.jws, keys: plain, storedHashes, stamps: stampsOf(row), size, lang };
  const bytes = await printSealedProof(job);
  if (!bytes) throw conflict('proof.documentBroken', 'The stored document of this proof cannot be read any more.');
  return bytes;
};
