import type { ProofRow } from '@shared/proof/sheet';
import { beside, type PageSource } from './block';
import { readingTablePlan } from './blocks/readingsBlock';
import type { FlowPages } from './flowPages';

const GUTTER = 22;
/** Fewer rows than this are not worth a page's bottom. */
const LEAST_ROWS = 4;

/** Columns that fit beside each other, pass after pass; a column too wide for the page stands alone. */
function columnGroups(source: PageSource, width: number): number[][] {
  const { columns, rows } = source.document.sheet;
  const groups: number[][] = [];
  for (const index of columns.keys()) {
    const current = groups.at(-1);
    if (current && readingTablePlan(source, [...current, index], rows).needs <= width) current.push(index);
    else groups.push([index]);
  }
  return groups;
}

/** How many rows fit in what is left of the page, in one block or two beside each other. */
function rowsThatFit(height: number, plan: ReturnType<typeof readingTablePlan>): number {
  const legend = 14;
  return Math.floor((height - plan.headHeight - legend) / plan.rowHeight);
}

function addRows(
  source: PageSource,
  pages: FlowPages,
  columns: readonly number[],
  rows: readonly ProofRow[],
  width: number,
): void {
  const whole = readingTablePlan(source, columns, rows);
  const half = (width - GUTTER) / 2;
  const across = rows.length > 24 && whole.needs <= half ? 2 : 1;
  let left = [...rows];
  while (left.length > 0) {
    const fit = rowsThatFit(pages.left(), whole);
    if (fit < Math.min(LEAST_ROWS, left.length)) {
      pages.turn();
      continue;
    }
    const now = left.slice(0, fit * across);
    left = left.slice(now.length);
    const each = Math.ceil(now.length / across);
    const parts = across === 1 ? [now] : [now.slice(0, each), now.slice(each)];
    const tableWidth = across === 1 ? Math.min(width, Math.max(whole.needs, whole.wishes + 60)) : half;
    pages.add(
      beside(
        parts
          .filter((part) => part.length > 0)
          .map((part, index) => ({
            x: index * (half + GUTTER),
            block: readingTablePlan(source, columns, part).block(tableWidth),
          })),
      ),
    );
  }
}

/** All readings over as many pages as they need: columns in groups that fit, rows in blocks that fit. */
export function flowReadings(source: PageSource, pages: FlowPages, width: number): void {
  const { rows } = source.document.sheet;
  for (const columns of columnGroups(source, width)) addRows(source, pages, columns, rows, width);
}
