import { formatDecimal, formatQuantity } from '@shared/quantity/format';
import { decimalToRational, toNumber } from '@shared/quantity/rational';
import { unitSymbol, type Unit } from '@shared/quantity/unit';
import type { Window } from '@shared/quantity/window';
import { phrase, word } from '@shared/proof/phrase';
import type { ProofCell, ProofColumn, ProofRow } from '@shared/proof/sheet';
import { spoken, type PageSource } from '../block';
import type { StyleName } from '../ink';

/** A mark behind a figure, in small type. */
export interface CellMark {
  text: string;
  style: StyleName;
}

/** What stands in one cell of the table. */
export interface CellText {
  value: string;
  marks: CellMark[];
  end: string;
  endMarks: CellMark[];
  /** Where the value stands in its window: 0 at the lower limit, 1 at the upper; null where there is none. */
  inWindow: number | null;
}

const number = (text: string): number => toNumber(decimalToRational(text));

/** The unit a column is written in: that of its window. */
export const unitOf = (column: ProofColumn): Unit | null => column.windows[0]?.window.unit ?? null;

const limits = ({ low, high }: Window, source: PageSource): string =>
  `${formatDecimal(low, source.speaker.language)}–${formatDecimal(high, source.speaker.language)}`;

/** Windows as head lines: figures, then the unit; the group's letter before them where groups differ. */
export function windowLines(source: PageSource, windows: ProofColumn['windows']): string[] {
  const unit = windows[0]?.window.unit;
  if (unit === undefined) return [];
  const suffix = unit === 'deg' ? '°' : '';
  const figures = windows.map(({ groups, window }) => {
    const own = limits(window, source) + suffix;
    return windows.length > 1 ? `${groups.join('')} ${own}` : own;
  });
  return suffix ? figures : [...figures, unitSymbol(unit)];
}

function verdictMark(source: PageSource, verdict: ProofCell['verdict'], accepted: boolean): CellMark[] {
  const { language } = source.speaker;
  if (verdict === null || verdict === 'in') return accepted ? [acceptedMark(source)] : [];
  const marks: CellMark[] = [{ text: word(`verdict.${verdict}`, language), style: 'tinyOff' }];
  return accepted ? [...marks, acceptedMark(source)] : marks;
}

const acceptedMark = (source: PageSource): CellMark => ({
  text: word('cell.accepted', source.speaker.language),
  style: 'tinySteel',
});

function marksOf(source: PageSource, column: ProofColumn, cell: ProofCell): CellMark[] {
  const { language } = source.speaker;
  const marks: CellMark[] = [];
  if (cell.pulls > 1) marks.push({ text: `×${cell.pulls}`, style: 'tiny' });
  if (column.source === null)
    marks.push({ text: cell.sources.map((one) => word(`letter.${one}`, language)).join('+'), style: 'tiny' });
  if (cell.moved === true) marks.push({ text: 'm', style: 'tiny' });
  if (cell.outOfOrder) marks.push({ text: '†', style: 'tiny' });
  return [...marks, ...verdictMark(source, cell.verdict, cell.status === 'accepted')];
}

function valueOf(source: PageSource, column: ProofColumn, cell: ProofCell): string {
  const { language } = source.speaker;
  if (cell.mark !== null) return word(cell.mark === 'moved' ? 'cell.markMoved' : 'cell.asMarked', language);
  if (cell.value === null) return word('cell.none', language);
  const own = cell.value.unit === unitOf(column);
  return own ? formatDecimal(cell.value.value, language) : formatQuantity(cell.value, language);
}

function placeInWindow(column: ProofColumn, row: ProofRow, cell: ProofCell): number | null {
  const window = column.windows.find(({ groups }) => groups.includes(row.group))?.window;
  if (!window || cell.value === null || cell.value.unit !== window.unit) return null;
  const [low, high] = [number(window.low), number(window.high)];
  return (number(cell.value.value) - low) / (high - low);
}

/** The unit end torques are written in: that of the first one in the column. */
export function endUnitOf(rows: readonly ProofRow[], index: number): Unit | null {
  for (const { cells } of rows) {
    const unit = cells[index]?.end?.value.unit;
    if (unit) return unit;
  }
  return null;
}

/** Text and marks of one cell. */
export function cellText(
  source: PageSource,
  { column, endUnit }: { column: ProofColumn; endUnit: Unit | null },
  row: ProofRow,
  cell: ProofCell | null,
): CellText {
  const { language } = source.speaker;
  if (!cell) return { value: '', marks: [], end: '', endMarks: [], inWindow: null };
  const { end } = cell;
  const endText =
    end &&
    (end.value.unit === endUnit ? formatDecimal(end.value.value, language) : formatQuantity(end.value, language));
  return {
    value: valueOf(source, column, cell),
    marks: marksOf(source, column, cell),
    end: endText ?? '',
    endMarks: end ? verdictMark(source, end.verdict, false) : [],
    inWindow: placeInWindow(column, row, cell),
  };
}

/** What the marks in these columns mean, for the line under the table. */
export function legendOf(source: PageSource, columns: readonly ProofColumn[], rows: readonly ProofRow[]): string {
  const { language } = source.speaker;
  const cells = rows.flatMap((row) => row.cells).filter((cell) => cell !== null);
  const parts: string[] = [];
  const mixed = columns.some((column) => column.source === null && column.kind !== 'check');
  if (mixed) {
    const sources = [...new Set(cells.flatMap((cell) => cell.sources))];
    for (const one of sources) {
      const params = { letter: word(`letter.${one}`, language), word: word(`short.${one}`, language) };
      parts.push(spoken(source, phrase('legend.source', params)));
    }
  }
  if (cells.some((cell) => cell.pulls > 1)) parts.push(`×2 ${word('legend.pulls', language)}`);
  if (cells.some((cell) => cell.outOfOrder)) parts.push(`† ${word('legend.order', language)}`);
  if (cells.some((cell) => cell.moved === true)) parts.push(word('legend.moved', language));
  return parts.join(' · ');
}
