import { create } from 'qrcode';
import { phrase, word } from '@shared/proof/phrase';
import { meaningText, signatureLines, signerText } from '@shared/proof/proofText';
import type { ProofSignature } from '@shared/proof/sheet';
import { spoken, textBlock, type Block, type PageSource } from '../block';
import { ink } from '../ink';
import type { TextBlock } from '../paper';

const QR = 86;
const GAP = 15;

function signatureTexts(source: PageSource, sign: ProofSignature, width: number): TextBlock[] {
  const { speaker } = source;
  return [
    textBlock(source, signerText(sign, speaker), 'signer', width),
    textBlock(source, meaningText(sign, speaker), 'small', width),
    ...signatureLines(sign, speaker).map((line) => textBlock(source, line, 'small', width)),
  ];
}

function drawQr(source: PageSource, x: number, y: number): void {
  const { doc } = source.paper;
  const { modules } = create(source.document.publicUrl, { errorCorrectionLevel: 'M' });
  const size = QR / modules.size;
  for (let row = 0; row < modules.size; row += 1) {
    for (let column = 0; column < modules.size; column += 1) {
      // Neighbours overlap by a hair: a reader would else see white seams between them.
      if (modules.get(row, column)) doc.rect(x + column * size, y + row * size, size + 0.05, size + 0.05);
    }
  }
  doc.fill(ink.ink);
}

function drawSignature(
  { paper }: PageSource,
  blocks: readonly TextBlock[],
  { x, y, width }: { x: number; y: number; width: number },
): void {
  paper.rule(x, y, width, ink.ink, 1.5);
  paper.leaf('P', () => {
    let line = y + 4;
    for (const block of blocks) {
      paper.drawBlock(block, x, line);
      line += block.height;
    }
  });
}

/** Who signed what, when and where, in as many columns as fit, and the QR code of the page that checks it. */
export function signaturesBlock(source: PageSource, width: number): Block {
  const { paper, document, speaker } = source;
  const { signatures } = document.sheet;
  const heading = textBlock(source, word('sheet.signatures', speaker.language), 'heading', width);
  const across = Math.max(1, Math.min(signatures.length, 3));
  const cell = (width - QR - GAP * across) / across;
  const texts = signatures.map((sign) => signatureTexts(source, sign, cell));
  const heightOf = (blocks: readonly TextBlock[]): number => 4 + blocks.reduce((sum, { height }) => sum + height, 0);
  const rows = Array.from({ length: Math.ceil(texts.length / across) }, (_, row) =>
    texts.slice(row * across, (row + 1) * across),
  );
  const rowHeights = rows.map((row) => Math.max(...row.map(heightOf)) + 6);
  const top = heading.height + 4;
  const signed = rowHeights.reduce((sum, height) => sum + height, 0);
  return {
    height: Math.max(top + signed, QR + 2),
    draw: (x, y) => {
      paper.rule(x, y - 5, width - QR - GAP);
      paper.leaf('H2', () => paper.drawBlock(heading, x, y));
      let line = y + top;
      for (const [index, row] of rows.entries()) {
        for (const [column, blocks] of row.entries())
          drawSignature(source, blocks, { x: x + column * (cell + GAP), y: line, width: cell });
        line += rowHeights[index] ?? 0;
      }
      const [left, high] = [x + width - QR, y - 5];
      const alt = spoken(source, phrase('sheet.qr', { url: document.publicUrl }));
      const bbox = [left, high, left + QR, high + QR];
      paper.leaf('Figure', () => drawQr(source, left, high), { alt, bbox, placement: 'Block' });
    },
  };
}
