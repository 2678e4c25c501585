import { word } from '@shared/proof/phrase';
import { wrenchDue, wrenchUse } from '@shared/proof/proofText';
import type { ProofWrench } from '@shared/proof/sheet';
import { emptyBlock, styleOf, textBlock, type Block, type PageSource } from '../block';
import { ink, type StyleName } from '../ink';
import type { TextBlock } from '../paper';

const GAP = 7;
/** What a column gets at least: its words, but for the last two, which may be broken. */
const LEAST_DUE = 52;

function rowTexts(source: PageSource, wrench: ProofWrench): [string, StyleName][] {
  const none = word('wrench.noCertificate', source.speaker.language);
  return [
    [`${wrench.tag}, ${wrench.drive}`, 'cell'],
    [wrench.serial, 'figure'],
    [wrench.certificate ?? none, 'figure'],
    [wrenchDue(wrench, source.speaker), 'cell'],
    [wrenchUse(wrench, source.speaker), 'cell'],
  ];
}

/** The first three columns as wide as their widest word, the date unbroken, the rest for how it stood at use. */
function columnWidths(source: PageSource, texts: readonly [string, StyleName][][], width: number): number[] {
  const natural = [0, 1, 2, 3].map((index) =>
    Math.max(
      0,
      ...texts.map((row) => {
        const [text, style] = row[index] ?? ['', 'cell'];
        const parts = index === 3 ? text.split(' ') : [text];
        return Math.max(...parts.map((part) => source.paper.widthOf(part, styleOf(source, style))));
      }),
    ),
  );
  const [tag = 0, serial = 0, certificate = 0, due = 0] = natural.map((one) => one + 0.5);
  const used = tag + serial + certificate + Math.max(due, LEAST_DUE * source.scale);
  return [tag, serial, certificate, Math.max(due, LEAST_DUE * source.scale), Math.max(40, width - used - 4 * GAP)];
}

/** Wrenches with serial, certificate, due, and how they stood when they were used (D2). */
export function wrenchesBlock(source: PageSource, width: number): Block {
  const { paper, document, speaker } = source;
  if (document.sheet.wrenches.length === 0) return emptyBlock;
  const heading = textBlock(source, word('sheet.wrenches', speaker.language), 'heading', width);
  const keys = ['column.wrench', 'column.serial', 'column.certificate', 'column.due', 'column.use'] as const;
  const titles = keys.map((key): [string, StyleName] => [word(key, speaker.language), 'head']);
  const texts = document.sheet.wrenches.map((wrench) => rowTexts(source, wrench));
  const widths = columnWidths(source, [titles, ...texts], width);
  const lefts = widths.map((_, index) => widths.slice(0, index).reduce((sum, one) => sum + one + GAP, 0));
  const blocksOf = (row: readonly [string, StyleName][]): TextBlock[] =>
    row.map(([text, style], index) => textBlock(source, text, style, widths[index] ?? 0));
  const heads = blocksOf(titles);
  const rows = texts.map(blocksOf);
  const pad = 2.5 * source.scale;
  const heightOf = (cells: TextBlock[]): number => Math.max(...cells.map(({ height }) => height)) + 2 * pad;
  const headHeight = heading.height + 2;
  const drawRow = (cells: TextBlock[], type: string, x: number, y: number): void =>
    paper.group('TR', () => {
      for (const [index, cell] of cells.entries())
        paper.leaf(type, () => paper.drawBlock(cell, x + (lefts[index] ?? 0), y));
    });
  const head = styleOf(source, 'head').leading;
  return {
    height: headHeight + head + rows.reduce((sum, cells) => sum + heightOf(cells), 0),
    draw: (x, y) => {
      paper.leaf('H2', () => paper.drawBlock(heading, x, y));
      paper.group('Table', () => {
        drawRow(heads, 'TH', x, y + headHeight);
        let top = y + headHeight + head;
        for (const cells of rows) {
          paper.rule(x, top, width, ink.line2, 0.6);
          drawRow(cells, 'TD', x, top + pad);
          top += heightOf(cells);
        }
      });
    },
  };
}
