import { useSessionStore } from '@/stores/useSessionStore';
import type { WantedWalk } from '@/offline/openingOf';
import { tabletRuntime } from './tabletRuntime';
import type { TabletRefusal } from './useTablet';

export type { WantedWalk } from '@/offline/openingOf';

/** What came of beginning or fetching a walk: its id, or why not. */
export type WalkStartResult = { walk: string } | { refusal: TabletRefusal };

/** Begins walks, and brings walks of other tablets here. */
export interface UseWalkStartReturn {
  /** Begins a walk on a joint (W1); the person signed in must pull or record. */
  begin: (wanted: WantedWalk) => Promise<WalkStartResult>;
  /** Goes on with a walk that was handed over or released to tablets (W11). Needs the server. */
  takeOver: (walk: string) => Promise<WalkStartResult>;
  /** Takes a walk from a lost tablet; a supervisor's PIN. Every hole in doubt is looked at first (W9). */
  takeOverByForce: (walk: string, supervisor: string, pin: string) => Promise<WalkStartResult>;
  /** Brings a walk here to be read. Needs the server. */
  fetch: (walk: string) => Promise<WalkStartResult>;
}

const said = (done: { ok: true; value: string } | { ok: false; error: TabletRefusal }): WalkStartResult =>
  done.ok ? { walk: done.value } : { refusal: done.error };

/** Begins walks, and brings walks of other tablets here. */
export function useWalkStart(): UseWalkStartReturn {
  const session = useSessionStore();
  const nobody: WalkStartResult = { refusal: { code: 'stand.nobodySignedIn' } };
  return {
    begin: async (wanted) => {
      const { person } = session;
      return person ? said(await tabletRuntime().walks.begin(wanted, person.id)) : nobody;
    },
    takeOver: async (walk) => {
      const { person } = session;
      return person ? said(await tabletRuntime().takeOver({ walk, person: person.id, forced: null })) : nobody;
    },
    takeOverByForce: async (walk, supervisor, pin) => {
      const { pinVersion = 0 } = tabletRuntime().personById(supervisor) ?? {};
      return said(await tabletRuntime().takeOver({ walk, person: supervisor, forced: { pin, pinVersion } }));
    },
    fetch: async (walk) => said(await tabletRuntime().fetchWalk(walk)),
  };
}
