const FREE = 3;
const LONGEST_SECONDS = 900;

/**
 * Seconds to wait after so many failures in a row: none for the first three, then 2, 4, 8 … up to a quarter of an hour.
 * It grows and never becomes a lock: whoever guesses slows only the name that is guessed at.
 */
export const growingWait = (failures: number): number =>
  failures < FREE ? 0 : Math.min(LONGEST_SECONDS, 2 ** (failures - FREE + 1));
