import type { TabletClient } from '@/api/tabletClient';
import { tabletClient } from '@/api/tabletClient';
import { webHolds, type Holds } from './locks';
import { browserClock, type TabletClock } from './tabletClock';

/** Word between the tabs of one tablet: a walk was written, the catalogue or who is signed in is another. */
export type TabWord = { kind: 'walk'; walk: string } | { kind: 'catalogue' } | { kind: 'session' };

/** Everything outside the program that a tablet works with; a test gives its own. */
export interface TabletWorld {
  factory: IDBFactory;
  holds: Holds;
  client: TabletClient;
  clock: TabletClock;
  storage: StorageManager | undefined;
  random: () => number;
  isOnline: () => boolean;
  setTimer: (work: () => void, ms: number) => unknown;
  clearTimer: (timer: unknown) => void;
  /** Tells the other tabs, and hears them. */
  tell: (word: TabWord) => void;
  listen: (listener: (word: TabWord) => void) => void;
  /** Version of this program. */
  version: string;
}

/** Where a browser has no Web Locks every tab may try; the head of the stored chain still lets only one through. */
const openHolds: Holds = {
  tryHold: () => Promise.resolve({ release: () => undefined }),
  waitForHold: () => Promise.resolve({ release: () => undefined }),
};

/** The world of a browser tab. */
export function browserWorld(version: string): TabletWorld {
  const channel = typeof BroadcastChannel === 'undefined' ? null : new BroadcastChannel('boltwalk');
  const { locks, storage } = navigator as Partial<Navigator>;
  return {
    factory: indexedDB,
    holds: locks ? webHolds(locks) : openHolds,
    client: tabletClient({ fetch: (input, init) => fetch(input, init) }),
    clock: browserClock(),
    storage,
    random: () => Math.random(),
    isOnline: () => navigator.onLine,
    setTimer: (work, ms) => setTimeout(work, ms),
    clearTimer: (timer) => clearTimeout(timer as number),
    tell: (word) => channel?.postMessage(word),
    listen: (listener) => {
      if (channel) channel.onmessage = (event: MessageEvent<TabWord>) => listener(event.data);
    },
    version,
  };
}
