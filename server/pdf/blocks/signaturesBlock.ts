import { create } from 'qrcode';
import { phrase, word, type Phrase } from '@shared/proof/phrase';
import type { ProofSignature } from '@shared/proof/sheet';
import { spoken, textBlock, type Block, type PageSource } from '../block';
import { ink } from '../ink';
import type { TextBlock } from '../paper';

const QR = 86;
const GAP = 15;
const MINUTE = 60_000;
/** Sooner than this it was not offline in any way that matters. */
const LEAST_DELAY = 5 * MINUTE;

function delayPhrase(ms: number): Phrase {
  const minutes = Math.round(ms / MINUTE);
  if (minutes < 120) return phrase('delay.minutes', { n: minutes });
  const hours = Math.round(minutes / 60);
  return hours < 48 ? phrase('delay.hours', { n: hours }) : phrase('delay.days', { n: Math.round(hours / 24) });
}

/** Time, place, delay and the shop's word on the PIN, one line each (D2). */
export function signatureLines(source: PageSource, sign: ProofSignature): string[] {
  const time = { time: sign.at };
  const lines = [
    sign.tablet === null ? phrase('sign.office', { time }) : phrase('sign.tablet', { time, tablet: sign.tablet }),
  ];
  const late = sign.received === null ? 0 : Date.parse(sign.received) - Date.parse(sign.at);
  if (sign.tablet !== null && late >= LEAST_DELAY)
    lines.push(phrase('sign.delay', { delay: { phrase: delayPhrase(late) } }));
  if (sign.confirmed !== null) lines.push(phrase('sign.pin', { time: { time: sign.confirmed } }));
  return lines.map((line) => spoken(source, line));
}

function signatureTexts(source: PageSource, sign: ProofSignature, width: number): TextBlock[] {
  const role = word(`role.${sign.role}`, source.speaker.language);
  const quote = source.speaker.language === 'en' ? ['“', '”'] : ['«', '»'];
  const meaning = word(`meaning.${sign.meaning}`, source.speaker.language);
  return [
    textBlock(source, spoken(source, phrase('sign.line', { person: { person: sign.by }, role })), 'signer', width),
    textBlock(source, quote.join(meaning), 'small', width),
    ...signatureLines(source, sign).map((line) => textBlock(source, line, 'small', width)),
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
