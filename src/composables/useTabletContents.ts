import { onScopeDispose, readonly, shallowRef, type ShallowRef } from 'vue';
import type { StorageRoom } from '@/offline/storage';
import { storageErrorOf } from '@/offline/storageError';
import type { WalkOnTablet } from '@/offline/walkIndex';
import { tabletRuntime } from './tabletRuntime';

export type { StorageRoom } from '@/offline/storage';
export type { WalkOnTablet } from '@/offline/walkIndex';

/** *What's on this tablet*. */
export interface UseTabletContentsReturn {
  /** Null until they were read. */
  walks: Readonly<ShallowRef<readonly WalkOnTablet[] | null>>;
  room: Readonly<ShallowRef<StorageRoom | null>>;
  /** Code of a storage that could not be read, for `errors.<code>`. */
  failure: Readonly<ShallowRef<string | null>>;
  /** Walks of which this tablet lost events that the server has (fault 20). */
  lost: () => readonly string[];
  /** They were read: they are no longer told. */
  forgetLost: () => Promise<void>;
  /** Everything on this tablet as one JSON file, also when part of it cannot be read. */
  exportFile: () => Promise<File>;
}

/** Walks on this tablet, room, and the file of everything. Looks again whenever a walk or its sending changed. */
export function useTabletContents(): UseTabletContentsReturn {
  const tablet = tabletRuntime();
  const walks = shallowRef<readonly WalkOnTablet[] | null>(null);
  const room = shallowRef<StorageRoom | null>(null);
  const failure = shallowRef<string | null>(null);
  async function look(): Promise<void> {
    try {
      walks.value = await tablet.walksHere();
      room.value = await tablet.room();
      failure.value = null;
    } catch (error) {
      failure.value = storageErrorOf(error).code;
    }
  }
  onScopeDispose(tablet.onChange((what) => void (what === 'walks' && look())));
  onScopeDispose(tablet.sync.subscribe(() => void look()));
  void look();
  return {
    walks: readonly(walks),
    room: readonly(room),
    failure: readonly(failure),
    lost: () => tablet.sync.lostWalks(),
    forgetLost: () => tablet.forgetLost(),
    exportFile: async () => {
      const everything = await tablet.exportAll();
      const name = `boltwalk-tablet-${everything.exportedAt.slice(0, 10)}.json`;
      return new File([JSON.stringify(everything, null, 1)], name, { type: 'application/json' });
    },
  };
}
