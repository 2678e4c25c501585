import { phrase, word } from '@shared/proof/phrase';
import { spoken, styleOf, textBlock, type Block, type PageSource } from '../block';
import { ink } from '../ink';

/** Title, shop, number and date of issue. */
export function topBlock(source: PageSource, width: number): Block {
  const { paper, document, speaker } = source;
  const { shop, number, issue, issuedAt } = document;
  const right = 190;
  const lines = [spoken(source, phrase('sheet.issued', { time: { time: issuedAt } }))];
  if (issue > 1) lines.push(spoken(source, phrase('sheet.issue', { n: issue })));
  const title = textBlock(source, word('title', speaker.language), 'title', width - right);
  const name = [shop.name, shop.address].filter(Boolean).join(' · ');
  const shopText = textBlock(source, name, 'shop', width - right);
  const numberText = textBlock(source, number, 'number', right);
  const issued = lines.map((line) => textBlock(source, line, 'shop', right));
  const leftHeight = title.height + shopText.height + 2;
  const rightHeight = numberText.height + issued.reduce((sum, text) => sum + text.height, 0);
  const body = Math.max(leftHeight, rightHeight) + 8;
  return {
    height: body + 2.25,
    draw: (x, y) => {
      paper.leaf('H1', () => paper.drawBlock(title, x, y));
      paper.leaf('P', () => paper.drawBlock(shopText, x, y + title.height + 2));
      paper.leaf('P', () => {
        paper.drawBlock(numberText, x + width - right, y, right, 'right');
        let top = y + numberText.height;
        for (const text of issued) {
          paper.drawBlock(text, x + width - right, top, right, 'right');
          top += text.height;
        }
      });
      paper.rule(x, y + body + 1.1, width, ink.ink, 2.25);
    },
  };
}

/** A short head for the pages after the first. */
export function continuedBlock(source: PageSource, width: number): Block {
  const { paper, document } = source;
  const text = textBlock(
    source,
    spoken(source, phrase('sheet.continued', { number: document.number })),
    'number',
    width,
  );
  return {
    height: text.height + 7,
    draw: (x, y) => {
      paper.leaf('P', () => paper.drawBlock(text, x, y));
      paper.rule(x, y + text.height + 5, width, ink.ink, 1.5);
    },
  };
}

/** What the proof is worth today, where that is less than on the day of issue; in a frame above everything. */
export function stampBlock(source: PageSource, said: string, width: number): Block {
  const { paper } = source;
  const pad = 6;
  const text = textBlock(source, said, 'stamp', width - 2 * pad);
  const height = text.height + 2 * pad;
  return {
    height,
    draw: (x, y) => {
      paper.artifact(() => {
        paper.doc.save();
        paper.doc.lineWidth(1.5).strokeColor(styleOf(source, 'stamp').color);
        paper.doc.rect(x + 0.75, y + 0.75, width - 1.5, height - 1.5).stroke();
        paper.doc.restore();
      });
      paper.leaf('P', () => paper.drawBlock(text, x + pad, y + pad));
    },
  };
}
