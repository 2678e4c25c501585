import type { ProofDocument } from '@shared/proof/proofDocument';
import type { SideSheet } from '@shared/proof/sideSheet';
import type { Locale } from '@shared/quantity/format';
import { canonicalJson } from '@shared/record/canonicalJson';
import { pdfName, type ProofStamp } from './drawProofPdf';
import type { PaperSize } from './paper';
import { inThread } from './pdfThread';
import type { PrintJob } from './printProof';

/** How a proof is wanted on paper. */
export interface PdfWish {
  size: PaperSize;
  lang: Locale;
  /** Names, VIN, customer and claim as far as they are to be printed; absent = withheld. */
  side?: SideSheet;
  /** What it is worth today, where that is less than on the day of issue. */
  stamps?: readonly ProofStamp[];
  /** Text of the saved proof to attach; absent = the document alone. */
  saved?: string;
}

/**
 * The pages of a proof as a PDF: embedded fonts, tagged, the signed record attached. A function of what is handed in:
 * the same document and wish give the same bytes. Drawn in a thread of its own; rejects where it cannot be drawn.
 */
export async function renderProofPdf(document: ProofDocument, wish: PdfWish): Promise<Buffer> {
  const { size, lang, side = { names: {} }, stamps = [] } = wish;
  const attached = { name: pdfName(document), text: wish.saved ?? canonicalJson(document) };
  const bytes = await inThread({ kind: 'draw', job: { document, side, size, lang, stamps, attached } });
  if (!bytes) throw new Error('a page that was only to be drawn came back empty');
  return Buffer.from(bytes);
}

/** Checks a sealed proof and prints it, in the same thread; null where it cannot even be read. */
export const printSealedProof = (job: PrintJob): Promise<Uint8Array | null> => inThread({ kind: 'print', job });
