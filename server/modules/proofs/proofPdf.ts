import { AppError } from '../../http/errors';

/** Makes the printed page of a sealed proof: the same bytes for the same proof, size and language (decision 16). */
export type ProofPdf = (
  sealed: string,
  options: { size: 'letter' | 'a4'; language: 'en' | 'es' },
) => Promise<Uint8Array>;

/** Until the printer of proofs is built in, its address says so plainly. */
export const pdfOfProof: ProofPdf = () =>
  Promise.reject(new AppError(503, 'proof.notPrintable', 'This server does not print proofs.'));
