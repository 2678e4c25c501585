import type { VerdictKind } from './verdictKind';

/** One hole of the pass under way. */
export type PassCell = 'done' | 'off' | 'now' | 'todo';

/** One pass of the joint, in words. */
export interface PassChip {
  id: string;
  /** "3 · turn 90°" */
  title: string;
  /** What stays of the title where there is little room; the part before " · " if left out. */
  short?: string;
  /** "all 14 in", "not begun" */
  words: string;
  state: 'done' | 'now' | 'ahead';
  /** Sign of a finished pass: how it ended. */
  sign?: VerdictKind | null;
  /** Holes of the pass under way, in its order. */
  cells?: PassCell[];
}
