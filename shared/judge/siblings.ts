import { modifiedZ } from '../statistics/modifiedZ';
import { median } from '../statistics/spread';
import { siblingLimit } from './siblingLimits';

/** A reading among its siblings: same group of holes, stage, source kind and unit. `uncertainty` is its u, in that unit. */
export interface SiblingReading {
  hole: string;
  value: number;
  uncertainty: number;
}

/** A reading that stands apart: its M, the limit it passed, and the side, on which the possible causes hang (J6). */
export interface SiblingNote {
  hole: string;
  value: number;
  median: number;
  score: number;
  limit: number;
  side: 'low' | 'high';
}

/**
 * The readings that stand apart from their siblings (J6): at least eight readings, |M| beyond the limit for their number,
 * and further than 2 u from the median. A note at review, never a stop, and worded as a possibility.
 */
export function siblingNotes(readings: readonly SiblingReading[]): SiblingNote[] {
  const limit = siblingLimit(readings.length);
  if (limit === null) return [];
  const values = readings.map((reading) => reading.value);
  const scores = modifiedZ(values);
  if (!scores) return [];
  const middle = median(values);
  return readings.flatMap(({ hole, value, uncertainty }, i) => {
    const score = scores[i] ?? 0;
    if (Math.abs(score) <= limit || Math.abs(value - middle) <= 2 * uncertainty) return [];
    return [{ hole, value, median: middle, score, limit, side: value < middle ? ('low' as const) : ('high' as const) }];
  });
}
