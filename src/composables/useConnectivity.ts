import { onScopeDispose, readonly, shallowRef, type ShallowRef } from 'vue';

/** Options of `useConnectivity`. */
export interface UseConnectivityOptions {
  window?: Window;
}

/** Whether the browser believes that there is a network. A hint for words on the screen: sync finds out by trying. */
export function useConnectivity({ window: host = window }: UseConnectivityOptions = {}): {
  online: Readonly<ShallowRef<boolean>>;
} {
  const online = shallowRef(host.navigator.onLine);
  const look = (): void => {
    online.value = host.navigator.onLine;
  };
  for (const name of ['online', 'offline'] as const) {
    host.addEventListener(name, look);
    onScopeDispose(() => host.removeEventListener(name, look));
  }
  return { online: readonly(online) };
}
