import { onScopeDispose, shallowRef, type ShallowRef } from 'vue';
import type { Confirmation } from '@shared/contracts/confirmation.contract';
import { storageErrorOf } from '@/offline/storageError';
import { UnknownWalk } from '@/offline/walkStanding';
import type { PendingOrder } from '@/offline/orders';
import type { ShopWalkLog } from '@/offline/shopRules';
import { useTabletStore } from '@/stores/useTabletStore';
import { tabletRuntime } from './tabletRuntime';
import { useHiddenPause } from './useHiddenPause';
import { useNow } from './useNow';
import { walkPicture, type WalkPicture } from './walkPicture';

/** How opening a walk went. */
export type WalkOpenState =
  { kind: 'loading' } | { kind: 'ready' } | { kind: 'notFound' } | { kind: 'failed'; code: string };

/** A walk of this tablet for its page. */
export interface UseWalkReturn {
  /** `loading` until the chain is read; `failed` with a code for `errors.<code>`. */
  open: Readonly<ShallowRef<WalkOpenState>>;
  /** What the screens of the walk stand on; null until it is ready. */
  walk: Readonly<ShallowRef<WalkPicture | null>>;
  /** What the office ordered and this tablet cannot obey now, with the reason. */
  pendingOrders: Readonly<ShallowRef<readonly PendingOrder[]>>;
  /** What the shop has said about sealed PINs of this walk (decision 6). */
  confirmations: () => readonly Confirmation[];
  /** Tries to open it again. */
  retry: () => Promise<void>;
}

/** Options of `useWalk`. */
export interface UseWalkOptions {
  /** Leaves for the jobs. */
  leave: () => void;
}

interface Opened {
  open: ShallowRef<WalkOpenState>;
  walk: ShallowRef<WalkPicture | null>;
  pendingOrders: ShallowRef<readonly PendingOrder[]>;
}

/** Obeys the office's orders one round at a time; a storage that fails is shown in place of the walk. */
function obeying(id: string, { open, pendingOrders }: Opened): () => Promise<void> {
  let busy = false;
  return async () => {
    if (busy || open.value.kind !== 'ready') return;
    busy = true;
    try {
      pendingOrders.value = await tabletRuntime().walks.obey(id);
    } catch (error) {
      open.value = { kind: 'failed', code: storageErrorOf(error).code };
    } finally {
      busy = false;
    }
  };
}

/** Opens the walk and closes it with the scope, also where the scope ends before the chain was read. */
function opening(id: string, { open, walk }: Opened, show: (log: ShopWalkLog) => void): () => Promise<void> {
  const { walks } = tabletRuntime();
  let gone = false;
  onScopeDispose(() => {
    gone = true;
    if (walk.value) void walks.close(id);
    walk.value?.stop();
  });
  return async () => {
    open.value = { kind: 'loading' };
    try {
      const log = await walks.open(id);
      if (gone) return await walks.close(id);
      show(log);
      open.value = { kind: 'ready' };
    } catch (error) {
      const missing = error instanceof UnknownWalk;
      open.value = missing ? { kind: 'notFound' } : { kind: 'failed', code: storageErrorOf(error).code };
    }
  };
}

/** Opens a walk for as long as this scope lives: one writer, what is shown is saved, orders of the office are obeyed. */
export function useWalk(id: string, { leave }: UseWalkOptions): UseWalkReturn {
  const tablet = tabletRuntime();
  const store = useTabletStore();
  const now = useNow();
  const opened: Opened = {
    open: shallowRef({ kind: 'loading' }),
    walk: shallowRef(null),
    pendingOrders: shallowRef([]),
  };
  const { open, walk, pendingOrders } = opened;
  const obey = obeying(id, opened);
  const rolesOf = (person: string) => tablet.personById(person)?.roles ?? [];
  const openIt = opening(id, opened, (log) => {
    walk.value = walkPicture(log, { now, store, leave, rolesOf });
    log.subscribe(() => void obey());
  });
  const retry = () => openIt().then(obey);
  const { clock } = tablet.world;
  useHiddenPause(() => void walk.value?.pauseHidden(), { clocks: [() => clock.mono(), () => clock.now()] });
  onScopeDispose(tablet.onChange((what) => void (what === 'catalogue' && obey())));
  void retry();
  return { open, walk, pendingOrders, confirmations: () => store.catalogue.confirmations[id] ?? [], retry };
}
