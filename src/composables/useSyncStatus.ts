import { computed, onScopeDispose, readonly, shallowRef, type ComputedRef, type ShallowRef } from 'vue';
import type { SyncPhase, SyncStatus } from '@/offline/syncStatus';
import { tabletRuntime } from './tabletRuntime';

export type { SyncPhase } from '@/offline/syncStatus';

/** How sending stands. */
export interface UseSyncStatusReturn {
  status: Readonly<ShallowRef<SyncStatus>>;
  /** Events and files not yet confirmed by the server. */
  waiting: ComputedRef<number>;
  /** Walks that were refused and wait for a person. */
  blocked: ComputedRef<number>;
  phase: ComputedRef<SyncPhase>;
  lastSent: ComputedRef<string | null>;
  retryAt: ComputedRef<number | null>;
  /** Code of what stands in the way, for `errors.<code>`. */
  code: ComputedRef<string | null>;
  /** Try now: ends every wait and tries refused walks once more. */
  retry: () => Promise<void>;
}

/** How sending stands, for the tray chip and *What's on this tablet*. */
export function useSyncStatus(): UseSyncStatusReturn {
  const { sync } = tabletRuntime();
  const status = shallowRef(sync.status());
  onScopeDispose(sync.subscribe((next) => (status.value = next)));
  return {
    status: readonly(status),
    waiting: computed(() => status.value.waiting),
    blocked: computed(() => status.value.blocked),
    phase: computed(() => status.value.phase),
    lastSent: computed(() => status.value.lastSent),
    retryAt: computed(() => status.value.retryAt),
    code: computed(() => status.value.code),
    retry: () => sync.press(),
  };
}
