import { formatDecimal, formatQuantity } from '../quantity/format';
import { decimalToRational, toNumber } from '../quantity/rational';
import { unitSymbol, type Unit } from '../quantity/unit';
import type { Window } from '../quantity/window';
import { phrase, say, word, type Speaker } from './phrase';
import type { ProofCell, ProofColumn, ProofRow } from './sheet';

/** A mark behind a figure, in small type: a fact, something off, or something a supervisor accepted. */
export interface CellMark {
  text: string;
  tone: 'quiet' | 'off' | 'accepted';
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

const limits = ({ low, high }: Window, speaker: Speaker): string =>
  `${formatDecimal(low, speaker.language)}–${formatDecimal(high, speaker.language)}`;

/** Windows as head lines: figures, then the unit; the group's letter before them where groups differ. */
export function windowLines(speaker: Speaker, windows: ProofColumn['windows']): string[] {
  const unit = windows[0]?.window.unit;
  if (unit === undefined) return [];
  const suffix = unit === 'deg' ? '°' : '';
  const figures = windows.map(({ groups, window }) => {
    const own = limits(window, speaker) + suffix;
    return windows.length > 1 ? `${groups.join('')} ${own}` : own;
  });
  return suffix ? figures : [...figures, unitSymbol(unit)];
}

function verdictMark(speaker: Speaker, verdict: ProofCell['verdict'], accepted: boolean): CellMark[] {
  const { language } = speaker;
  if (verdict === null || verdict === 'in') return accepted ? [acceptedMark(speaker)] : [];
  const marks: CellMark[] = [{ text: word(`verdict.${verdict}`, language), tone: 'off' }];
  return accepted ? [...marks, acceptedMark(speaker)] : marks;
}

const acceptedMark = (speaker: Speaker): CellMark => ({
  text: word('cell.accepted', speaker.language),
  tone: 'accepted',
});

function marksOf(speaker: Speaker, column: ProofColumn, cell: ProofCell): CellMark[] {
  const { language } = speaker;
  const marks: CellMark[] = [];
  if (cell.pulls > 1) marks.push({ text: `×${cell.pulls}`, tone: 'quiet' });
  if (column.source === null)
    marks.push({ text: cell.sources.map((one) => word(`letter.${one}`, language)).join('+'), tone: 'quiet' });
  if (cell.moved === true) marks.push({ text: 'm', tone: 'quiet' });
  if (cell.outOfOrder) marks.push({ text: '†', tone: 'quiet' });
  return [...marks, ...verdictMark(speaker, cell.verdict, cell.status === 'accepted')];
}

function valueOf(speaker: Speaker, column: ProofColumn, cell: ProofCell): string {
  const { language } = speaker;
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
  speaker: Speaker,
  { column, endUnit }: { column: ProofColumn; endUnit: Unit | null },
  row: ProofRow,
  cell: ProofCell | null,
): CellText {
  const { language } = speaker;
  if (!cell) return { value: '', marks: [], end: '', endMarks: [], inWindow: null };
  const { end } = cell;
  const endText =
    end &&
    (end.value.unit === endUnit ? formatDecimal(end.value.value, language) : formatQuantity(end.value, language));
  return {
    value: valueOf(speaker, column, cell),
    marks: marksOf(speaker, column, cell),
    end: endText ?? '',
    endMarks: end ? verdictMark(speaker, end.verdict, false) : [],
    inWindow: placeInWindow(column, row, cell),
  };
}

/** What the marks in these columns mean, for the line under the table. */
export function legendOf(speaker: Speaker, columns: readonly ProofColumn[], rows: readonly ProofRow[]): string {
  const { language } = speaker;
  const cells = rows.flatMap((row) => row.cells).filter((cell) => cell !== null);
  const parts: string[] = [];
  const mixed = columns.some((column) => column.source === null && column.kind !== 'check');
  if (mixed) {
    const sources = [...new Set(cells.flatMap((cell) => cell.sources))];
    for (const one of sources) {
      const params = { letter: word(`letter.${one}`, language), word: word(`short.${one}`, language) };
      parts.push(say(phrase('legend.source', params), speaker));
    }
  }
  if (cells.some((cell) => cell.pulls > 1)) parts.push(`×2 ${word('legend.pulls', language)}`);
  if (cells.some((cell) => cell.outOfOrder)) parts.push(`† ${word('legend.order', language)}`);
  if (cells.some((cell) => cell.moved === true)) parts.push(word('legend.moved', language));
  return parts.join(' · ');
}

/** The head of a column: pass (and round), windows, kind of stage, source where all are alike. */
export function headLines(speaker: Speaker, column: ProofColumn): string[] {
  const { language } = speaker;
  const round = column.round === null ? `${column.pass}` : `${column.pass}.${column.round}`;
  const kind = column.kind === 'turn' ? 'column.turn' : column.kind === 'check' ? 'column.check' : null;
  return [
    round,
    ...windowLines(speaker, column.windows),
    ...(kind ? [word(kind, language)] : []),
    ...(column.source ? [word(`short.${column.source}`, language)] : []),
  ];
}

/** The head of the end torques beside a turn; empty where none was recorded. */
export function endHeadLines(speaker: Speaker, column: ProofColumn, endUnit: Unit | null): string[] {
  if (!column.hasEnd) return [];
  const unit = endUnit ? [unitSymbol(endUnit)] : [];
  return [word('column.end', speaker.language), ...unit, ...windowLines(speaker, column.endWindows).slice(0, 1)];
}
