/** The tablet's sense of time (fault 10): a wall clock that may jump, and one that only runs, counted from `boot`. */
export interface TabletClock {
  /** Name of this run of the program; `mono` counts from its beginning. */
  boot: string;
  /** Wall clock, ms since 1970. */
  now(): number;
  /** Whole ms since `boot`. */
  mono(): number;
}

/** The browser's clocks. One per run of the program. */
export const browserClock = (): TabletClock => ({
  boot: crypto.randomUUID(),
  now: () => Date.now(),
  mono: () => Math.round(performance.now()),
});

/** Wall time as events carry it. */
export const isoOf = (ms: number): string => new Date(ms).toISOString();
