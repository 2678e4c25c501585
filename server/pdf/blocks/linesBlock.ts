import { word } from '@shared/proof/phrase';
import { deviationEntry, lineEntry, type ProofEntry } from '@shared/proof/proofText';
import type { ProofLine } from '@shared/proof/sheet';
import type { PhraseKey } from '@shared/proof/words/en';
import { textBlock, type Block, type PageSource } from '../block';
import { ink } from '../ink';
import type { TextBlock } from '../paper';

/** Width kept for the places: the widest of them, at most two fifths. */
function whereWidth(source: PageSource, entries: readonly ProofEntry[], width: number): number {
  const widest = Math.max(
    0,
    ...entries.map(({ where }) => textBlock(source, where, 'cell', width).lines[0]?.width ?? 0),
  );
  return Math.min(widest, width * 0.4) + 9;
}

function entriesBlock(source: PageSource, heading: PhraseKey, entries: readonly ProofEntry[], width: number): Block {
  const { paper, speaker } = source;
  if (entries.length === 0) return { height: 0, draw: () => undefined };
  const title = textBlock(source, word(heading, speaker.language), 'heading', width);
  const left = whereWidth(source, entries, width);
  const pad = 2.2 * source.scale;
  const rows = entries.map(({ where, lines }) => ({
    where: textBlock(source, where, 'cell', left - 9),
    lines: lines.map((line) => textBlock(source, line, 'cell', width - left)),
  }));
  const sum = (blocks: readonly TextBlock[]): number => blocks.reduce((total, { height }) => total + height, 0);
  const heightOf = (row: (typeof rows)[number]): number => Math.max(row.where.height, sum(row.lines)) + 2 * pad;
  const titleHeight = title.height + 2;
  return {
    height: titleHeight + rows.reduce((total, row) => total + heightOf(row), 0),
    draw: (x, y) => {
      paper.leaf('H2', () => paper.drawBlock(title, x, y));
      let top = y + titleHeight;
      paper.group('Table', () => {
        for (const row of rows) {
          paper.rule(x, top, width, ink.line2, 0.6);
          const place = top + pad;
          paper.group('TR', () => {
            paper.leaf('TH', () => paper.drawBlock(row.where, x, place), { scope: 'Row' });
            paper.leaf('TD', () => {
              let line = place;
              for (const text of row.lines) {
                paper.drawBlock(text, x + left, line);
                line += text.height;
              }
            });
          });
          top += heightOf(row);
        }
      });
    },
  };
}

/** Deviations from the `from`th to before the `to`th (D1); says so where there is none at all. */
export function deviationsBlock(source: PageSource, width: number, from = 0, to = Infinity): Block {
  const { deviations } = source.document.sheet;
  if (deviations.length === 0) {
    const text = textBlock(source, word('sheet.noDeviations', source.speaker.language), 'cell', width);
    return { height: text.height, draw: (x, y) => source.paper.leaf('P', () => source.paper.drawBlock(text, x, y)) };
  }
  const entries = deviations.slice(from, to).map((deviation) => deviationEntry(deviation, source.speaker));
  return entriesBlock(source, 'sheet.deviations', entries, width);
}

/** A heading and lines about places: voided and changed, no longer standing, entered later. */
export function linesBlock(source: PageSource, heading: PhraseKey, lines: readonly ProofLine[], width: number): Block {
  return entriesBlock(
    source,
    heading,
    lines.map((line) => lineEntry(line, source.speaker)),
    width,
  );
}
