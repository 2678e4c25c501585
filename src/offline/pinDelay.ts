import type { PinTries } from './settingValues';

const FREE_TRIES = 3;
const FIRST_DELAY_MS = 5_000;
const LONGEST_DELAY_MS = 15 * 60_000;

/** How long to wait after so many wrong tries: it grows, and it ends; nobody is locked out for good. */
export function delayAfter(failures: number): number {
  if (failures < FREE_TRIES) return 0;
  return Math.min(LONGEST_DELAY_MS, FIRST_DELAY_MS * 2 ** (failures - FREE_TRIES));
}

/**
 * Milliseconds still to wait. A clock that was set back since the last try starts the delay anew: it can neither be
 * skipped that way nor last longer than it would have.
 */
export function waitLeft(tries: PinTries | undefined, now: number): number {
  if (!tries) return 0;
  const delay = delayAfter(tries.failures);
  const passed = now - tries.lastAt;
  return passed < 0 ? delay : Math.max(0, delay - passed);
}
