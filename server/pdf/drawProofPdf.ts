import { phrase, say, word } from '@shared/proof/phrase';
import type { ProofDocument } from '@shared/proof/proofDocument';
import { speakerFor } from '@shared/proof/proofFacts';
import type { SideSheet } from '@shared/proof/sideSheet';
import type { Locale } from '@shared/quantity/format';
import type { PageSource } from './block';
import { pageMark } from './blocks/footBlock';
import { composePages, MARGIN } from './compose';
import { Paper, type PaperSize } from './paper';

/** What a proof is worth today, where that is less than on the day of issue. */
export type ProofStamp =
  { code: 'revoked' | 'inDoubt'; reason: string } | { code: 'superseded' } | { code: 'broken'; event: number | null };

/** Everything the pages are a function of: the same job gives the same bytes. */
export interface PdfJob {
  document: ProofDocument;
  side: SideSheet;
  size: PaperSize;
  lang: Locale;
  stamps: readonly ProofStamp[];
  /** The signed proof as it may be kept and checked without this shop, attached as a file. */
  attached: { name: string; text: string };
}

function stampText(stamp: ProofStamp, lang: Locale, say_: (said: ReturnType<typeof phrase>) => string): string {
  switch (stamp.code) {
    case 'revoked':
      return say_(phrase('sheet.stampRevoked', { reason: stamp.reason }));
    case 'inDoubt':
      return say_(phrase('sheet.stampInDoubt', { reason: stamp.reason }));
    case 'superseded':
      return word('sheet.stampSuperseded', lang);
    case 'broken':
      return stamp.event === null
        ? word('sheet.stampBrokenAll', lang)
        : say_(phrase('sheet.stampBroken', { event: stamp.event }));
  }
}

function paperFor({ document, size, lang }: PdfJob): Paper {
  const issuedAt = new Date(document.issuedAt);
  return new Paper(size, {
    pdfVersion: '1.7',
    tagged: true,
    lang: lang === 'en' ? 'en-GB' : 'es-ES',
    displayTitle: true,
    bufferPages: false,
    info: {
      Title: `${word('title', lang)} ${document.number}`,
      Author: document.shop.name,
      Subject: document.procedure.document.title,
      Creator: 'Boltwalk',
      Producer: 'Boltwalk',
      // The day of issue, not of drawing: the bytes are a function of the document (decision 16).
      CreationDate: issuedAt,
      ModDate: issuedAt,
    },
  });
}

function attach(paper: Paper, { attached, document }: PdfJob): void {
  const date = new Date(document.issuedAt);
  paper.doc.file(Buffer.from(attached.text, 'utf8'), {
    name: attached.name,
    type: 'application/json',
    creationDate: date,
    modifiedDate: date,
    description: document.number,
  });
}

/** Name of the file that is attached. */
export const pdfName = ({ number }: ProofDocument): string => `${number.replace(/[^\w-]+/g, '-')}.json`;

/** Draws the pages of a proof. Blocks the thread for a moment: ask `renderProofPdf`, which does it in a thread of its own. */
export async function drawProofPdf(job: PdfJob): Promise<Uint8Array> {
  const { document, side, lang } = job;
  const paper = paperFor(job);
  const chunks: Uint8Array[] = [];
  const done = new Promise<Uint8Array>((resolve, reject) => {
    paper.doc.on('data', (chunk: Uint8Array) => chunks.push(chunk));
    paper.doc.on('end', () => resolve(Buffer.concat(chunks)));
    paper.doc.on('error', reject);
  });
  paper.doc.addPage();
  const speaker = speakerFor(document, side, lang);
  const source: PageSource = { paper, document, side, speaker, scale: 1 };
  const pages = composePages(
    source,
    job.stamps.map((stamp) => stampText(stamp, lang, (said) => say(said, speaker))),
  );
  paper.root(lang);
  for (const [index, blocks] of pages.entries()) {
    if (index > 0) paper.doc.addPage();
    for (const { block, x, y } of blocks) block.draw(x, y);
    const width = paper.width - 2 * MARGIN.x;
    pageMark(source, index + 1, pages.length, MARGIN.x, paper.height - 26, width);
  }
  attach(paper, job);
  paper.doc.end();
  return await done;
}
