import type { VerdictKind } from './verdictKind';

/** One figure of a reading: degrees, end torque, pulls, or the torque alone. `value` is the text as typed. */
export interface ReadingField {
  id: string;
  value: string;
  /** Unit in words, e.g. "degrees\nturned". */
  unit: string;
  /** Accessible name where the unit words are not enough. */
  label?: string;
  /** "this pull" or "total since zero", "wanted". */
  note?: string;
  verdict?: VerdictKind | null;
}

/** Figures of the strip, as written. */
export interface ReadingStrip {
  low: string;
  high: string;
  target?: string | null;
  value?: string | null;
}
