import { isoToMs, type IsoTime } from '../kernel/time';
import type { WrenchSnapshot } from './wrench';

const DAY = 86_400_000;

/** What a calibration's lapse hangs on. */
export type DueWrench = Pick<WrenchSnapshot, 'due' | 'cycles'>;

/** When the due date is over: a bare date lasts to the end of its day (UTC), a full instant to that instant. */
function dueEnds(date: string): number {
  return date.length === 10 ? isoToMs(`${date}T00:00:00Z`) + DAY : isoToMs(date);
}

/**
 * By what the calibration has lapsed at an instant, or null while it stands: the date is over, or the cycles are used up,
 * whichever is first (K2, K3). A shop whose day ends at another hour puts the full instant in `due.date`.
 */
export function lapsedBy(wrench: DueWrench, at: IsoTime): 'date' | 'cycles' | null {
  if (wrench.due.date !== null && isoToMs(at) >= dueEnds(wrench.due.date)) return 'date';
  return wrench.due.cycles !== null && wrench.cycles >= wrench.due.cycles ? 'cycles' : null;
}

/** True when the calibration has lapsed by date or by cycles. */
export function isLapsed(wrench: DueWrench, at: IsoTime): boolean {
  return lapsedBy(wrench, at) !== null;
}

/** Whole days until the due date is over: 0 on the last day, negative after it; null where no date is set. */
export function daysLeft(wrench: DueWrench, at: IsoTime): number | null {
  return wrench.due.date === null ? null : Math.ceil((dueEnds(wrench.due.date) - isoToMs(at)) / DAY) - 1;
}

/** Cycles until due, never below 0; null where none are set. */
export function cyclesLeft(wrench: DueWrench): number | null {
  return wrench.due.cycles === null ? null : Math.max(0, wrench.due.cycles - wrench.cycles);
}
