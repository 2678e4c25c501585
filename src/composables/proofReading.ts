import type { ProofDocument } from '@shared/proof/proofDocument';
import { openProof } from '@shared/proof/sealProof';
import { revealSide, type SideSheet } from '@shared/proof/sideSheet';
import { readDocument } from '@shared/proof/verify/readDocument';
import type { RecordCrypto } from '@shared/record/crypto';

/** A stored proof taken apart for the office: the signed document, and the names beside it. */
export interface ProofReading {
  document: ProofDocument;
  side: SideSheet;
}

const NO_NAMES: SideSheet = { names: {} };

/**
 * Opens a stored proof; null where it is none. Without crypto (plain http) the side sheet stays closed: a line whose
 * digest was not compared might belong to another proof.
 */
export async function proofReading(
  jws: string,
  crypto: Pick<RecordCrypto, 'sha256'> | null,
): Promise<ProofReading | null> {
  const opened = openProof(jws);
  const read = opened && readDocument(opened.text);
  if (!opened || !read?.ok) return null;
  const document = read.value;
  const { side } = crypto ? await revealSide(opened.disclosures, document.side, crypto) : { side: NO_NAMES };
  return { document, side };
}
