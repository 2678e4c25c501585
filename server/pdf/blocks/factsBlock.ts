import { proofFacts, type ProofFact } from '@shared/proof/proofFacts';
import { styleOf, textBlock, type Block, type PageSource } from '../block';

const GAP = 9;

interface Cell {
  label: string;
  labelWidth: number;
  value: ReturnType<typeof textBlock>;
}

function column(source: PageSource, facts: readonly ProofFact[], width: number): Cell[] {
  const label = styleOf(source, 'label');
  const widest = Math.max(0, ...facts.map((fact) => source.paper.widthOf(fact.label, label)));
  const labelWidth = Math.min(widest, width * 0.4);
  return facts.map((fact) => ({
    label: fact.label,
    labelWidth,
    value: textBlock(source, fact.value, fact.isCode ? 'code' : 'value', width - labelWidth - GAP),
  }));
}

function drawFact(source: PageSource, cell: Cell, x: number, y: number): void {
  const { paper } = source;
  const labels = paper.wrap([{ text: cell.label, style: styleOf(source, 'label') }], cell.labelWidth + 0.5);
  paper.leaf('TH', () => paper.drawBlock(labels, x, y), { scope: 'Row' });
  paper.leaf('TD', () => paper.drawBlock(cell.value, x + cell.labelWidth + GAP, y));
}

/** Engine, job, procedure, parts: two columns, read across (D2). */
export function factsBlock(source: PageSource, width: number): Block {
  const { paper, document, side, speaker } = source;
  const facts = proofFacts(document, side, speaker);
  const gutter = 16;
  const leftWidth = (width - gutter) * 0.56;
  const left = column(
    source,
    facts.filter((_, index) => index % 2 === 0),
    leftWidth,
  );
  const right = column(
    source,
    facts.filter((_, index) => index % 2 === 1),
    width - gutter - leftWidth,
  );
  const rows = left.map((cell, index) => ({ cells: [cell, right[index]] }));
  const heightOf = ({ cells }: (typeof rows)[number]): number =>
    Math.max(...cells.map((cell) => cell?.value.height ?? 0));
  return {
    height: rows.reduce((sum, row) => sum + heightOf(row), 0),
    draw: (x, y) => {
      let top = y;
      paper.group('Table', () => {
        for (const row of rows) {
          paper.group('TR', () => {
            for (const [index, cell] of row.cells.entries()) {
              if (cell) drawFact(source, cell, x + (index === 0 ? 0 : leftWidth + gutter), top);
            }
          });
          top += heightOf(row);
        }
      });
    },
  };
}
