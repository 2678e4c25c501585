/** Seeded randomness: the same seed gives the same walk, so that a failure can be seen again. */
export interface Random {
  /** From 0 up to, not including, 1. */
  next(): number;
  /** A whole number from `low` to `high`, both included. */
  whole(low: number, high: number): number;
  /** About normal, mean 0, standard deviation 1, never beyond ±3. */
  bell(): number;
  chance(share: number): boolean;
  /** One of a list that must not be empty. */
  pick<T>(list: readonly T[]): T;
}

/** 32-bit generator "mulberry32" (Tommy Ettinger, public domain; from memory): quick, small, good enough for a demo. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0;
  const next = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
  const whole = (low: number, high: number): number => low + Math.floor(next() * (high - low + 1));
  return {
    next,
    whole,
    // The sum of twelve uniform numbers less six has variance 1.
    bell: () =>
      Math.max(
        -3,
        Math.min(
          3,
          Array.from({ length: 12 }, next).reduce((sum, value) => sum + value, -6),
        ),
      ),
    chance: (share) => next() < share,
    pick: (list) => {
      const found = list[whole(0, list.length - 1)];
      if (found === undefined) throw new Error('nothing to pick from');
      return found;
    },
  };
}
