const KEY = 'boltwalk-open-walk';

/**
 * The walk that was on the screen: a tablet that was killed opens on it again, wherever its browser starts (W9). Only a
 * hint where to look; the walk itself is in the tablet's storage.
 */
export const openWalk = {
  get: (): string | null => window.localStorage.getItem(KEY),
  set: (walk: string): void => window.localStorage.setItem(KEY, walk),
  clear: (): void => window.localStorage.removeItem(KEY),
};
