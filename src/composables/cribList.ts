import type { WrenchRow } from '@shared/contracts/wrenches.contract';
import { cyclesLeft, daysLeft, lapsedBy } from '@shared/crib/due';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import { convertQuantity, type Quantity } from '@shared/quantity/quantity';

/** Where a wrench stands for whoever wants to take one today. */
export type WrenchStanding = 'lapsed' | 'quarantined' | 'away' | 'soon' | 'inService' | 'retired';

/** By what the calibration ends first, and how much of it is used up (0 to 1, more when it has lapsed). */
export interface WrenchDue {
  days: number | null;
  cyclesLeft: number | null;
  /** Share used of the cycles; null where none are set. */
  cyclesUsed: number | null;
  lapsed: 'date' | 'cycles' | null;
}

/** A wrench of the list. `low` and `high` are its range in N·m for drawing; null where it has none. */
export interface CribLine {
  wrench: WrenchSnapshot;
  standing: WrenchStanding;
  due: WrenchDue;
  range: { low: number; high: number } | null;
}

/** Most urgent first. */
export const WRENCH_STANDINGS: readonly WrenchStanding[] = [
  'lapsed',
  'quarantined',
  'away',
  'soon',
  'inService',
  'retired',
];

/** Within so many days a calibration is said to fall due soon (common practice, no source). */
export const SOON_DAYS = 45;

function dueOf(wrench: WrenchSnapshot, at: string): WrenchDue {
  const { cycles } = wrench.due;
  return {
    days: daysLeft(wrench, at),
    cyclesLeft: cyclesLeft(wrench),
    cyclesUsed: cycles === null || cycles === 0 ? null : wrench.cycles / cycles,
    lapsed: lapsedBy(wrench, at),
  };
}

/** Under a tenth of the cycles left counts as soon, like the last days of the date. */
const isSoon = ({ days, cyclesUsed }: WrenchDue): boolean =>
  (days !== null && days <= SOON_DAYS) || (cyclesUsed !== null && cyclesUsed >= 0.9);

function standingOf(row: WrenchRow, due: WrenchDue): WrenchStanding {
  if (row.state === 'retired' || row.state === 'quarantined' || row.state === 'away') return row.state;
  if (due.lapsed) return 'lapsed';
  return isSoon(due) ? 'soon' : 'inService';
}

/** Figures for drawing only; judged is by exact values elsewhere. */
const newtonMetres = (quantity: Quantity): number => Number(convertQuantity(quantity, 'N.m', 3).value);

function rangeOf({ range }: WrenchSnapshot): CribLine['range'] {
  if (!range) return null;
  const { low, high, unit } = range;
  return { low: newtonMetres({ value: low, unit }), high: newtonMetres({ value: high, unit }) };
}

const soonest = ({ due }: CribLine): number => due.days ?? Infinity;

/** Every wrench with its standing at an instant, most urgent first, within that by due date and tag. */
export function cribLines(rows: readonly WrenchRow[], at: string): CribLine[] {
  return rows
    .map((row) => {
      const due = dueOf(row.snapshot, at);
      return { wrench: row.snapshot, standing: standingOf(row, due), due, range: rangeOf(row.snapshot) };
    })
    .sort(
      (a, b) =>
        WRENCH_STANDINGS.indexOf(a.standing) - WRENCH_STANDINGS.indexOf(b.standing) ||
        soonest(a) - soonest(b) ||
        a.wrench.tag.localeCompare(b.wrench.tag, undefined, { numeric: true }),
    );
}

/** Whether a wrench is what somebody searches: tag, serial, certificate. */
export function isWanted({ wrench, standing }: CribLine, q: string, state: string, drive: string): boolean {
  const needle = q.trim().toLowerCase();
  const text = `${wrench.tag} ${wrench.serial} ${wrench.certificate ?? ''}`.toLowerCase();
  return (
    text.includes(needle) && (state === 'any' || standing === state) && (drive === 'any' || wrench.drive === drive)
  );
}
