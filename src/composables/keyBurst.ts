/** One key and when it came, in milliseconds of a clock that never goes back. A tap on the screen is never a burst. */
export interface TimedKey {
  key: string;
  at: number;
  tap?: boolean;
}

/** A wrench or scanner acting as keyboard sends its keys closer together than a person can. */
export const BURST_GAP_MS = 35;
/** One digit and Enter are told apart from a person's two fingers only when they come closer still. */
const PAIR_GAP_MS = 12;
/** What was typed by hand before a burst has stood still for so long; closer, it is one quick person. */
const HAND_GAP_MS = 300;

/**
 * The text that a device sent before this Enter, or null where a person typed it. A burst that follows figures typed by
 * hand stands alone: its text replaces theirs.
 */
export function burstBefore(keys: readonly TimedKey[], enterAt: number): string | null {
  let from = keys.length;
  let next = enterAt;
  while (from > 0) {
    const key = keys[from - 1];
    if (!key || key.tap || next - key.at > BURST_GAP_MS) break;
    next = key.at;
    from -= 1;
  }
  const burst = keys.slice(from);
  if (burst.length === 0) return null;
  const [only] = burst;
  if (burst.length === 1 && only && enterAt - only.at > PAIR_GAP_MS) return null;
  const before = keys[from - 1];
  if (before && next - before.at < HAND_GAP_MS) return null;
  return burst.map(({ key }) => key).join('');
}
