import { verifyProof } from '@shared/proof/verifyProof';
import { writeSavedProof } from '@shared/proof/savedProof';
import { problemSeq, worstProblem } from '@shared/proof/verify/problem';
import type { Locale } from '@shared/quantity/format';
import type { PublicJwk, RecordCrypto } from '@shared/record/crypto';
import { drawProofPdf, pdfName, type ProofStamp } from './drawProofPdf';
import type { PaperSize } from './paper';

/** A sealed proof to be printed as it stands today. */
export interface PrintJob {
  sealed: string;
  /** Keys the shop publishes, past ones too. */
  keys: PublicJwk[];
  /** Hashes of the events as they are stored today. */
  storedHashes: string[] | null;
  stamps: ProofStamp[];
  size: PaperSize;
  lang: Locale;
}

/**
 * Checks a proof and draws it. One whose record does not hold any more is stamped with the event at which it breaks
 * (fault 21); null where it cannot even be read.
 */
export async function printProof(job: PrintJob, crypto: RecordCrypto): Promise<Uint8Array | null> {
  const { sealed, keys, storedHashes, size, lang } = job;
  const check = await verifyProof(sealed, { crypto, shopKeys: keys, storedHashes });
  const { document, side, problems } = check;
  if (!document) return null;
  const worst = worstProblem(problems);
  const stamps: ProofStamp[] = worst ? [{ code: 'broken', event: problemSeq(worst) }, ...job.stamps] : job.stamps;
  const attached = { name: pdfName(document), text: writeSavedProof({ sealed, keys }) };
  return drawProofPdf({ document, side, size, lang, stamps, attached });
}
