const FIRST_MS = 2_000;
const LONGEST_MS = 5 * 60_000;
const LONGEST_ASKED_MS = 15 * 60_000;

/**
 * How long to wait before the next try after `failures` in a row (from 1). Grows to five minutes and stays there: there
 * is no last try, nothing is ever given up (fault 23). `random` (0 to 1) spreads tablets that lost the server together.
 * A server that asks for a longer pause gets it.
 */
export function backoff(failures: number, random: number, askedMs: number | null = null): number {
  const grown = Math.min(LONGEST_MS, FIRST_MS * 2 ** Math.min(failures - 1, 20));
  const spread = Math.round(grown * (0.5 + random / 2));
  return askedMs === null ? spread : Math.max(spread, Math.min(askedMs, LONGEST_ASKED_MS));
}
