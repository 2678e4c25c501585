import { word } from '@shared/proof/phrase';
import {
  cellText,
  endHeadLines,
  endUnitOf,
  headLines,
  legendOf,
  type CellMark,
  type CellText,
} from '@shared/proof/readingText';
import type { ProofColumn, ProofRow } from '@shared/proof/sheet';
import type { Unit } from '@shared/quantity/unit';
import { styleOf, textBlock, type Block, type PageSource } from '../block';
import { ink, type StyleName } from '../ink';

const PAD = 4;
/** A strip under this width would show nothing. */
const LEAST_STRIP = 20;
const MOST_STRIP = 50;

interface Plan {
  column: ProofColumn;
  endUnit: Unit | null;
  head: string[];
  endHead: string[];
  texts: CellText[];
  value: number;
  marks: number;
  strip: number;
  end: number;
}

/** A table of some columns and rows; `needs` is the width without strips, `wishes` with them. */
export interface ReadingTablePlan {
  needs: number;
  wishes: number;
  rowHeight: number;
  headHeight: number;
  block(width: number): Block;
}

const marksWidth = (source: PageSource, marks: readonly CellMark[]): number =>
  marks.reduce((sum, { text, tone }) => sum + source.paper.widthOf(text, styleOf(source, TONES[tone])) + 2, 0);

const TONES: Record<CellMark['tone'], StyleName> = { quiet: 'tiny', off: 'tinyOff', accepted: 'tinySteel' };

const widest = (source: PageSource, texts: readonly string[], name: StyleName): number => {
  const style = styleOf(source, name);
  return Math.max(0, ...texts.map((text) => source.paper.widthOf(text, style)));
};

function planColumn(source: PageSource, column: ProofColumn, index: number, rows: readonly ProofRow[]): Plan {
  const endUnit = endUnitOf(rows, index);
  const texts = rows.map((row) => cellText(source.speaker, { column, endUnit }, row, row.cells[index] ?? null));
  const head = headLines(source.speaker, column);
  const endHead = endHeadLines(source.speaker, column, endUnit);
  const value = widest(
    source,
    texts.map((text) => text.value),
    'figure',
  );
  const marks = Math.max(0, ...texts.map((text) => marksWidth(source, text.marks)));
  const end = Math.max(
    0,
    ...texts.map((text) => widest(source, [text.end], 'figure') + marksWidth(source, text.endMarks)),
  );
  const headWidth = widest(source, head, 'headStrong');
  return {
    column,
    endUnit,
    head,
    endHead,
    texts,
    value: Math.max(value, headWidth - marks) + PAD,
    marks: marks + (marks > 0 ? 1 : 0),
    strip: 0,
    end: column.hasEnd ? Math.max(end, widest(source, endHead, 'head')) + 2 * PAD : 0,
  };
}

const hasStrip = ({ column, texts }: Plan): boolean =>
  column.kind === 'turn' && texts.some(({ inWindow }) => inWindow !== null);

const widthOf = (plan: Plan): number =>
  PAD + plan.value + plan.marks + (plan.strip > 0 ? plan.strip + PAD : 0) + plan.end;

function drawStrip(source: PageSource, share: number, x: number, y: number, width: number): void {
  const { doc } = source.paper;
  const height = 6 * source.scale;
  const at = Math.max(0, Math.min(1, 0.25 + share * 0.5));
  doc.rect(x, y, width, height).fill(ink.line2);
  doc
    .rect(x + width * 0.25, y, width * 0.5, height)
    .lineWidth(0.7)
    .fillAndStroke(ink.petrolWash, ink.petrol);
  doc.rect(x + width * at - 0.75, y - 1.5, 1.5, height + 3).fill(ink.ink);
}

function drawMarked(source: PageSource, marks: readonly CellMark[], x: number, y: number): void {
  let left = x + 1.5;
  for (const { text, tone } of marks) {
    const own = styleOf(source, TONES[tone]);
    source.paper.line(text, own, left, y + (styleOf(source, 'figure').leading - own.leading) * 0.6);
    left += source.paper.widthOf(text, own) + 2;
  }
}

/** Draws figure and marks of one cell; the figure ends where the marks begin, so that figures stand under each other. */
function drawCell(source: PageSource, plan: Plan, text: CellText, x: number, y: number): void {
  const { paper } = source;
  const figure = styleOf(source, 'figure');
  const edge = x + PAD + plan.value;
  paper.leaf('TD', () => {
    paper.line(text.value, figure, edge - paper.widthOf(text.value, figure), y);
    drawMarked(source, text.marks, edge, y);
  });
  if (plan.strip > 0 && text.inWindow !== null) {
    const share = text.inWindow;
    paper.artifact(() =>
      drawStrip(source, share, edge + plan.marks + PAD, y + figure.leading / 2 - 3 * source.scale, plan.strip),
    );
  }
  if (plan.end === 0) return;
  const right = x + widthOf(plan) - marksWidth(source, text.endMarks);
  paper.leaf('TD', () => {
    paper.line(text.end, figure, right - paper.widthOf(text.end, figure), y);
    drawMarked(source, text.endMarks, right, y);
  });
}

function drawHeads(source: PageSource, plans: readonly Plan[], x: number, y: number): void {
  const { paper } = source;
  let left = x;
  for (const plan of plans) {
    const edge = left + PAD + plan.value + plan.marks;
    paper.leaf('TH', () => drawLines(source, plan.head, edge, y), { scope: 'Column' });
    if (plan.end > 0) {
      const right = left + widthOf(plan);
      paper.leaf('TH', () => drawLines(source, plan.endHead, right, y), { scope: 'Column' });
    }
    left += widthOf(plan);
  }
}

function drawLines(source: PageSource, lines: readonly string[], right: number, y: number): void {
  const { paper } = source;
  for (const [index, line] of lines.entries()) {
    const style = styleOf(source, index === 0 ? 'headStrong' : 'head');
    paper.line(line, style, right - paper.widthOf(line, style), y + index * style.leading);
  }
}

/** Spreads the room that is left over the strips of turns, then over the columns. */
function widened(plans: readonly Plan[], labels: number, width: number): { plans: Plan[]; apart: number } {
  const needed = plans.reduce((sum, plan) => sum + widthOf(plan), labels);
  const striped = plans.filter(hasStrip).length;
  const room = striped > 0 ? (width - needed) / striped - PAD : 0;
  const strip = room < LEAST_STRIP ? 0 : Math.min(MOST_STRIP, room);
  const wide = plans.map((plan) => ({ ...plan, strip: hasStrip(plan) ? strip : 0 }));
  const left = width - wide.reduce((sum, plan) => sum + widthOf(plan), labels);
  return { plans: wide, apart: Math.max(0, Math.min(14, left / Math.max(1, plans.length))) };
}

interface Table {
  source: PageSource;
  rows: readonly ProofRow[];
  plans: readonly Plan[];
  labelWidth: number;
  groupWidth: number;
  headHeight: number;
  rowHeight: number;
}

function drawTable(table: Table, x: number, y: number, width: number): void {
  const { source, rows, labelWidth, groupWidth, headHeight, rowHeight } = table;
  const { paper, speaker } = source;
  const { plans, apart } = widened(table.plans, labelWidth + groupWidth, width);
  const spaced = plans.map((plan) => ({ ...plan, value: plan.value + apart }));
  const figure = styleOf(source, 'figure');
  const first = x + labelWidth + groupWidth;
  paper.group('Table', () => {
    paper.group('TR', () => {
      const noun = word(`column.${rows[0]?.noun ?? 'bolt'}`, speaker.language);
      paper.leaf('TH', () => drawLines(source, [noun], x + labelWidth, y), { scope: 'Column' });
      if (groupWidth > 0) {
        const group = word('column.group', speaker.language);
        paper.leaf('TH', () => drawLines(source, [group], x + labelWidth + groupWidth, y), { scope: 'Column' });
      }
      drawHeads(source, spaced, first, y);
    });
    for (const [index, row] of rows.entries()) {
      const top = y + headHeight + index * rowHeight;
      paper.rule(x, top, width, ink.line2, 0.6);
      paper.group('TR', () => {
        const line = top + (rowHeight - figure.leading) / 2;
        paper.leaf('TH', () => paper.line(row.label, figure, x + labelWidth - paper.widthOf(row.label, figure), line), {
          scope: 'Row',
        });
        if (groupWidth > 0)
          paper.leaf('TD', () =>
            paper.line(row.group, figure, x + labelWidth + groupWidth - paper.widthOf(row.group, figure), line),
          );
        let left = first;
        for (const plan of spaced) {
          const text = plan.texts[index];
          if (text) drawCell(source, plan, text, left, line);
          left += widthOf(plan);
        }
      });
    }
  });
}

function tableOf(source: PageSource, indexes: readonly number[], rows: readonly ProofRow[]): Table {
  const { sheet } = source.document;
  const { language } = source.speaker;
  const plans = indexes.flatMap((index) => {
    const column = sheet.columns[index];
    return column ? [planColumn(source, column, index, rows)] : [];
  });
  const noun = word(`column.${rows[0]?.noun ?? 'bolt'}`, language);
  const labels = rows.map((row) => row.label);
  const labelWidth = Math.max(widest(source, labels, 'figure'), widest(source, [noun], 'headStrong'));
  const hasGroups = new Set(sheet.rows.map((row) => row.group)).size > 1;
  const groupWidth = hasGroups ? widest(source, [word('column.group', language)], 'headStrong') + 2 * PAD : 0;
  const lines = Math.max(1, ...plans.map((plan) => Math.max(plan.head.length, plan.endHead.length)));
  const headHeight = lines * styleOf(source, 'head').leading + 3;
  const rowHeight = styleOf(source, 'figure').leading * 1.3;
  return { source, rows, plans, labelWidth, groupWidth, headHeight, rowHeight };
}

function tableBlock(table: Table, width: number): Block {
  const { source, rows, headHeight, rowHeight } = table;
  const legend = legendOf(
    source.speaker,
    table.plans.map(({ column }) => column),
    rows,
  );
  const body = headHeight + rows.length * rowHeight;
  const under = legend ? textBlock(source, legend, 'tiny', width) : null;
  return {
    height: body + (under ? under.height + 3 : 0),
    draw: (x, y) => {
      drawTable(table, x, y, width);
      if (under) source.paper.leaf('P', () => source.paper.drawBlock(under, x, y + body + 3));
    },
  };
}

/** Plans a table of these columns (by index) and rows; measured once, drawn for any width that is at least `needs`. */
export function readingTablePlan(
  source: PageSource,
  indexes: readonly number[],
  rows: readonly ProofRow[],
): ReadingTablePlan {
  const table = tableOf(source, indexes, rows);
  const { plans, labelWidth, groupWidth, headHeight, rowHeight } = table;
  const needs = plans.reduce((sum, plan) => sum + widthOf(plan), labelWidth + groupWidth);
  const strips = plans.filter(hasStrip).length * (MOST_STRIP + PAD);
  return {
    needs,
    wishes: needs + strips + plans.length * 4,
    rowHeight,
    headHeight,
    block: (width) => tableBlock(table, width),
  };
}
