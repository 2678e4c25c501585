import { onScopeDispose } from 'vue';

/** How long a walk may be out of sight before its return asks what was done meanwhile (W9). */
export const HIDDEN_MS = 30_000;

/** Options of `useHiddenPause`. */
export interface UseHiddenPauseOptions {
  document?: Document;
  /** Clocks, ms. One that only runs may stand still while a tablet sleeps, the wall clock may jump: either one counts. */
  clocks: readonly (() => number)[];
}

/**
 * Calls `pause` once when the screen has been hidden for 30 seconds: by timer where the browser lets it run, else on the
 * return. A tablet that sleeps runs no timer, so the time is looked at again when it wakes.
 */
export function useHiddenPause(pause: () => void, { document: host = document, clocks }: UseHiddenPauseOptions): void {
  let hiddenSince: readonly number[] | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const pauseOnce = (): void => {
    if (hiddenSince === null) return;
    hiddenSince = null;
    pause();
  };
  const onChange = (): void => {
    clearTimeout(timer);
    if (host.visibilityState === 'hidden') {
      hiddenSince = clocks.map((clock) => clock());
      timer = setTimeout(pauseOnce, HIDDEN_MS);
      return;
    }
    if (clocks.some((clock, index) => clock() - (hiddenSince?.[index] ?? Infinity) >= HIDDEN_MS)) pauseOnce();
    hiddenSince = null;
  };
  host.addEventListener('visibilitychange', onChange);
  onScopeDispose(() => {
    clearTimeout(timer);
    host.removeEventListener('visibilitychange', onChange);
  });
}
