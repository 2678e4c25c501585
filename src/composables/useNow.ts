import { onScopeDispose, readonly, shallowRef, type ShallowRef } from 'vue';
import type { Now } from '@shared/walk/instruction';
import { isoOf } from '@/offline/tabletClock';
import { tabletRuntime } from './tabletRuntime';

/** The moment on both clocks of the tablet, once a second, so that waits count down (W8). */
export function useNow(everyMs = 1000): Readonly<ShallowRef<Now>> {
  const { clock } = tabletRuntime().world;
  const look = (): Now => ({ at: isoOf(clock.now()), mono: clock.mono(), boot: clock.boot });
  const now = shallowRef(look());
  const timer = setInterval(() => (now.value = look()), everyMs);
  onScopeDispose(() => clearInterval(timer));
  return readonly(now);
}
