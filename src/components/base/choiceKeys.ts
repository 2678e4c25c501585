/** What a key did to the choice. */
export type ChoiceKeyResult = { kind: 'select'; index: number } | { kind: 'clear' } | { kind: 'nothing' };

/** Milliseconds that a burst of a wrench acting as keyboard never lasts apart (look.md, "The main button"). */
export const CHOICE_LOCK_MS = 700;

/**
 * Tells a person's digit from the burst of a keyed wrench: keys in the first 700 ms after opening count for nothing, a
 * digit less than 700 ms after another clears the choice, and Enter counts only 700 ms after the last digit, tap or
 * Enter. `now` gives milliseconds of a clock that never goes back.
 */
export function createChoiceKeys(now: () => number) {
  let opened = now();
  let last = -Infinity;

  const isLocked = (): boolean => now() - opened < CHOICE_LOCK_MS || now() - last < CHOICE_LOCK_MS;

  return {
    /** A digit: selects the choice of that number, or clears where it came too fast. */
    digit(digit: number, count: number): ChoiceKeyResult {
      if (now() - opened < CHOICE_LOCK_MS) return { kind: 'nothing' };
      const tooFast = isLocked();
      last = now();
      if (tooFast) return { kind: 'clear' };
      return digit >= 1 && digit <= count ? { kind: 'select', index: digit - 1 } : { kind: 'nothing' };
    },
    /** Enter: true where it may confirm. */
    enter(): boolean {
      const allowed = !isLocked();
      last = now();
      return allowed;
    },
    /** A tap selected: Enter right after it is not yet a decision. */
    tapped(): void {
      last = now();
    },
    /** Other choices are shown: the lock begins again. */
    reopen(): void {
      opened = now();
      last = -Infinity;
    },
  };
}
