import { slotDone } from '../../walk/route';
import { slotsOfHole, walkPasses } from '../../walk/slots';
import type { WalkState } from '../../walk/state';
import type { ProofCell, ProofColumn, ProofCounts, ProofRow } from '../sheet';
import { holesOf } from './source';

interface FinalCell {
  cell: ProofCell;
  column: ProofColumn;
}

/** The cells that count: of a repeated pass only those of its last round (R12). */
export function finalCells(columns: readonly ProofColumn[], rows: readonly ProofRow[]): FinalCell[] {
  return rows.flatMap((row) =>
    columns.flatMap((column, index) => {
      const cell = row.cells[index];
      return cell && column.isFinal ? [{ cell, column }] : [];
    }),
  );
}

/** W7: clicked while moving, or without moving where that is the wanted answer. */
function clickCounts({ cell, column }: FinalCell): boolean {
  const stillWanted = column.kind === 'check' || (column.round ?? 1) > 1;
  return cell.verdict === 'in' && (cell.click === 'moving' || (cell.click === 'still' && stillWanted));
}

function measuredInside({ cell }: FinalCell): boolean {
  return cell.verdict === 'in' && (cell.end?.verdict ?? 'in') === 'in';
}

const share = (cells: FinalCell[], inside: (cell: FinalCell) => boolean) => ({
  inside: cells.filter(inside).length,
  count: cells.length,
});

/** What the first sentence claims (D1); a click and a mark looked at are counted apart, because nothing was measured. */
export function countsOf(state: WalkState, columns: ProofColumn[], rows: ProofRow[]): ProofCounts {
  const finals = finalCells(columns, rows);
  const isClicked = ({ cell }: FinalCell): boolean => cell.sources.includes('clicked');
  const holes = holesOf(state);
  return {
    fasteners: {
      done: holes.filter((hole) => slotsOfHole(state, hole).every((slot) => slotDone(state, slot))).length,
      total: holes.length,
    },
    passes: walkPasses(state).length,
    measured: share(
      finals.filter((final) => final.cell.value !== null && !isClicked(final)),
      measuredInside,
    ),
    clicked: share(finals.filter(isClicked), clickCounts),
    marks: share(
      finals.filter(({ cell }) => cell.mark !== null),
      ({ cell }) => cell.mark === 'asMarked',
    ),
    accepted: finals.filter(({ cell }) => cell.status === 'accepted').length,
    readings: state.readings.length,
  };
}
