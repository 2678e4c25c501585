import { phrase, word } from '@shared/proof/phrase';
import { groupedHash } from '@shared/proof/proofText';
import { spoken, styleOf, textBlock, type Block, type PageSource } from '../block';

/** Fingerprint of the record, how to check it, and that the manual comes first; at the foot of page 1. */
export function footBlock(source: PageSource, width: number): Block {
  const { paper, document, speaker } = source;
  const code = [
    { text: `${word('sheet.fingerprint', speaker.language)} `, style: styleOf(source, 'foot') },
    { text: groupedHash(document.sheet.fingerprint), style: styleOf(source, 'footCode') },
  ];
  const fingerprint = paper.wrap(code, width);
  const scan = textBlock(source, word('sheet.scan', speaker.language), 'foot', width);
  const url = textBlock(source, document.publicUrl, 'foot', width);
  return {
    height: 5 + fingerprint.height + scan.height + url.height,
    draw: (x, y) => {
      paper.rule(x, y, width);
      paper.leaf('P', () => paper.drawBlock(fingerprint, x, y + 5));
      paper.leaf('P', () => paper.drawBlock(scan, x, y + 5 + fingerprint.height));
      paper.leaf('P', () => paper.drawBlock(url, x, y + 5 + fingerprint.height + scan.height));
    },
  };
}

/** Number and page, at the very foot of every page. */
export function pageMark(source: PageSource, page: number, pages: number, x: number, y: number, width: number): void {
  const text = `${source.document.number} · ${spoken(source, phrase('sheet.page', { page, pages }))}`;
  const style = styleOf(source, 'foot');
  source.paper.artifact(() => source.paper.line(text, style, x + width - source.paper.widthOf(text, style), y));
}
